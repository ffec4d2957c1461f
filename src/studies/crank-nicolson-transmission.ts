import { alignedGrid, alignedPoints } from "../grid/aligned.js";
import { Extrapolation } from "../numerics/extrapolation.js";
import { wavenumberOf, wavenumberWeight } from "../packets/gaussian.js";
import type { Design } from "../problem/design.js";
import { crankNicolson } from "../steppers/crank-nicolson.js";
import { atMost, type Calculation, type RunSummary, type StudyOptions } from "./calculation.js";
import { type ClosedPlan, extent, planClosed } from "./closed-plan.js";
import { commonChecks, relativeError, startError, structureLength } from "./common-checks.js";
import { BRING_CLOSER, POINTS_LIMIT, refuseTooLarge } from "./limits.js";
import { boundedAtMean, carryingEnergy } from "./mean-energy.js";
import { LAST_PART, type Outcome, runToEnd } from "./outcome.js";
import { SpacingBound } from "./spacing-bound.js";

/** Cells of the successive calculations in units of the unrefined grid's. Tuned for least work to 1e-6 on check-values 3.6. */
export const REFINEMENTS = [1, 2, 3, 4, 5, 6, 8, 10, 12, 16, 20, 24, 32];
/** Calculations before the bound is believed. */
const FEWEST_CALCULATIONS = 5;
/** Share of the error asked for that the spacing may take. */
const SPACING_SHARE = 0.7;
/** Share of the error asked for that what remains may take. */
const REMAINING_SHARE = 0.2;
/** A refined grid may show so much more than the unrefined one before the end is moved out once more: the shares leave room for it. */
const SLACK = 1.3;
/** The end is moved out by a factor between these while too much remains. */
const LEAST_PROLONGATION = 1.2;
const MOST_PROLONGATION = 2.5;
/**
 * What is inside counts as held (bound, or for some thirty times longer than the calculation so far) when so much of it is left after the
 * end was moved out by at least this factor.
 */
const HELD_SHARE = 0.95;
const HELD_FACTOR = 1.8;
/** Work (nodes times steps) after which the end is no longer moved out and the grid no longer refined. */
const WORK_LIMIT = 1e9;

/**
 * Transmission by Crank-Nicolson: whole calculations on grids refined in proportion, extrapolated to vanishing
 * spacing, prolonged until what remains does not matter. A grid that the user asked for is taken at its word: one calculation on it.
 */
export async function crankNicolsonTransmission(
  design: Design,
  accuracy: number,
  options: StudyOptions,
): Promise<Calculation> {
  let plan = planClosed(design);
  let before: { inside: number; end: number } | undefined;
  for (;;) {
    // The unrefined grid tells, at a fraction of the cost, whether the end is late enough.
    const pilot = await outcomeOn(plan, design, REFINEMENTS[0], options);
    const held =
      before !== undefined &&
      plan.end > HELD_FACTOR * before.end &&
      pilot.inside > HELD_SHARE * before.inside;
    before = { inside: pilot.inside, end: plan.end };
    let next = held ? undefined : prolonged(design, plan, pilot, accuracy, 1);
    if (next === undefined) {
      const attempt = await attemptAt(plan, design, pilot, accuracy, held, options);
      const last = attempt.outcomes[attempt.outcomes.length - 1].outcome;
      next = held ? undefined : prolonged(design, plan, last, accuracy, SLACK);
      if (next === undefined) return summary(design, plan, attempt, accuracy, held);
    }
    plan = next;
  }
}

/** One whole calculation on the plan's grid, refined so many times. */
async function outcomeOn(
  plan: ClosedPlan,
  design: Design,
  refinement: number,
  options: StudyOptions,
): Promise<Outcome> {
  const points = alignedPoints(plan.stretches, refinement);
  refuseTooLarge(design, points, plan.steps, BRING_CLOSER);
  options.onProgress?.(`Crank-Nicolson, ${points} points, to ${plan.end.toPrecision(3)} fs`);
  const system = {
    grid: alignedGrid(plan.stretches, refinement),
    potential: design.potential,
    particleMass: design.particleMass,
    referenceEnergy: plan.clock.reference,
  };
  const stepper = crankNicolson.prepare(system, plan.timeStep, plan.order);
  return runToEnd(stepper, plan.from, plan.steps, undefined, options);
}

