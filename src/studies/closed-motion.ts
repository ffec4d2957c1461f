import { alignedGrid, alignedPoints } from "../grid/aligned.js";
import { extrapolationWeights, weightedSum } from "../numerics/extrapolation-weights.js";
import type { Design } from "../problem/design.js";
import { crankNicolson } from "../steppers/crank-nicolson.js";
import type { StudyOptions } from "./calculation.js";
import { BRING_CLOSER, refuseTooLarge } from "./limits.js";
import { COMMON_REFINEMENT, type MatchedPlan } from "./matched-plan.js";
import { type MatchedRun, matchedRun } from "./matched-run.js";
import { columnOf, distance, largestDifference, largestOf, type Motion, perColumn } from "./motion.js";

/** Refinements in turn, all multiples of the common one: the first ones are always run, the rest as far as needed. */
export const CLOSED_REFINEMENTS = [8, 12, 16, 20, 24, 32, 40];
const FEWEST = 4;
/** Error of the state that is aimed at: a tenth of what a crosscheck of a smooth design has to reach. */
const GOAL = 1e-7;
/**
 * The change that the last refinement made shrinks again by at least its own ratio to the change before when one more is added (in
 * theory by the ratio of the raw error to the number of refinements); three times that is believed, and never less than this share.
 */
const RATIO_CAUTION = 3;
const LEAST_SHARE = 0.05;

/**
 * The matched motion by Crank-Nicolson of order 6: whole runs on grids refined in proportion, whose states at the nodes that all of them share,
 * and whose series, are extrapolated to vanishing spacing (errors in h^2, h^4, ... also at interfaces). The time step's share is
 * measured by a twin with twice the steps. Cost: five to seven runs.
 */
export async function closedMotion(
  design: Design,
  plan: MatchedPlan,
  options: StudyOptions,
): Promise<Motion> {
  const common = alignedGrid(plan.closed.stretches, COMMON_REFINEMENT);
  const runs: MatchedRun[] = [];
  let before = Number.POSITIVE_INFINITY;
  let last = Number.POSITIVE_INFINITY;
  let state: Float64Array = new Float64Array(0);
  for (const refinement of CLOSED_REFINEMENTS) {
    runs.push(await runOn(design, plan, refinement, 1, options));
    const next = extrapolated(runs, (run, i) => onCommon(run.psi, CLOSED_REFINEMENTS[i]));
    if (runs.length > 1) [before, last] = [last, distance(common, next, state)];
    state = next;
    if (runs.length >= FEWEST && left(last, before) <= GOAL) break;
  }
  const twin = await runOn(design, plan, CLOSED_REFINEMENTS[0], 2, options);
  const first = CLOSED_REFINEMENTS[0];
  const drift = {
    norm: largestOf(
      runs.map((r) => r.series),
      "norm_drift",
    ),
    energy: largestOf(
      runs.map((r) => r.series),
      "energy_drift",
    ),
  };
  const weights = weightsOf(runs.length);
  const rounding =
    weights.reduce((sum, w) => sum + Math.abs(w), 0) *
    (drift.norm + Number.EPSILON * Math.sqrt(plan.closed.steps));
  const column = (count: number, name: string) =>
    extrapolated(runs.slice(0, count), (run) => columnOf(run.series, name));
  const finest = runs[runs.length - 1];
  return {
    name: crankNicolson.name,
    order: plan.closed.order,
    state,
    error: {
      spacing: left(last, before),
      timeStep: distance(common, onCommon(twin.psi, first), onCommon(runs[0].psi, first)),
      rounding,
    },
    series: finest.series.map((c) => ({ ...c, values: column(runs.length, c.name) })),
    seriesErrors: perColumn((name) => {
      const [a, b, c] = [0, 1, 2].map((fewer) => column(runs.length - fewer, name));
      const change = largestDifference(a, b);
      const size = largestOf([finest.series], name);
      return (
        left(change, largestDifference(b, c)) +
        largestDifference(columnOf(twin.series, name), columnOf(runs[0].series, name)) +
        rounding * size
      );
    }),
    drift,
    grid: { points: finest.psi.length / 2, step_nm: finest.stepper.system.grid.coarsest },
    time: { step_fs: finest.stepper.timeStep, end_fs: plan.end, steps: finest.steps },
    method: `${runs.length} runs on grids with ${runs[0].psi.length / 2} to ${finest.psi.length / 2} points, extrapolated to vanishing spacing`,
  };
}

/** What is left of a value that has just changed by `last`, and by `before` the time before. */
function left(last: number, before: number): number {
  const ratio = last / before;
  return last * Math.min(1, Math.max(LEAST_SHARE, Number.isFinite(ratio) ? RATIO_CAUTION * ratio : 1));
}

const weightsOf = (count: number) =>
  extrapolationWeights(CLOSED_REFINEMENTS.slice(0, count).map((r) => 1 / r));

function extrapolated(
  runs: readonly MatchedRun[],
  take: (run: MatchedRun, i: number) => Float64Array,
): Float64Array {
  return weightedSum(weightsOf(runs.length), runs.map(take));
}

/** The values at the nodes of the common grid, which are every so many of a refined one's. */
function onCommon(psi: Float64Array, refinement: number): Float64Array {
  const stride = refinement / COMMON_REFINEMENT;
  const n = (psi.length / 2 - 1) / stride + 1;
  const out = new Float64Array(2 * n);
  for (let j = 0; j < n; j++) {
    out[2 * j] = psi[2 * j * stride];
    out[2 * j + 1] = psi[2 * j * stride + 1];
  }
  return out;
}

function runOn(
  design: Design,
  plan: MatchedPlan,
  refinement: number,
  stepFactor: number,
  options: StudyOptions,
): Promise<MatchedRun> {
  const { stretches, order } = plan.closed;
  const steps = plan.closed.steps * stepFactor;
  const points = alignedPoints(stretches, refinement);
  refuseTooLarge({ ...design, numerics: {} }, points, steps, BRING_CLOSER);
  const stepper = crankNicolson.prepare(
    {
      grid: alignedGrid(stretches, refinement),
      potential: design.potential,
      particleMass: design.particleMass,
      referenceEnergy: plan.from.energy,
    },
    plan.end / steps,
    order,
  );
  return matchedRun(stepper, plan, steps, `matched run, Crank-Nicolson, ${points} points`, options);
}
