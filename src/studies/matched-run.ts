import { dividedAt } from "../analysis/divided.js";
import type { Shares } from "../analysis/probabilities.js";
import type { Series } from "../analysis/results.js";
import { SeriesRecorder } from "../analysis/series-recorder.js";
import { sampleGaussian } from "../packets/gaussian.js";
import { propagate } from "../propagate.js";
import type { Stepper } from "../steppers/stepper.js";
import type { StudyOptions } from "./calculation.js";
import type { MatchedPlan } from "./matched-plan.js";
import { INSTANTS } from "./matched-plan.js";

/** A whole run in true time: the state at the end, and what was seen at the common instants. */
export interface MatchedRun {
  readonly stepper: Stepper;
  readonly steps: number;
  readonly psi: Float64Array;
  readonly series: Series;
}

/**
 * Follows the plan's packet by a stepper from its start to the plan's end, in a number of steps that passes all common instants.
 */
export async function matchedRun(
  stepper: Stepper,
  plan: MatchedPlan,
  steps: number,
  text: string,
  options: StudyOptions,
): Promise<MatchedRun> {
  const { grid } = stepper.system;
  const psi = new Float64Array(2 * grid.x.length);
  sampleGaussian(psi, grid.x, plan.from.packet);
  const every = steps / INSTANTS;
  const recorder = new SeriesRecorder(stepper, every, plan.from.direction);
  const [left, right] = stepper.system.potential.faces;
  const divide = dividedAt(grid, left, right);
  const shares: Shares[] = [];
  const division = { every, record: (_: number, state: Float64Array) => void shares.push(divide(state)) };
  await propagate({ stepper, psi, steps }, [recorder, division], {
    signal: options.signal,
    onProgress: (done, total) => options.onProgress?.(text, done / total),
  });
  return { stepper, steps, psi, series: withShares(recorder.series, shares, plan.from.direction) };
}

/** The series with its shares replaced by those that know where in a cell a face lies. */
function withShares(series: Series, shares: readonly Shares[], direction: 1 | -1): Series {
  const take = (part: keyof Shares) => Float64Array.from(shares, (s) => s[part]);
  const [through, back] = direction > 0 ? (["right", "left"] as const) : (["left", "right"] as const);
  const replaced: Readonly<Record<string, keyof Shares>> = {
    transmission: through,
    reflection: back,
    inside: "inside",
  };
  return series.map((column) =>
    column.name in replaced ? { ...column, values: take(replaced[column.name]) } : column,
  );
}
