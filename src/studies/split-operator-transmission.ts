import { largestTimeStep, refined } from "../grid/circle.js";
import { hasPoint } from "../potentials/points.js";
import type { Design } from "../problem/design.js";
import { atMost, type Calculation, type Check, type StudyOptions } from "./calculation.js";
import { Calculations } from "./circle-calculations.js";
import { type CirclePlan, largestDrift, planCircle } from "./circle-plan.js";
import { commonChecks, relativeError, startError, structureLength } from "./common-checks.js";
import { boundedAtMean, carryingEnergy } from "./mean-energy.js";
import type { Outcome } from "./outcome.js";

/** Share of the change on halving the step that the extrapolated value is believed within, by order: over twice what was seen on check-values 3.6. */
const TIME_CAUTION: Readonly<Record<number, number>> = { 2: 0.5, 4: 0.15, 6: 0.06 };
/** The same for the spacing where V has jumps (h^3 leaves a seventh) and where it has a point (h leaves all). */
const JUMP_CAUTION = 0.35;
const POINT_CAUTION = 1.5;
const REMAINING_SHARE = 0.1;
const PROLONGATION = 1.4;
/** Work (points times transforms) after which nothing is refined or prolonged any more. */
const WORK_LIMIT = 8e8;

export interface SplitOperatorOptions extends StudyOptions {
  /** Work after which nothing is refined or prolonged any more, where that of a study of its own is too much; points times transforms. */
  readonly work?: number;
}

/** Where the refinement stands: levels in space and time, the outcome there, and what each axis still leaves. */
interface Standing {
  readonly s: number;
  readonly t: number;
  readonly outcome: Outcome;
  readonly transmission: number;
  readonly reflection: number;
  readonly spacing: number;
  readonly time: number;
  readonly atMean: number;
  readonly atMeanError: number;
}

/**
 * Transmission on a circle, by the split operator or by Chebyshev expansion: whole calculations refined in space and in time, each axis as far as its own
 * share of the error demands, prolonged until what remains does not matter. What the user forced stays as it is, and so
 * does the time step of a stepper that is exact in time.
 */
export async function splitOperatorTransmission(
  design: Design,
  accuracy: number,
  options: SplitOperatorOptions,
): Promise<Calculation> {
  const limit = options.work ?? WORK_LIMIT;
  let plan = planCircle(design, accuracy);
  let spent = 0;
  for (;;) {
    const calculations = new Calculations(design, plan, options);
    // The cheapest calculation tells whether the end is late enough.
    if (
      !plan.forcedTime &&
      !plan.forcedSpace &&
      !design.potential.slopeTransform &&
      (await isTooEarly(calculations, design, accuracy, limit))
    ) {
      plan = planCircle(design, accuracy, plan.end * PROLONGATION);
      continue;
    }
    const standing = await refine(calculations, plan, design, accuracy, limit - spent);
    spent += calculations.work;
    const late =
      tooMuchRemains(standing.outcome, accuracy) && design.numerics.end === undefined && spent < limit / 4;
    if (!late) return summary(design, plan, calculations, standing, accuracy);
    plan = planCircle(design, accuracy, plan.end * PROLONGATION);
  }
}

function tooMuchRemains(outcome: Outcome, accuracy: number): boolean {
  return outcome.unfinished > REMAINING_SHARE * accuracy * outcome.transmitted;
}

async function isTooEarly(
  calculations: Calculations,
  design: Design,
  accuracy: number,
  limit: number,
): Promise<boolean> {
  const outcome = await calculations.at(0, 0);
  return (
    design.numerics.end === undefined && tooMuchRemains(outcome, accuracy) && calculations.work < limit / 40
  );
}

async function refine(
  calculations: Calculations,
  plan: CirclePlan,
  design: Design,
  accuracy: number,
  work: number,
): Promise<Standing> {
  let s = plan.forcedSpace ? 0 : 1;
  let t = plan.fixedTime ? 0 : 1;
  for (;;) {
    // Where V has jumps, momenta up to the band's edge are populated and every drift must turn them by less than pi.
    if (!plan.fixedTime && design.potential.slopeTransform)
      while (plan.timeStep / 2 ** t > phaseLimit(plan, design, s)) t++;
    const standing = await stand(calculations, plan, design, s, t);
    const goal = 0.8 * accuracy * standing.transmission;
    if (standing.spacing + standing.time <= goal || tooMuchRemains(standing.outcome, accuracy))
      return standing;
    const finerSpace = !plan.forcedSpace && (standing.spacing >= standing.time || plan.fixedTime);
    if (finerSpace) s++;
    else if (!plan.fixedTime) t++;
    else return standing;
    const cost = calculations.cost(s, t) + calculations.cost(s, t - 1) + calculations.cost(s - 1, t);
    if (calculations.work + cost > work) return standing;
  }
}

function phaseLimit(plan: CirclePlan, design: Design, s: number): number {
  if (plan.order === "exact") return Number.POSITIVE_INFINITY;
  return largestTimeStep(refined(plan.circle, s).step, design.particleMass, largestDrift(plan.order));
}

