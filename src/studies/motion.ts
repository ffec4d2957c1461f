import type { Series } from "../analysis/results.js";
import type { Grid } from "../grid/grid.js";

/** Columns of a series that motions are compared by. */
export const COMPARED_COLUMNS = ["transmission", "reflection", "x_mean", "k_mean", "energy"] as const;
export type ComparedColumn = (typeof COMPARED_COLUMNS)[number];

/** What one stepper makes of the matched motion, with the errors that its own refinement shows. */
export interface Motion {
  readonly name: string;
  readonly order: number;
  /** The state at the end on the common nodes, interleaved, 1/sqrt(nm), ... */
  readonly state: Float64Array;
  /** ... and how far, as an L2 distance, it may lie from the true one. */
  readonly error: { readonly spacing: number; readonly timeStep: number; readonly rounding: number };
  readonly series: Series;
  /** Largest error of each compared column at any instant, in the column's unit. */
  readonly seriesErrors: Readonly<Record<ComparedColumn, number>>;
  /** Largest change of the norm and of <H> (eV) over a run. */
  readonly drift: { readonly norm: number; readonly energy: number };
  readonly grid: { readonly points: number; readonly step_nm: number };
  readonly time: { readonly step_fs: number; readonly end_fs: number; readonly steps: number };
  /** What was done, in words. */
  readonly method: string;
}

/** Sum of the parts of a motion's error. */
export function stateError({ error }: Motion): number {
  return error.spacing + error.timeStep + error.rounding;
}

/** sqrt(sum_j w_j |a_j - b_j|^2): the L2 distance of two states on the nodes of a grid, global phase kept. */
export function distance(grid: Grid, a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let j = 0; j < grid.x.length; j++)
    sum += grid.weight[j] * ((a[2 * j] - b[2 * j]) ** 2 + (a[2 * j + 1] - b[2 * j + 1]) ** 2);
  return Math.sqrt(sum);
}

/** The values of a column. @throws RangeError when there is none of that name */
export function columnOf(series: Series, name: string): Float64Array {
  const column = series.find((each) => each.name === name);
  if (!column) throw new RangeError(`the series has no column "${name}"`);
  return column.values;
}

/** Largest |a_i - b_i|. */
export function largestDifference(a: Float64Array, b: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < a.length; i++) largest = Math.max(largest, Math.abs(a[i] - b[i]));
  return largest;
}

/** The same quantity for every compared column. */
export function perColumn(value: (column: ComparedColumn) => number): Record<ComparedColumn, number> {
  return Object.fromEntries(COMPARED_COLUMNS.map((name) => [name, value(name)])) as Record<
    ComparedColumn,
    number
  >;
}

/** Largest |value| of a column of several series. */
export function largestOf(all: readonly Series[], name: string): number {
  return Math.max(
    ...all.map((series) => columnOf(series, name).reduce((most, v) => Math.max(most, Math.abs(v)), 0)),
  );
}
