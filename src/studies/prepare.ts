import { alignedGrid, alignedPoints, alignedStretches, forcedStretches } from "../grid/aligned.js";
import { circleGrid, firstSpacing, largestTimeStep, refined } from "../grid/circle.js";
import { type Departure, departure, passage, roomFor } from "../grid/journey.js";
import { sampleGaussian } from "../packets/gaussian.js";
import { DEFAULT_ACCURACY, type Design } from "../problem/design.js";
import type { Run } from "../propagate.js";
import { crankNicolson } from "../steppers/crank-nicolson.js";
import { stepperNamed } from "../steppers/registry.js";
import { splitOperator } from "../steppers/split-operator.js";
import type { Stepper } from "../steppers/stepper.js";
import { HBAR } from "../units/constants.js";
import { chooseStepper } from "./choose-stepper.js";
import { largestDrift, untouchedCircle } from "./circle-plan.js";
import { structureLength } from "./common-checks.js";
import { type ConfinedMotion, confinedMotion } from "./confined.js";
import { forcedRoom } from "./forced.js";
import { BRING_CLOSER, DesignLimitError, refuseTooLarge } from "./limits.js";

/** Order of the Crank-Nicolson step where the time itself must be right. */
const TRUE_TIME_ORDER = 6;
/** Turn of the phase per step, (E - E_ref) dt / hbar, at the edge of the packet, by order. */
const PHASE_PER_STEP: Readonly<Record<number, number>> = { 2: 0.05, 4: 0.4, 6: 0.8 };
/** The same for the split operator, in units of the kinetic energy at the edge. */
const SPLIT_PHASE: Readonly<Record<number, number>> = { 2: 0.05, 4: 0.4, 6: 0.8 };
/** Fewest steps of a run that is to be looked at. */
const FEWEST_STEPS = 480;
/** Steps come in multiples of this, so that coarser twins pass through the same instants. */
const STEP_MULTIPLE = 40;
/** Refinement of the interface-aligned grid: a phase of 0.13 per cell at the packet's edge. */
const REFINEMENT = 6;
/** Spreads of k to either side that have passed when a run ends. */
const PASSED_SPREADS = 3;

/** A run whose own time is right, with the facts that a reader of its results needs. */
export interface PreparedRun extends Run {
  readonly from: Departure;
  readonly end: number;
}

export interface PrepareOptions {
  /** End of the run, fs; automatic when absent. */
  readonly end?: number;
  /** Factor on the automatic number of cells (default 1) and on the number of steps: 0.5 gives the coarser twin. */
  readonly fineness?: number;
  readonly stepFineness?: number;
}

/**
 * Makes a run of the design's packet ready whose time error is small (order 6 in the Crank-Nicolson step, or the split operator), on a grid
 * whose ends nothing reaches: for series, maps and whatever a caller records. The transmission with its bound comes from `estimate`.
 * @throws DesignLimitError when the design cannot be computed as written
 */
export function prepare(design: Design, options: PrepareOptions = {}): PreparedRun {
  const { potential, numerics } = design;
  const name = chooseStepper(design, numerics.accuracy ?? DEFAULT_ACCURACY);
  const refusal = stepperNamed(name)?.refusal(potential);
  if (refusal) throw new DesignLimitError("numerics.stepper", refusal);
  const motion = potential.confining ? confinedMotion(design) : undefined;
  const from = motion?.from ?? departure(design);
  const end = numerics.end ?? options.end ?? motion?.end ?? automaticEnd(design, from);
  const stepper =
    name === splitOperator.name
      ? splitRun(design, from, end, motion, options)
      : closedRun(design, from, end, motion, options);
  const steps = Math.max(1, Math.round(end / stepper.timeStep));
  const n = stepper.system.grid.x.length;
  const psi = new Float64Array(2 * n);
  sampleGaussian(psi, stepper.system.grid.x, from.packet);
  return { stepper, psi, steps, from, end: steps * stepper.timeStep };
}

function automaticEnd(design: Design, from: Departure): number {
  const reach = from.distance + structureLength(design.potential) + PASSED_SPREADS * design.packet.width;
  return passage(from, reach, { kind: "exact" }, PASSED_SPREADS);
}

/** Time step that divides the end: as asked for, or at most `largest` and short enough for FEWEST_STEPS. */
function timeStepFor(design: Design, end: number, largest: number, fineness = 1): number {
  const asked = design.numerics.timeStep;
  const step = asked ?? Math.min(largest, end / FEWEST_STEPS);
  const multiple = STEP_MULTIPLE * fineness;
  return end / (multiple * Math.max(1, Math.ceil(end / step / STEP_MULTIPLE - 1e-9)));
}

function closedRun(
  design: Design,
  from: Departure,
  end: number,
  motion: ConfinedMotion | undefined,
  options: PrepareOptions,
): Stepper {
  const { potential, numerics, particleMass } = design;
  const stretches =
    motion?.stretches ??
    alignedStretches(
      potential,
      from,
      forcedRoom(design, from, roomFor(from, end, { kind: "exact" }, "untouched")),
    );
  const length = stretches[stretches.length - 1].to - stretches[0].from;
  const step = numerics.step ?? (numerics.points === undefined ? undefined : length / (numerics.points - 1));
  const fineness = options.fineness ?? 1;
  const [chosen, refinement] =
    step === undefined
      ? [stretches, REFINEMENT * fineness]
      : [forcedStretches(stretches, step / fineness), 1];
  const order = numerics.order ?? TRUE_TIME_ORDER;
  const largest =
    (PHASE_PER_STEP[order] * HBAR) / Math.max(from.highest - from.energy, from.energy - from.lowest);
  const timeStep = timeStepFor(design, end, largest, options.stepFineness);
  refuseTooLarge(design, alignedPoints(chosen, refinement), Math.round(end / timeStep), BRING_CLOSER);
  const grid = alignedGrid(chosen, refinement);
  const system = { grid, potential, particleMass, referenceEnergy: from.energy };
  return crankNicolson.prepare(system, timeStep, order);
}

function splitRun(
  design: Design,
  from: Departure,
  end: number,
  motion: ConfinedMotion | undefined,
  options: PrepareOptions,
): Stepper {
  const { potential, numerics, particleMass } = design;
  const whole =
    motion?.circle(numerics.points, numerics.step) ??
    untouchedCircle(design, from, end, firstSpacing(potential, from) / 2);
  const circle = refined(whole, Math.round(Math.log2(options.fineness ?? 1)));
  const jumps = potential.slopeTransform !== undefined;
  const order = numerics.order ?? (jumps ? 2 : 6);
  const top = Math.max(
    from.highest - potential.lowest,
    potential.confining ? 0 : potential.highest - potential.lowest,
  );
  const largest = Math.min(
    (SPLIT_PHASE[order] * HBAR) / top,
    jumps ? largestTimeStep(circle.step, particleMass, largestDrift(order)) : Number.POSITIVE_INFINITY,
  );
  const timeStep = timeStepFor(design, end, largest, options.stepFineness);
  refuseTooLarge(design, circle.points, Math.round(end / timeStep), "use crank-nicolson");
  return splitOperator.prepare({ grid: circleGrid(circle), potential, particleMass }, timeStep, order);
}
