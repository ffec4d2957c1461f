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
 * Records |psi|^2 over space and time in bounded memory: every look adds the density, taken linearly between the nodes and integrated exactly
 * over each column, to the row of its time, so that a map has `rows` x `columns` numbers however many steps there are. Rows that no look fell
 * into (fewer steps than rows) are filled in linearly between their neighbours.
 */
export class DensityRecorder implements Recorder {
  readonly every: number;
  private readonly sums: Float64Array;
  private readonly looks: Float64Array;
  private readonly x: Float64Array;

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
    this.x = grid.x;
  }

  record(time: number, psi: Float64Array): void {
    const { columns, rows, tFrom, tTo, xFrom, xTo } = this.window;
    const row = Math.floor(((time - tFrom) / (tTo - tFrom)) * rows);
    const at = time === tTo ? rows - 1 : row;
    if (at < 0 || at >= rows) return;
    this.looks[at]++;
    const { x, sums } = this;
    const width = (xTo - xFrom) / columns;
    const base = at * columns;
    let c = 0;
    let right = psi[0] ** 2 + psi[1] ** 2;
    for (let j = 0; j < x.length - 1; j++) {
      const left = right;
      right = psi[2 * j + 2] ** 2 + psi[2 * j + 3] ** 2;
      if (x[j + 1] <= xFrom) continue;
      if (x[j] >= xTo) break;
      const slope = (right - left) / (x[j + 1] - x[j]);
      const end = Math.min(x[j + 1], xTo);
      // The stretch between two nodes, cut at the edges of the columns; a linear density is its middle value on average.
      for (let a = Math.max(x[j], xFrom); a < end; ) {
        while (c < columns - 1 && xFrom + (c + 1) * width <= a) c++;
        const b = c < columns - 1 ? Math.min(end, xFrom + (c + 1) * width) : end;
        sums[base + c] += ((b - a) / width) * (left + slope * (0.5 * (a + b) - x[j]));
        a = b;
      }
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
