import type { Grid } from "../grid/grid.js";
import type { Recorder } from "./recorder.js";
import type { DensityMap } from "./results.js";

/** The part of space and time to be seen, nm and fs, and how finely. */
export interface MapWindow {
  readonly xFrom: number;
  readonly xTo: number;
  readonly tFrom: number;
  readonly tTo: number;
  readonly columns: number;
  /** Most rows that are kept. */
  readonly rows: number;
}

/**
 * Records |psi|^2 over space and time in bounded memory: every look adds the exact cell probabilities to the columns they cover and to the
 * row of its time, so that a map has `rows` x `columns` numbers however many steps there are. Rows that no look fell
 * into (fewer steps than rows) are filled in linearly between their neighbours.
 */
export class DensityRecorder implements Recorder {
  readonly every: number;
  private readonly sums: Float64Array;
  private readonly looks: Float64Array;
  private readonly edges: Float64Array;

  constructor(
    grid: Grid,
    private readonly window: MapWindow,
    every = 1,
  ) {
    const { columns, rows, xFrom, xTo, tFrom, tTo } = window;
    if (!(xTo > xFrom) || !(tTo > tFrom))
      throw new RangeError(
        `a map needs a range of positive length in x and t; got ${xFrom} to ${xTo} nm, ${tFrom} to ${tTo} fs`,
      );
    this.every = every;
    this.sums = new Float64Array(columns * rows);
    this.looks = new Float64Array(rows);
    this.edges = cellEdges(grid);
  }

  record(time: number, psi: Float64Array): void {
    const { columns, rows, tFrom, tTo, xFrom, xTo } = this.window;
    const row = Math.floor(((time - tFrom) / (tTo - tFrom)) * rows);
    const at = time === tTo ? rows - 1 : row;
    if (at < 0 || at >= rows) return;
    this.looks[at]++;
    const { edges, sums } = this;
    const n = edges.length - 1;
    const scale = columns / (xTo - xFrom);
    for (let j = 0; j < n; j++) {
      const a = (edges[j] - xFrom) * scale;
      const b = (edges[j + 1] - xFrom) * scale;
      if (b <= 0 || a >= columns) continue;
      const density = psi[2 * j] ** 2 + psi[2 * j + 1] ** 2;
      const last = Math.min(columns - 1, Math.floor(b));
      for (let c = Math.max(0, Math.floor(a)); c <= last; c++)
        sums[at * columns + c] += density * Math.max(0, Math.min(b, c + 1) - Math.max(a, c));
    }
  }

  /** The map of what was seen so far. */
  get map(): DensityMap {
    const { columns, rows, xFrom, xTo, tFrom, tTo } = this.window;
    const density = new Float64Array(rows * columns);
    const seen = [...this.looks.keys()].filter((row) => this.looks[row] > 0);
    for (let row = 0, next = 0; row < rows && seen.length > 0; row++) {
      while (next < seen.length - 1 && seen[next] < row) next++;
      const above = seen[next];
      const below = above <= row || next === 0 ? above : seen[next - 1];
      const share = above === below ? 0 : (row - below) / (above - below);
      for (let c = 0; c < columns; c++)
        density[row * columns + c] =
          ((1 - share) * this.sums[below * columns + c]) / this.looks[below] +
          (share * this.sums[above * columns + c]) / this.looks[above];
    }
    return { columns, rows, xFrom, xTo, tFrom, tTo, density };
  }
}

/** Edges of the cells: half-way between the nodes. */
function cellEdges({ x, spacing }: Grid): Float64Array {
  const n = x.length;
  const edges = new Float64Array(n + 1);
  edges[0] = x[0] - spacing[0] / 2;
  for (let j = 1; j < n; j++) edges[j] = x[j] - spacing[j - 1] / 2;
  edges[n] = x[n - 1] + spacing[n - 2] / 2;
  return edges;
}
