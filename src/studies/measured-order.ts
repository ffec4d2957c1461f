import { alignedGrid } from "../grid/aligned.js";
import { type Circle, circleGrid, refined } from "../grid/circle.js";
import type { Grid } from "../grid/grid.js";
import { trigonometricValues } from "../numerics/trigonometric.js";
import { sampleGaussian } from "../packets/gaussian.js";
import { hasPoint } from "../potentials/points.js";
import type { Design } from "../problem/design.js";
import { propagate } from "../propagate.js";
import { crankNicolson } from "../steppers/crank-nicolson.js";
import { splitOperator } from "../steppers/split-operator.js";
import type { Stepper, StepperDefinition } from "../steppers/stepper.js";
import { HBAR } from "../units/constants.js";
import type { StudyOptions } from "./calculation.js";
import { fastestRate } from "./circle-plan.js";
import { COMMON_REFINEMENT, type MatchedPlan } from "./matched-plan.js";
import { distance } from "./motion.js";

/** A convergence order found by halving, beside the declared one. */
export interface MeasuredOrder {
  readonly stepper: string;
  /** What is halved. */
  readonly of: "time step" | "spacing";
  /** Order of the stepper in the time step. */
  readonly order: number;
  /** The power that the error should fall with; undefined where it should fall faster than any power. */
  readonly declared: number | undefined;
  /** log2 of the ratio of the last two changes that are more than rounding; undefined where there are none. */
  readonly measured: number | undefined;
  /** Changes of the state (L2) from one halving to the next. */
  readonly changes: readonly number[];
  /** True when the last change is no larger than rounding, so that nothing more can be measured. */
  readonly roundOff: boolean;
  readonly passed: boolean;
}

/** The measured power may fall short of the declared one by so much: the next term of the error still shows. */
export const ORDER_TOLERANCE = 0.3;
/** On a grid the power is erratic where V has jumps, as they lie anywhere between its nodes. */
const ERRATIC_TOLERANCE = 0.5;
/** Faster than any power is taken for shown by this power, which no method of finite order here has. */
export const SPECTRAL_POWER = 6;
/** Changes of the state that rounding can make up in these runs. */
const ROUNDING = 1e-11;
/** Change of the state on halving the spacing below which the coarser circle counts as fine enough for order 6. */
const RESOLVED = 1e-7;
const MOST_RUNS = 5;
/** Turn of the phase in the first step at the packet's edge (Crank-Nicolson), or at the splitting's fastest rate, by order. */
const CLOSED_PHASES: Readonly<Record<number, number>> = { 2: 0.5, 6: 3 };
const CIRCLE_PHASES: Readonly<Record<number, number>> = { 2: 0.8, 6: 1.6 };
/** On a circle the L2 error of a state falls like so much where V jumps (weight beyond the band, |psi_k| ~ k^-3) or has a point (as T does). */
const JUMP_ORDER = 2.5;
const POINT_ORDER = 1;

/**
 * Measures the orders of both steppers on a run to the instant at which the packet's centre meets the structure: the time step is halved on one
 * grid, the spacing at one time step. Cost: some ten short runs a stepper.
 */
export async function measuredOrders(
  design: Design,
  plan: MatchedPlan,
  options: StudyOptions,
): Promise<MeasuredOrder[]> {
  const end = (plan.from.distance * plan.from.mass) / (HBAR * plan.from.k0);
  const run = runner(plan, end, options);
  const closed = await closedOrders(design, plan, end, run);
  return splitOperator.refusal(design.potential)
    ? closed
    : [...closed, ...(await circleOrders(design, plan, end, run))];
}

/** The state at the end, and the grid that it lives on. */
type Runner = (
  prepare: (timeStep: number) => Stepper,
  steps: number,
) => Promise<{ psi: Float64Array; grid: Grid }>;

function runner(plan: MatchedPlan, end: number, options: StudyOptions): Runner {
  return async (prepare, steps) => {
    const stepper = prepare(end / steps);
    const { grid } = stepper.system;
    const psi = new Float64Array(2 * grid.x.length);
    sampleGaussian(psi, grid.x, plan.from.packet);
    const text = `measured order, ${stepper.definition.name}, ${steps} steps`;
    await propagate({ stepper, psi, steps }, [], {
      signal: options.signal,
      onProgress: (done, total) => options.onProgress?.(text, done / total),
    });
    return { psi, grid };
  };
}

async function closedOrders(
  design: Design,
  plan: MatchedPlan,
  end: number,
  run: Runner,
): Promise<MeasuredOrder[]> {
  const { from, closed } = plan;
  const { potential, particleMass } = design;
  const prepareOn = (refinement: number, order: number) => (timeStep: number) =>
    crankNicolson.prepare(
      {
        grid: alignedGrid(closed.stretches, refinement),
        potential,
        particleMass,
        referenceEnergy: from.energy,
      },
      timeStep,
      order,
    );
  const edge = Math.max(from.highest - from.energy, from.energy - from.lowest) / HBAR;
  const orders: MeasuredOrder[] = [];
  for (const order of [2, closed.order]) {
    const first = Math.ceil((end * edge) / CLOSED_PHASES[order]);
    orders.push(await timeOrder(crankNicolson, order, first, run, prepareOn(COMMON_REFINEMENT, order)));
  }
  const steps = Math.ceil((end * closed.steps) / plan.end);
  const states: Float64Array[] = [];
  const common = alignedGrid(closed.stretches, COMMON_REFINEMENT);
  for (const factor of [1, 2, 4]) {
    const { psi } = await run(prepareOn(COMMON_REFINEMENT * factor, closed.order), steps);
    states.push(every(psi, factor));
  }
  return [...orders, spacingOrder(crankNicolson, closed.order, 2, ORDER_TOLERANCE, common, states)];
}

