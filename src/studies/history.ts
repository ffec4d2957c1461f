import { DensityRecorder, type MapWindow } from "../analysis/density-recorder.js";
import { core } from "../analysis/probabilities.js";
import type { DensityMap, Series } from "../analysis/results.js";
import { SeriesRecorder } from "../analysis/series-recorder.js";
import type { Departure } from "../grid/journey.js";
import type { Design } from "../problem/design.js";
import { propagate } from "../propagate.js";
import type { TimeOrder } from "../steppers/stepper.js";
import { HBAR } from "../units/constants.js";
import type { StudyOptions } from "./calculation.js";
import { type PreparedRun, type PrepareOptions, prepare } from "./prepare.js";

/** Rows of a series, about. */
const SERIES_ROWS = 400;
/** Size of a map unless asked otherwise. */
export const MAP_COLUMNS = 800;
export const MAP_ROWS = 400;
/** Share of its greatest value that may still be inside at the end, ... */
const INSIDE_AT_END = 0.02;
/** ... unless the end has been moved out so often, by this factor. */
const PROLONGATIONS = 4;
const PROLONGATION = 1.5;
/** Widths of the packet shown on either side of the structure, and of its passage. */
const SHOWN_WIDTHS = 7;

export interface HistoryOptions extends StudyOptions {
  /** Part of space and time to map; what is absent is chosen around the structure and the encounter. nm, fs */
  readonly window?: {
    readonly xFrom?: number;
    readonly xTo?: number;
    readonly tFrom?: number;
    readonly tTo?: number;
  };
  readonly columns?: number;
  readonly rows?: number;
}

/** What happened over time, from a run whose own errors were measured. */
export interface History {
  readonly series: Series;
  readonly map: DensityMap;
  readonly stepper: string;
  readonly order: TimeOrder;
  readonly grid: { readonly points: number; readonly step_nm: number };
  readonly time: { readonly step_fs: number; readonly end_fs: number; readonly steps: number };
  /**
   * Largest probability that the map or the series may have in the wrong place at any time, from a second run with twice the
   * time step (none for a stepper that is exact in time) and one with half the cells: half the integral of |difference| over x, and the
   * largest difference of the transmission.
   */
  readonly errors: { readonly timeStep: number; readonly spacing: number; readonly transmission: number };
}

/**
 * Follows the packet in true time and records a series and a density map. Cost: two and a half runs.
 * @throws DesignLimitError when the design cannot be computed as written; rejects with the signal's reason when stopped
 */
export async function history(design: Design, options: HistoryOptions = {}): Promise<History> {
  let end = options.window?.tTo;
  for (let attempt = 0; ; attempt++) {
    const run = prepare(design, { end });
    const seen = await follow(design, run, options);
    const fixed = design.numerics.end !== undefined || options.window?.tTo !== undefined;
    if (fixed || design.potential.confining || attempt === PROLONGATIONS || !stillInside(seen.series))
      return withErrors(design, run, seen, options);
    end = run.end * PROLONGATION;
  }
}

/** Instants and columns at which a run and its coarser twins are compared. */
const COMPARED_INSTANTS = 20;
const COMPARED_COLUMNS = 300;

interface Seen {
  readonly series: Series;
  readonly map: DensityMap;
  /** The density at COMPARED_INSTANTS equally spaced instants, which every twin passes through exactly. */
  readonly instants: DensityMap;
}

async function follow(design: Design, run: PreparedRun, options: HistoryOptions): Promise<Seen> {
  const { stepper, from } = run;
  const every = Math.max(1, Math.floor(run.steps / SERIES_ROWS));
  const series = new SeriesRecorder(stepper, every, from.direction);
  const window = windowOf(design, run, options);
  const density = new DensityRecorder(stepper.system.grid, window);
  const apart = run.end / COMPARED_INSTANTS;
  const instants = new DensityRecorder(
    stepper.system.grid,
    {
      ...window,
      // Every instant stands in the middle of a row of its own, safe from the rounding of its time.
      tFrom: -0.5 * apart,
      tTo: run.end + 0.5 * apart,
      columns: COMPARED_COLUMNS,
      rows: COMPARED_INSTANTS + 1,
    },
    Math.max(1, Math.round(run.steps / COMPARED_INSTANTS)),
  );
  await propagate(run, [series, density, instants], {
    signal: options.signal,
    onProgress: (done, total) => options.onProgress?.("following the packet", done / total),
  });
  return { series: series.series, map: density.map, instants: instants.map };
}

