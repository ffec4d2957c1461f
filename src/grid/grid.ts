/**
 * Where a state lives: nodes x_j in nm with the widths of their cells, so that integral f dx = sum_j weight_j f_j.
 * On a "closed" grid psi vanishes one spacing beyond either end; a "periodic" one is a circle of n equal spacings.
 */
export interface Grid {
  readonly ends: "closed" | "periodic";
  /** Nodes, ascending, nm. */
  readonly x: Float64Array;
  /** Distance from node j to node j+1, nm; length n - 1 on a closed grid. Periodic grids have one spacing throughout. */
  readonly spacing: Float64Array;
  /** Cell widths, nm. */
  readonly weight: Float64Array;
  /** Smallest and largest spacing, nm. */
  readonly finest: number;
  readonly coarsest: number;
}

/** A closed grid through the given nodes (ascending, at least 3). Cells reach half-way to the neighbours. */
export function closedGrid(x: Float64Array): Grid {
  const n = x.length;
  if (n < 3) throw new RangeError(`a grid needs at least 3 nodes; got ${n}`);
  const spacing = new Float64Array(n - 1);
  let finest = Number.POSITIVE_INFINITY;
  let coarsest = 0;
  for (let j = 0; j < n - 1; j++) {
    spacing[j] = x[j + 1] - x[j];
    if (!(spacing[j] > 0))
      throw new RangeError(`grid nodes must ascend; node ${j + 1} at ${x[j + 1]} nm follows ${x[j]} nm`);
    finest = Math.min(finest, spacing[j]);
    coarsest = Math.max(coarsest, spacing[j]);
  }
  const weight = new Float64Array(n);
  weight[0] = spacing[0];
  weight[n - 1] = spacing[n - 2];
  for (let j = 1; j < n - 1; j++) weight[j] = 0.5 * (spacing[j - 1] + spacing[j]);
  return { ends: "closed", x, spacing, weight, finest, coarsest };
}

/** A closed grid of n equal spacings `step` (nm) whose first node stands at `first`. */
export function uniformClosedGrid(first: number, step: number, n: number): Grid {
  return closedGrid(Float64Array.from({ length: n }, (_, j) => first + j * step));
}

/** A circle of n equal spacings `step` (nm) whose first node stands at `first`. */
export function periodicGrid(first: number, step: number, n: number): Grid {
  const x = Float64Array.from({ length: n }, (_, j) => first + j * step);
  const spacing = new Float64Array(n - 1).fill(step);
  return {
    ends: "periodic",
    x,
    spacing,
    weight: new Float64Array(n).fill(step),
    finest: step,
    coarsest: step,
  };
}