interface Attempt {
  readonly outcomes: readonly { readonly refinement: number; readonly outcome: Outcome }[];
  readonly transmission: Extrapolation;
  readonly reflection: Extrapolation;
  readonly atMean: Extrapolation;
  /** What the spacing leaves of the transmission. */
  readonly spacing: number;
}

/** Refines until the bound is met, or until a calculation shows that a later end is needed and can be had. */
async function attemptAt(
  plan: ClosedPlan,
  design: Design,
  pilot: Outcome,
  accuracy: number,
  held: boolean,
  options: StudyOptions,
): Promise<Attempt> {
  const transmission = new Extrapolation();
  const reflection = new Extrapolation();
  const atMean = new Extrapolation();
  const bound = new SpacingBound(plan.from, accuracy, plan.end);
  let spacing = 1;
  const outcomes: { refinement: number; outcome: Outcome }[] = [];
  for (const refinement of plan.forced ? [1] : REFINEMENTS) {
    const points = alignedPoints(plan.stretches, refinement);
    // Two calculations are the fewest that give a bound; one alone had better be refused by its size.
    if (outcomes.length > 0 && points * plan.steps > WORK_LIMIT) break;
    if (outcomes.length > 1 && points > POINTS_LIMIT) break;
    const outcome =
      refinement === REFINEMENTS[0] ? pilot : await outcomeOn(plan, design, refinement, options);
    outcomes.push({ refinement, outcome });
    const t = transmission.add(1 / refinement, outcome.transmitted);
    reflection.add(1 / refinement, outcome.reflected);
    spacing = bound.add(1 / refinement, outcome);
    atMean.add(1 / refinement, outcome.transmissionAt(plan.from.energy) ?? 0);
    if (!held && prolonged(design, plan, outcome, accuracy, SLACK)) break;
    // Where too much remains for good, the grid need not be better than that.
    const goal = SPACING_SHARE * Math.max(accuracy * t.value, outcome.unfinished, roundingFloor(plan.steps));
    if (spacing <= goal && outcomes.length >= FEWEST_CALCULATIONS) break;
  }
  return { outcomes, transmission, reflection, atMean, spacing };
}

/**
 * Probability that rounding makes up behind a barrier: every step adds noise of relative amplitude eps at all wavenumbers, and what of it lies
 * above the barrier's top gets through. Measured behind barriers of 0.4 to 3 eV that let nothing else pass: up to 1.7 eps^2 a step.
 */
function roundingFloor(steps: number): number {
  return 8 * Number.EPSILON ** 2 * steps;
}

/** Weight with which an extrapolation over refined grids adds up the noise of single calculations, twice over for amplitudes in a probability. */
const NOISE_WEIGHT = 20;

/**
 * Relative rounding of a transmission that is carried by a tail of the packet: every step adds noise eps over the whole band of the grid, from which
 * the wave at the carrying energy stands out by |phi(k)|^2 alone. Measured between eight and nine spreads from the mean, on boxes of different length: up to 1e-6 of T.
 */
function roundedTail(plan: ClosedPlan, carrying: number): number {
  const { k0, mass, near, packet } = plan.from;
  const k = wavenumberOf(Math.max(0, carrying - near), mass);
  const band = Math.PI / extent(plan, 1).widest;
  const noise = (Number.EPSILON ** 2 * plan.steps) / band;
  return NOISE_WEIGHT * Math.sqrt(noise / wavenumberWeight(k, k0, packet.width));
}

/** What may remain: its share of the error asked for, or what nobody could tell from rounding, which a growth over a tenth of the time enlarges tenfold. */
function tolerated(outcome: Outcome, accuracy: number, steps: number): number {
  return Math.max(REMAINING_SHARE * accuracy * outcome.transmitted, 10 * roundingFloor(steps));
}