function windowOf(design: Design, run: PreparedRun, options: HistoryOptions): MapWindow {
  const { grid } = run.stepper.system;
  const { from, end } = run;
  const { packet, potential } = design;
  const asked = options.window ?? {};
  const [left, right] = potential.confining ? [grid.x[0], grid.x[grid.x.length - 1]] : core(potential);
  const margin = potential.confining ? 0 : SHOWN_WIDTHS * packet.width + (right - left) / 2;
  const [first, last] = [grid.x[0], grid.x[grid.x.length - 1]];
  const speed = (from.k0 * HBAR) / from.mass;
  const seen = potential.confining || speed === 0 ? [0, end] : passageTimes(from, right - left, speed);
  // What was asked for may lie outside of what is chosen; then the rest of the box or of the time is shown.
  const [xFrom, xTo] = range(asked.xFrom, asked.xTo, [left - margin, right + margin], [first, last]);
  const [tFrom, tTo] = range(asked.tFrom, asked.tTo, seen, [0, end]);
  return {
    xFrom,
    xTo,
    tFrom,
    tTo,
    columns: options.columns ?? MAP_COLUMNS,
    rows: options.rows ?? MAP_ROWS,
  };
}

type Pair = readonly number[];

/** When the packet's front gets to the structure and when its rear has passed, fs, by classical motion at its mean speed (nm/fs). */
function passageTimes({ distance, packet }: Departure, length: number, speed: number): Pair {
  const shown = SHOWN_WIDTHS * packet.width;
  return [(distance - shown) / speed, (distance + shown + length) / speed];
}

/** A range from what was asked for, else what was chosen, else the whole: the first of these that leaves a range. */
function range(from: number | undefined, to: number | undefined, chosen: Pair, whole: Pair): Pair {
  const [low, high] = [Math.max(whole[0], chosen[0]), Math.min(whole[1], chosen[1])];
  const first = from ?? (low < (to ?? high) ? low : whole[0]);
  return [first, to ?? (first < high ? high : whole[1])];
}

function stillInside(series: Series): boolean {
  const inside = series.find((column) => column.name === "inside")?.values ?? new Float64Array(1);
  return inside[inside.length - 1] > INSIDE_AT_END * Math.max(...inside);
}

/** Measures the errors of a run by two coarser ones: twice the time step, half the cells. */
async function withErrors(
  design: Design,
  run: PreparedRun,
  seen: Seen,
  options: HistoryOptions,
): Promise<History> {
  const twin = async (coarser: PrepareOptions): Promise<Seen> =>
    follow(design, prepare(design, { end: run.end, ...coarser }), { ...options, window: seen.map });
  const { stepper } = run;
  // A stepper that is exact in time shows the same with any step.
  const slower = stepper.order === "exact" ? seen : await twin({ stepFineness: 0.5 });
  const coarser = await twin({ fineness: 0.5 });
  // Half the cells: four times the error of second order, so the fine run is left with a third of the difference.
  const share = 1 / 3;
  const timeStep = misplaced(seen.instants, slower.instants);
  const transmission = Math.max(
    difference(seen.series, slower.series),
    share * difference(seen.series, coarser.series),
  );
  return {
    series: seen.series,
    map: seen.map,
    stepper: stepper.definition.name,
    order: stepper.order,
    grid: { points: stepper.system.grid.x.length, step_nm: stepper.system.grid.coarsest },
    time: { step_fs: stepper.timeStep, end_fs: run.end, steps: run.steps },
    errors: { timeStep, spacing: share * misplaced(seen.instants, coarser.instants), transmission },
  };
}

/** Largest over the rows of half the integral of |a - b| over x. */
function misplaced(a: DensityMap, b: DensityMap): number {
  const dx = (a.xTo - a.xFrom) / a.columns;
  let worst = 0;
  for (let row = 0; row < a.rows; row++) {
    let sum = 0;
    for (let c = row * a.columns; c < (row + 1) * a.columns; c++)
      sum += Math.abs(a.density[c] - b.density[c]);
    worst = Math.max(worst, 0.5 * sum * dx);
  }
  return worst;
}

/** Largest difference of the transmission at the times that both series have, the coarser one taken linearly between its rows. */
function difference(fine: Series, coarse: Series): number {
  const [t, value] = [column(fine, "time"), column(fine, "transmission")];
  const [tc, valueC] = [column(coarse, "time"), column(coarse, "transmission")];
  let worst = 0;
  for (let i = 0, j = 0; i < t.length; i++) {
    while (j < tc.length - 2 && tc[j + 1] < t[i]) j++;
    // Only times that both runs looked at: interpolation would be taken for an error.
    const near = Math.abs(tc[j] - t[i]) < Math.abs(tc[j + 1] - t[i]) ? j : j + 1;
    if (Math.abs(tc[near] - t[i]) < 1e-6 * t[t.length - 1])
      worst = Math.max(worst, Math.abs(value[i] - valueC[near]));
  }
  return worst;
}

function column(series: Series, name: string): Float64Array {
  return series.find((c) => c.name === name)?.values ?? new Float64Array(0);
}
