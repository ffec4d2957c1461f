import { alignedGrid } from "../grid/aligned.js";
import type { Grid } from "../grid/grid.js";
import { departure } from "../grid/journey.js";
import { hasPoint } from "../potentials/points.js";
import { DEFAULT_ACCURACY, type Design } from "../problem/design.js";
import { packetAverage } from "../stationary/packet-average.js";
import { stationaryRefusal } from "../stationary/refusal.js";
import { crankNicolson } from "../steppers/crank-nicolson.js";
import { splitOperator } from "../steppers/split-operator.js";
import type { StepperDefinition } from "../steppers/stepper.js";
import type { StudyOptions } from "./calculation.js";
import { circleMotion } from "./circle-motion.js";
import { closedMotion } from "./closed-motion.js";
import { type ComposedState, composedState } from "./composed-state.js";
import { type CrosscheckCheck, crosscheckChecks } from "./crosscheck-checks.js";
import { type Estimate, estimate } from "./estimate.js";
import { isForced } from "./forced.js";
import { DesignLimitError } from "./limits.js";
import { COMMON_REFINEMENT, INSTANTS, planMatched } from "./matched-plan.js";
import { type MeasuredOrder, measuredOrders } from "./measured-order.js";
import { distance, type Motion, stateError } from "./motion.js";
import { type StateDistance, WITNESS, type WitnessAnswer } from "./second-opinions.js";

/** Accuracy that the split operator is asked for where V has jumps or points: more takes it minutes, and its bound says what it reached. */
const JUMP_ACCURACY = 1e-3;
const POINT_ACCURACY = 2e-2;
/** Its work (points times transforms): some seconds. */
const WORK = 3e8;

/** Both steppers and the stationary witness on one design. */
export interface Crosscheck {
  readonly design: { readonly title: string; readonly sha256: string };
  /** Relative accuracy asked of the steppers' own best estimates. */
  readonly accuracy: number;
  /** Each stepper's own best estimate, on its own grid. */
  readonly steppers: readonly Estimate[];
  /** Steppers that cannot do this design, and why. */
  readonly refused: readonly { readonly name: string; readonly reason: string }[];
  readonly witness: WitnessAnswer;
  /** The first two of the three that there are: both steppers, or the one that can and the witness. */
  readonly difference: {
    readonly between: readonly [string, string];
    readonly transmission: number;
    readonly reflection: number;
    /** L2 distance of the two states at the end of the matched runs, global phase kept; outside the structure where one is the witness's. */
    readonly state: number;
  };
  /** The same motion by every method, on matched settings. */
  readonly matched: {
    readonly end_fs: number;
    readonly instants: number;
    readonly motions: readonly Motion[];
    readonly composed: { readonly error: number; readonly waves: number };
    readonly states: readonly StateDistance[];
  };
  readonly orders: readonly MeasuredOrder[];
  /** From the most basic to the most derived. */
  readonly checks: readonly CrosscheckCheck[];
  /** True when every comparison lies within the sum of its two bounds. */
  readonly agree: boolean;
  /** When they do not agree: the first check, in their order, that does not pass, in words. */
  readonly firstDisagreement?: string;
  readonly notes: readonly string[];
}

/**
 * Holds both steppers against each other and against the stationary witness: each stepper's own best estimate, the same motion on matched
 * settings with the final states compared as L2 distances (global phase kept), and convergence orders.
 * A stepper named in the design makes no difference: both are taken. `agree` is by the bounds alone.
 * @throws DesignLimitError when the design confines the packet or cannot be computed as written; rejects with the signal's reason when stopped
 * Cost: two estimates, some twenty whole runs on matched settings, some thousand stationary waves.
 */