async function circleOrders(
  design: Design,
  plan: MatchedPlan,
  end: number,
  run: Runner,
): Promise<MeasuredOrder[]> {
  const { circle, order } = plan.circle;
  const { potential, particleMass } = design;
  const prepareOn = (on: Circle, of: number) => (timeStep: number) =>
    splitOperator.prepare({ grid: circleGrid(on), potential, particleMass }, timeStep, of);
  const share = end / plan.end;
  const steps = Math.ceil(share * plan.circle.steps * (plan.jumps ? 4 : 1));
  const common = alignedGrid(plan.closed.stretches, COMMON_REFINEMENT);
  const states: Float64Array[] = [];
  // What is spectral shows on coarser circles, where it is not yet rounding.
  for (const s of plan.jumps ? [-1, 0, 1] : [-2, -1, 0]) {
    const on = refined(circle, s);
    const { psi } = await run(prepareOn(on, order), steps);
    states.push(trigonometricValues(psi, on.first, on.step, common.x));
  }
  const declared = plan.jumps ? (hasPoint(potential) ? POINT_ORDER : JUMP_ORDER) : undefined;
  const spacing = spacingOrder(splitOperator, order, declared, ERRATIC_TOLERANCE, common, states);
  // Order 2 shows on a coarse circle as well, at a fraction of the cost. Order 6 rests on [V, [V, [V, T]]] = 0, which holds for what the grid resolves:
  // on a circle too coarse it was seen to fall to 4, at changes of 1e-9.
  const resolved = spacing.changes[spacing.changes.length - 1] < RESOLVED;
  const firstSteps = (of: number) =>
    Math.ceil(
      plan.jumps
        ? (share * plan.circle.steps) / 4
        : (end * fastestRate(design, plan.from)) / CIRCLE_PHASES[of],
    );
  const orders: MeasuredOrder[] = [];
  for (const of of new Set([2, order])) {
    const on = of === 2 || resolved ? refined(circle, -1) : circle;
    orders.push(await timeOrder(splitOperator, of, firstSteps(of), run, prepareOn(on, of)));
  }
  return [...orders, spacing];
}

/** Halves the time step until the declared order shows, or rounding does, or enough has been tried. */
async function timeOrder(
  { name }: StepperDefinition,
  order: number,
  first: number,
  run: Runner,
  prepare: (timeStep: number) => Stepper,
): Promise<MeasuredOrder> {
  const changes: number[] = [];
  let before: Float64Array | undefined;
  let measured: number | undefined;
  for (let i = 0; i < MOST_RUNS; i++) {
    const { psi, grid } = await run(prepare, first * 2 ** i);
    if (before) changes.push(distance(grid, psi, before));
    before = psi;
    const rounded = (changes.at(-1) ?? 1) < ROUNDING;
    // A ratio with rounding in it says nothing where there is one without.
    if (changes.length > 1 && !rounded) measured = power(changes);
    if (rounded) break;
    if (measured !== undefined && Math.abs(measured - order) <= ORDER_TOLERANCE) break;
  }
  return judged(
    { stepper: name, of: "time step", order, declared: order, measured, changes },
    ORDER_TOLERANCE,
  );
}

function spacingOrder(
  { name }: StepperDefinition,
  order: number,
  declared: number | undefined,
  tolerance: number,
  common: Grid,
  states: readonly Float64Array[],
): MeasuredOrder {
  const changes = states.slice(1).map((state, i) => distance(common, state, states[i]));
  return judged(
    { stepper: name, of: "spacing", order, declared, measured: power(changes), changes },
    tolerance,
  );
}

const power = (changes: readonly number[]): number =>
  Math.log2(changes[changes.length - 2] / changes[changes.length - 1]);

function judged(found: Omit<MeasuredOrder, "roundOff" | "passed">, tolerance: number): MeasuredOrder {
  const roundOff = found.changes[found.changes.length - 1] < ROUNDING;
  const least = found.declared === undefined ? SPECTRAL_POWER : found.declared - tolerance;
  return { ...found, roundOff, passed: roundOff || (found.measured ?? 0) >= least };
}

/** Every so many nodes of an interleaved state. */
function every(psi: Float64Array, stride: number): Float64Array {
  const n = (psi.length / 2 - 1) / stride + 1;
  const out = new Float64Array(2 * n);
  for (let j = 0; j < n; j++) {
    out[2 * j] = psi[2 * j * stride];
    out[2 * j + 1] = psi[2 * j * stride + 1];
  }
  return out;
}
