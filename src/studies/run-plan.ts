import {
  alignedGrid,
  alignedPoints,
  alignedStretches,
  forcedStretches,
  type Stretch,
} from "../grid/aligned.js";
import { circleGrid, firstSpacing, largestTimeStep, refined } from "../grid/circle.js";
import type { Grid } from "../grid/grid.js";
import { type Departure, departure, passage, roomFor } from "../grid/journey.js";
import { DEFAULT_ACCURACY, type Design } from "../problem/design.js";
import { MOST_EIGENSTATES } from "../steppers/eigenstates.js";
import type { StepperDefinition } from "../steppers/stepper.js";
import { HBAR } from "../units/constants.js";
import { chosenStepper } from "./choose-stepper.js";
import { largestDrift, pairsPerStep, untouchedCircle } from "./circle-plan.js";
import { structureLength } from "./common-checks.js";
import { type ConfinedMotion, confinedMotion } from "./confined.js";
import { forcedRoom } from "./forced.js";
import { BRING_CLOSER, DesignLimitError, refuseTooLarge, SIZE_KEYS } from "./limits.js";

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
/** The least that it is lowered to for the sake of a stepper that cannot take many points: four times the error. */
const LEAST_REFINEMENT = 3;
/** Points suggested where eigenstates would be too many: every stretch may round its own share up. */
const SUGGESTED_POINTS = 4000;
/** Spreads of k to either side that have passed when a run ends. */
const PASSED_SPREADS = 3;
/** Work of an eigenstate step on a node, in implicit steps' per node of the grid: 8 operations against some thirty. Measured: 0.25 to 0.4. */
const EIGENSTATE_EFFORT = 0.3;

export interface PrepareOptions {
  /** End of the run, fs; automatic when absent. */
  readonly end?: number;
  /** Factor on the automatic number of cells (default 1) and on the number of steps: 0.5 gives the coarser twin. */
  readonly fineness?: number;
  readonly stepFineness?: number;
}

/** All that is fixed before anything is allocated for a run in true time. */
export interface RunPlan {
  readonly definition: StepperDefinition;
  readonly from: Departure;
  /** Undefined for a stepper that is exact in time. */
  readonly order: number | undefined;
  /** fs */
  readonly timeStep: number;
  readonly steps: number;
  readonly points: number;
  /** Length of the box, nm. */
  readonly length: number;
  readonly makeGrid: () => Grid;
}

/** What is known of a run before its grid. */
interface Motion {
  readonly definition: StepperDefinition;
  readonly from: Departure;
  readonly end: number;
  readonly confined: ConfinedMotion | undefined;
}

/**
 * Plans a run of the design's packet in true time, by any stepper, on a grid whose ends nothing reaches.
 * @throws DesignLimitError when the design cannot be computed as written
 */
export function planRun(design: Design, options: PrepareOptions = {}): RunPlan {
  const { potential, numerics } = design;
  const definition = chosenStepper(design, numerics.accuracy ?? DEFAULT_ACCURACY);
  const confined = potential.confining ? confinedMotion(design) : undefined;
  const from = confined?.from ?? departure(design);
  const end = numerics.end ?? options.end ?? confined?.end ?? automaticEnd(design, from);
  const motion = { definition, from, end, confined };
  return definition.grid === "periodic"
    ? planOnCircle(design, motion, options)
    : planBetweenEnds(design, motion, options);
}

function automaticEnd(design: Design, from: Departure): number {
  const reach = from.distance + structureLength(design.potential) + PASSED_SPREADS * design.packet.width;
  return passage(from, reach, { kind: "exact" }, PASSED_SPREADS);
}

/** Time step that divides the end: as asked for, or at most `largest` and short enough for FEWEST_STEPS; and how many of them. */
function stepping(
  design: Design,
  end: number,
  largest: number,
  fineness = 1,
): { timeStep: number; steps: number } {
  const step = design.numerics.timeStep ?? Math.min(largest, end / FEWEST_STEPS);
  const steps = STEP_MULTIPLE * fineness * Math.max(1, Math.ceil(end / step / STEP_MULTIPLE - 1e-9));
  return { timeStep: end / steps, steps: Math.max(1, Math.round(steps)) };
}