async function stand(
  calculations: Calculations,
  plan: CirclePlan,
  design: Design,
  s: number,
  t: number,
): Promise<Standing> {
  const jumps = design.potential.slopeTransform !== undefined;
  const outcome = await calculations.at(s, t);
  const slower = plan.fixedTime ? outcome : await calculations.at(s, t - 1);
  const coarser = plan.forcedSpace ? outcome : await calculations.at(s - 1, t);
  const change = outcome.transmitted - slower.transmitted;
  const [mean, meanSlower, meanCoarser] = [outcome, slower, coarser].map(
    (o) => o.transmissionAt(plan.from.energy) ?? 0,
  );
  // Smooth V: the declared order holds and the leading term is taken off; jumps spoil the order, so nothing is.
  const leading = !jumps && plan.order !== "exact";
  const gain = leading ? 1 / (2 ** plan.order - 1) : 0;
  const timeCaution = leading ? TIME_CAUTION[plan.order] : 1;
  // With jumps the error falls like the third power of the spacing, erratically. Smooth V: halving squares it, so that
  // the change is the error of the coarser grid and its own square root, cautiously enlarged, the share that is left.
  // A point is held worse: its error falls like the first power, and all of the change is left.
  const jumpCaution = hasPoint(design.potential) ? POINT_CAUTION : JUMP_CAUTION;
  const spaceCaution = (fine: number, coarse: number) =>
    jumps ? jumpCaution : Math.min(0.2, 5 * Math.sqrt(Math.abs(fine - coarse) / fine));
  return {
    s,
    t,
    outcome,
    transmission: outcome.transmitted + gain * change,
    reflection: outcome.reflected + gain * (outcome.reflected - slower.reflected),
    spacing:
      spaceCaution(outcome.transmitted, coarser.transmitted) *
      Math.abs(outcome.transmitted - coarser.transmitted),
    time: timeCaution * Math.abs(change),
    atMean: mean + gain * (mean - meanSlower),
    atMeanError:
      spaceCaution(mean, meanCoarser) * Math.abs(mean - meanCoarser) +
      timeCaution * Math.abs(mean - meanSlower),
  };
}

function summary(
  design: Design,
  plan: CirclePlan,
  calculations: Calculations,
  standing: Standing,
  accuracy: number,
): Calculation {
  const { outcome, transmission, reflection, spacing, time, s, t } = standing;
  const circle = refined(plan.circle, s);
  const steps = calculations.steps(t);
  const timeStep = plan.timeStep / 2 ** t;
  const drift = calculations.drift();
  const roundings = plan.order === "exact" ? calculations.pairs(s, t) : steps;
  // A transform's rounding is spread over all points: it is absolute, a few units in the last place per root of the number of steps.
  const roundOff =
    4 * drift * transmission +
    8 * Number.EPSILON * Number.EPSILON * roundings * circle.points +
    4 * Number.EPSILON * Math.sqrt(roundings) * Math.sqrt(transmission);
  const start = startError(plan.from, transmission);
  const others = spacing + time + outcome.unfinished + start;
  const value = (x: number) => Math.min(1, Math.max(0, x));
  return {
    stepper: plan.definition.name,
    order: plan.order,
    transmission: { value: value(transmission), error: others + roundOff },
    // Near one it carries the drift of the norm whole.
    reflection: { value: value(reflection), error: others + roundOff + 4 * drift * value(reflection) },
    remaining: outcome.unfinished,
    normDrift: drift,
    grid: {
      points: circle.points,
      step_nm: circle.step,
      finest_nm: circle.step,
      length_nm: circle.points * circle.step,
    },
    time: { step_fs: timeStep, end_fs: plan.end, steps },
    parts: { spacing, timeStep: time, remaining: outcome.unfinished, start, roundOff },
    runs: calculations.list(),
    atMeanEnergy: boundedAtMean(
      standing.atMean,
      standing.atMeanError,
      outcome,
      plan.from,
      structureLength(design.potential),
    ),
    carryingEnergy: carryingEnergy(outcome, plan.from),
    checks: [
      ...commonChecks(plan.from, outcome, drift, accuracy, transmission),
      ...refinementChecks(design, plan, standing, timeStep, accuracy),
    ],
  };
}

function refinementChecks(
  design: Design,
  plan: CirclePlan,
  standing: Standing,
  timeStep: number,
  accuracy: number,
): Check[] {
  const { spacing, time, transmission } = standing;
  const checks: Check[] = [];
  if (!plan.forcedSpace)
    checks.push(
      atMost(
        "spacing",
        relativeError(spacing, transmission),
        accuracy,
        "relative error left by the grid, from a whole calculation with half the points",
      ),
    );
  if (!plan.fixedTime)
    checks.push(
      atMost(
        "time step",
        relativeError(time, transmission),
        accuracy,
        "relative error left by the time step, from a whole calculation with twice the step",
      ),
    );
  if (plan.order !== "exact" && (design.potential.slopeTransform || plan.forcedTime))
    checks.push(
      atMost(
        "kinetic phase",
        timeStep / phaseLimit(plan, design, standing.s),
        1,
        "kinetic phase of one drift at the largest momentum of the grid, in units of pi; above 1 high momenta are folded onto low ones",
      ),
    );
  return checks;
}
