import type { Potential } from "./potential.js";

/**
 * A piecewise constant profile. Piece i lies between edges[i - 1] and edges[i]; the first piece reaches to the far
 * left, the last to the far right, so there is one piece more than there are edges. nm, eV, eV fs^2/nm^2.
 */
export interface Pieces {
  /** Ascending, at least one. */
  readonly edges: readonly number[];
  /** V in each piece. */
  readonly values: readonly number[];
  /** Mass in each piece. */
  readonly masses: readonly number[];
}

/**
 * The potential of a piecewise constant profile.
 * Edges at which neither V nor the mass changes are no interfaces, but still count for the faces: what was written
 * as the structure stays the structure. Cost: value and mass O(log n), averages O(log n + pieces covered).
 * @param shape name of the shape it is made for.
 */
export function piecewise(shape: string, { edges, values, masses }: Pieces): Potential {
  const last = values.length - 1;
  const jumps: { x: number; height: number }[] = [];
  const interfaces: number[] = [];
  for (let i = 0; i < edges.length; i++) {
    const height = values[i + 1] - values[i];
    if (height !== 0) jumps.push({ x: edges[i], height });
    if (height !== 0 || masses[i + 1] !== masses[i]) interfaces.push(edges[i]);
  }
  return {
    shape,
    value: (x) => valueAt(edges, values, x),
    cellAverage: (a, b) => average(edges, values, a, b),
    mass: (x) => valueAt(edges, masses, x),
    massAverage: (a, b) => average(edges, masses, a, b),
    slopeTransform: (k) => jumpTransform(jumps, k),
    interfaces,
    faces: [edges[0], edges[edges.length - 1]],
    levelLeft: values[0],
    levelRight: values[last],
    lowest: Math.min(...values),
    highest: Math.max(...values),
    scale: Number.POSITIVE_INFINITY,
    uniformMass: masses.every((mass) => mass === masses[0]),
    confining: false,
  };
}

/** integral V'(x) exp(-i k x) dx = sum_j J_j exp(-i k x_j) for jumps J_j at x_j. */
function jumpTransform(jumps: readonly { x: number; height: number }[], k: number): [re: number, im: number] {
  let re = 0;
  let im = 0;
  for (const { x, height } of jumps) {
    re += height * Math.cos(k * x);
    im -= height * Math.sin(k * x);
  }
  return [re, im];
}

/** Number of edges strictly left of x: the piece that x is in, or that ends at x. */
function edgesBelow(edges: readonly number[], x: number): number {
  let low = 0;
  let high = edges.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (edges[middle] < x) low = middle + 1;
    else high = middle;
  }
  return low;
}

function valueAt(edges: readonly number[], values: readonly number[], x: number): number {
  const piece = edgesBelow(edges, x);
  return edges[piece] === x ? (values[piece] + values[piece + 1]) / 2 : values[piece];
}

function average(edges: readonly number[], values: readonly number[], a: number, b: number): number {
  let piece = edgesBelow(edges, a);
  if (edges[piece] === a) piece++;
  const first = values[piece];
  // Deviations from the first piece, so that a constant stretch comes out without a rounding error.
  let sum = 0;
  for (; piece < edges.length && edges[piece] < b; piece++) {
    const right = piece + 1 < edges.length ? Math.min(edges[piece + 1], b) : b;
    sum += (values[piece + 1] - first) * ((right - edges[piece]) / (b - a));
  }
  return first + sum;
}