function planBetweenEnds(design: Design, motion: Motion, options: PrepareOptions): RunPlan {
  const { potential, numerics } = design;
  const { definition, from, end, confined } = motion;
  const unforced =
    confined?.stretches ??
    alignedStretches(
      potential,
      from,
      forcedRoom(design, from, roomFor(from, end, { kind: "exact" }, "untouched")),
    );
  const length = unforced[unforced.length - 1].to - unforced[0].from;
  const step = numerics.step ?? (numerics.points === undefined ? undefined : length / (numerics.points - 1));
  const exact = definition.defaultOrder === "exact";
  const refinement = exact ? affordable(unforced) : REFINEMENT;
  const fineness = options.fineness ?? 1;
  const stretches = step === undefined ? unforced : forcedStretches(unforced, step / fineness);
  const cells = step === undefined ? refinement * fineness : 1;
  const points = alignedPoints(stretches, cells);
  if (exact) refuseTooMany(design, definition, points);
  const order = exact ? undefined : (numerics.order ?? TRUE_TIME_ORDER);
  const largest =
    order === undefined
      ? Number.POSITIVE_INFINITY
      : (PHASE_PER_STEP[order] * HBAR) / Math.max(from.highest - from.energy, from.energy - from.lowest);
  const { timeStep, steps } = stepping(design, end, largest, options.stepFineness);
  const effort = exact ? EIGENSTATE_EFFORT * points : 1;
  refuseTooLarge(design, points, steps, BRING_CLOSER, undefined, effort);
  const makeGrid = () => alignedGrid(stretches, cells);
  return { definition, from, order, timeStep, steps, points, length, makeGrid };
}

/** The refinement that as many points as eigenstates are found for allow, within limits. */
function affordable(stretches: readonly Stretch[]): number {
  const most = MOST_EIGENSTATES - 1 - stretches.length;
  return Math.max(LEAST_REFINEMENT, Math.min(REFINEMENT, most / (alignedPoints(stretches, 1) - 1)));
}

function refuseTooMany({ numerics }: Design, { name }: StepperDefinition, points: number): void {
  if (points <= MOST_EIGENSTATES) return;
  const key = SIZE_KEYS.find((name) => numerics[name] !== undefined) ?? "stepper";
  const remedy =
    key === "stepper"
      ? `use crank-nicolson, or force a coarser grid, as "numerics.points: ${SUGGESTED_POINTS}"`
      : "ask for less here, or use crank-nicolson";
  throw new DesignLimitError(
    `numerics.${key}`,
    `${name} takes at most ${MOST_EIGENSTATES} grid points, and this design needs ${points}: ${remedy}`,
  );
}

function planOnCircle(design: Design, motion: Motion, options: PrepareOptions): RunPlan {
  const { potential, numerics, particleMass } = design;
  const { definition, from, end, confined } = motion;
  const whole =
    confined?.circle(numerics.points, numerics.step) ??
    untouchedCircle(design, from, end, firstSpacing(potential, from) / 2);
  const circle = refined(whole, Math.round(Math.log2(options.fineness ?? 1)));
  const length = circle.points * circle.step;
  const jumps = potential.slopeTransform !== undefined;
  const order = definition.defaultOrder === "exact" ? undefined : (numerics.order ?? (jumps ? 2 : 6));
  const range = potential.confining ? 0 : potential.highest - potential.lowest;
  const largest =
    order === undefined
      ? Number.POSITIVE_INFINITY
      : Math.min(
          (SPLIT_PHASE[order] * HBAR) / Math.max(from.highest - potential.lowest, range),
          jumps ? largestTimeStep(circle.step, particleMass, largestDrift(order)) : Number.POSITIVE_INFINITY,
        );
  const { timeStep, steps } = stepping(design, end, largest, options.stepFineness);
  const highest = potential.confining
    ? Math.max(potential.value(circle.first), potential.value(circle.first + length))
    : potential.highest;
  const effort = order === undefined ? pairsPerStep("exact", design, circle.step, timeStep, highest) : 1;
  refuseTooLarge(design, circle.points, steps, "use crank-nicolson", undefined, effort);
  const makeGrid = () => circleGrid(circle);
  return { definition, from, order, timeStep, steps, points: circle.points, length, makeGrid };
}