export async function crosscheck(design: Design, options: StudyOptions = {}): Promise<Crosscheck> {
  const { potential, particleMass } = design;
  const refusal = potential.confining ? undefined : stationaryRefusal(potential);
  if (refusal) throw new DesignLimitError("potential", refusal);
  const accuracy = design.numerics.accuracy ?? DEFAULT_ACCURACY;
  const steppers = [await ownBest(design, crankNicolson, accuracy, options)];
  const reason = splitOperator.refusal(potential);
  if (!reason) steppers.push(await ownBest(design, splitOperator, accuracy, options));
  options.onProgress?.("stationary witness");
  const average = packetAverage(potential, particleMass, departure(design).packet);
  const witness: WitnessAnswer = {
    name: WITNESS,
    transmission: average.transmission,
    reflection: average.reflection,
    energies: average.energies,
  };
  const plan = planMatched(design);
  const common = alignedGrid(plan.closed.stretches, COMMON_REFINEMENT);
  const motions = [await closedMotion(design, plan, options)];
  if (!reason) motions.push(await circleMotion(design, plan, common, options));
  const composed = await composedState(design, plan, common, options);
  const states = stateDistances(motions, composed, common, potential.faces);
  const orders = await measuredOrders(design, plan, options);
  const checks = crosscheckChecks({ from: plan.from, steppers, witness, motions, states, orders });
  const agree = checks.every(({ kind, passed }) => kind !== "comparison" || passed);
  const [first, second] = [steppers[0], steppers[1] ?? witness];
  return {
    design: { title: design.title, sha256: design.sha256 },
    accuracy,
    steppers,
    refused: reason ? [{ name: splitOperator.name, reason }] : [],
    witness,
    difference: {
      between: [first.stepper, steppers[1]?.stepper ?? WITNESS],
      transmission: Math.abs(first.transmission.value - second.transmission.value),
      reflection: Math.abs(first.reflection.value - second.reflection.value),
      state: states[0].distance,
    },
    matched: {
      end_fs: plan.end,
      instants: INSTANTS + 1,
      motions,
      composed: { error: composed.error, waves: composed.waves },
      states,
    },
    orders,
    checks,
    agree,
    ...(agree ? {} : { firstDisagreement: firstFailure(checks) }),
    notes: notesOf(design, steppers),
  };
}

/** A stepper's own best estimate: at the accuracy asked for, or at what it can do in a sensible time. */
function ownBest(
  design: Design,
  stepper: StepperDefinition,
  accuracy: number,
  options: StudyOptions,
): Promise<Estimate> {
  const { order, ...numerics } = design.numerics;
  const offered = order !== undefined && stepper.orders.includes(order) ? { order } : {};
  const hard = stepper === splitOperator && design.potential.slopeTransform !== undefined;
  const least = hard ? (hasPoint(design.potential) ? POINT_ACCURACY : JUMP_ACCURACY) : 0;
  return estimate(
    {
      ...design,
      numerics: { ...numerics, ...offered, stepper: stepper.name, accuracy: Math.max(accuracy, least) },
    },
    { ...options, work: WORK },
  );
}

/** Steppers against each other first, then each against the witness, which knows the state outside the structure only. */
function stateDistances(
  motions: readonly Motion[],
  composed: ComposedState,
  common: Grid,
  [left, right]: readonly [number, number],
): StateDistance[] {
  const distances: StateDistance[] = [];
  if (motions.length > 1)
    distances.push({
      between: [motions[0].name, motions[1].name],
      where: "everywhere",
      distance: distance(common, motions[0].state, motions[1].state),
      limit: stateError(motions[0]) + stateError(motions[1]),
    });
  const slack = 1e-6 * common.finest;
  const outside = {
    ...common,
    weight: common.weight.map((w, j) => (common.x[j] < left - slack || common.x[j] > right + slack ? w : 0)),
  };
  for (const motion of motions)
    distances.push({
      between: [motion.name, WITNESS],
      where: "outside the structure",
      distance: distance(outside, motion.state, composed.state),
      limit: stateError(motion) + composed.error,
    });
  return distances;
}

function firstFailure(checks: readonly CrosscheckCheck[]): string | undefined {
  const first = checks.find(({ passed }) => !passed);
  return first && `${first.name}: ${first.explanation}`;
}

function notesOf({ numerics, potential }: Design, steppers: readonly Estimate[]): string[] {
  const notes: string[] = [];
  if (numerics.stepper !== undefined)
    notes.push(`The design names ${numerics.stepper}; a crosscheck takes every stepper that can do it.`);
  if (isForced(numerics))
    notes.push("Numerics are forced: they are used for the estimates; the matched runs choose their own.");
  if (potential.slopeTransform && steppers.length > 1)
    notes.push(
      "The split operator holds a potential with jumps only as far as the band of its grid goes: it is asked for what it reaches in some seconds, and its bound says how much that is.",
    );
  return notes;
}