/** A plan with a later end when too much remained, unless the end or the box is the user's or the work would grow past all measure. */
function prolonged(
  design: Design,
  plan: ClosedPlan,
  outcome: Outcome,
  accuracy: number,
  slack: number,
): ClosedPlan | undefined {
  const { end, length } = design.numerics;
  const limit = tolerated(outcome, accuracy, plan.steps);
  // In a box of the user's own length more would come back from its ends.
  if (end !== undefined || length !== undefined || !(outcome.unfinished > slack * limit)) return undefined;
  // On a refined grid nothing is learnt from what may be rounding alone.
  if (slack > 1 && limit > REMAINING_SHARE * accuracy * outcome.transmitted) return undefined;
  const next = planClosed(design, plan.end * prolongation(outcome, limit));
  const points = alignedPoints(next.stretches, REFINEMENTS[0]);
  return points > POINTS_LIMIT || points * next.steps > WORK_LIMIT / 4 ? undefined : next;
}

/** Factor on the end that should do if what is inside goes on decaying as it did over the last tenth of the time. */
function prolongation(outcome: Outcome, limit: number): number {
  const rate = Math.log(outcome.insideBefore / outcome.inside) / LAST_PART;
  const factor = 1.1 + Math.log(outcome.unfinished / limit) / rate;
  return rate > 0 ? Math.min(MOST_PROLONGATION, Math.max(LEAST_PROLONGATION, factor)) : MOST_PROLONGATION;
}

function summary(
  design: Design,
  plan: ClosedPlan,
  attempt: Attempt,
  accuracy: number,
  held: boolean,
): Calculation {
  const { outcomes, transmission, reflection, spacing } = attempt;
  const { outcome, refinement } = outcomes[outcomes.length - 1];
  const t = transmission.result;
  const r = reflection.result;
  const drift = Math.max(...outcomes.map((o) => o.outcome.drift));
  // Each calculation carries the drift of its norm as a relative error; the extrapolation adds them with weights below 30.
  const rounding = Math.min(1, 30 * (drift + Number.EPSILON * Math.sqrt(plan.steps)));
  const small = Math.min(1, Math.max(0, Math.min(t.value, r.value)));
  // Shares of one norm: the larger is what the smaller leaves, with an error no larger.
  const [value, reflected] = t.value < r.value ? [small, 1 - small] : [1 - small, small];
  const floor = roundingFloor(plan.steps);
  // Into a weak reflection the noise of the strong wave gets without a barrier between: amplitudes add.
  const mixed = value > reflected ? 2 * Math.sqrt(small * floor) : 0;
  const carrying = carryingEnergy(outcome, plan.from, outcomes[Math.min(1, outcomes.length - 1)].outcome);
  const tail = Math.min(1, value * roundedTail(plan, carrying));
  const roundOff = small * rounding + mixed + floor + tail;
  const remaining = outcome.unfinished;
  const start = startError(plan.from, value);
  const error = spacing + remaining + start + roundOff;
  const asLarger = (x: number) => (x === small ? 0 : 2 * Number.EPSILON);
  const { widest, finest, length } = extent(plan, refinement);
  return {
    stepper: crankNicolson.name,
    order: plan.order,
    transmission: { value, error: error + asLarger(value) },
    reflection: { value: reflected, error: error + asLarger(reflected) },
    remaining,
    normDrift: drift,
    grid: {
      points: alignedPoints(plan.stretches, refinement),
      step_nm: widest,
      finest_nm: finest,
      length_nm: length,
    },
    time: { step_fs: plan.timeStep, end_fs: plan.end, steps: plan.steps },
    parts: { spacing, timeStep: 0, remaining, start, roundOff },
    runs: outcomes.map(
      (o): RunSummary => ({
        points: alignedPoints(plan.stretches, o.refinement),
        step_nm: (widest * refinement) / o.refinement,
        timeStep_fs: plan.timeStep,
        transmission: o.outcome.transmitted,
      }),
    ),
    atMeanEnergy: boundedAtMean(
      attempt.atMean.result.value,
      Math.min(1, attempt.atMean.result.error),
      outcome,
      plan.from,
      structureLength(design.potential),
    ),
    carryingEnergy: carrying,
    checks: [
      ...commonChecks(plan.from, outcome, drift, accuracy, value, held),
      atMost(
        "spacing",
        relativeError(spacing, t.value),
        accuracy,
        "relative error left by the grid, from whole calculations on refined grids",
      ),
    ],
  };
}
