import { type Circle, circleFor, firstSpacing } from "../grid/circle.js";
import { type Departure, departure, passage, roomFor } from "../grid/journey.js";
import type { Design } from "../problem/design.js";
import { chebyshev, chebyshevTerms } from "../steppers/chebyshev.js";
import { splitOperator } from "../steppers/split-operator.js";
import { splittingOfOrder } from "../steppers/splittings.js";
import type { StepperDefinition, TimeOrder } from "../steppers/stepper.js";
import { HBAR } from "../units/constants.js";
import { structureLength } from "./common-checks.js";
import { forcedRoom } from "./forced.js";
import { refuseTooLarge } from "./limits.js";

/**
 * Order taken unless asked otherwise: least work to that accuracy on the sech2 barrier of check-values 5.2. Where V has jumps the kinetic phase
 * limits the step, not the order.
 */
const orderFor = (jumps: boolean, accuracy: number): number => (jumps ? 2 : accuracy < 1e-8 ? 6 : 4);
/**
 * First time step in units of 1/rate (see `fastestRate`) for the accuracy beside it; the error falls with the order's power.
 * Tuned so that one halving suffices on the sech2 barrier of check-values 3.6.
 */
const FIRST_TIME_PHASE: Readonly<Record<number, { readonly phase: number; readonly accuracy: number }>> = {
  2: { phase: 0.1, accuracy: 1e-6 },
  4: { phase: 1.6, accuracy: 1e-6 },
  6: { phase: 0.7, accuracy: 1e-10 },
};
/** Steps of a stepper that is exact in time: enough to look at the last tenth of the run by itself. */
const EXACT_STEPS = 20;
/** Start of the packet in its own widths from the structure; a transform's rounding hides what is smaller than this leaves. */
const CLEARANCE = 10;
/** Points beyond which a circle is refused: its tables grow with every halving of the spacing. */
const CIRCLE_LIMIT = 2 ** 20;

/** All that is fixed before the first step. */
export interface CirclePlan {
  readonly from: Departure;
  readonly definition: StepperDefinition;
  readonly order: TimeOrder;
  readonly circle: Circle;
  readonly timeStep: number;
  readonly end: number;
  readonly forcedSpace: boolean;
  readonly forcedTime: boolean;
  /** True when the time step is not refined: forced, or of a stepper that is exact in time. */
  readonly fixedTime: boolean;
}

const exact = { kind: "exact" } as const;

/** Largest |a| of the drifts of the splitting of an order. */
export function largestDrift(order: number): number {
  return Math.max(...(splittingOfOrder(order)?.a ?? [1]).map(Math.abs));
}

/** Pairs of transforms in one step (fs) on a circle of this spacing (nm), where V rises to `highest` (eV). */
export function pairsPerStep(
  order: TimeOrder,
  { potential, particleMass }: Design,
  step: number,
  timeStep: number,
  highest = potential.highest,
): number {
  if (order !== "exact") return splittingOfOrder(order)?.a.length ?? 1;
  const fastest = (HBAR * Math.PI) ** 2 / (2 * particleMass * step * step);
  return chebyshevTerms(fastest + highest - potential.lowest, timeStep);
}

/** The circle whose seam nothing reaches until `end` (fs), of at most this spacing (nm), unless the design forces one. */
export function untouchedCircle(design: Design, from: Departure, end: number, spacing: number): Circle {
  const { step, points, length } = design.numerics;
  const room = forcedRoom(design, from, roomFor(from, end, exact, "untouched"));
  return circleFor(design.potential, from, room, step ?? spacing, {
    points,
    keepStep: step !== undefined && length === undefined,
    tight: length !== undefined,
  });
}

/** Plans the calculation on a circle that ends at `end` (fs; automatic when undefined). */
export function planCircle(design: Design, accuracy: number, end?: number): CirclePlan {
  const { numerics, potential, packet } = design;
  const from = departure(design, CLEARANCE);
  const definition = numerics.stepper === chebyshev.name ? chebyshev : splitOperator;
  const order =
    definition.defaultOrder === "exact"
      ? "exact"
      : (numerics.order ?? orderFor(potential.slopeTransform !== undefined, accuracy));
  const reach = from.distance + structureLength(potential) + 6 * packet.width;
  const wanted = numerics.end ?? end ?? passage(from, reach, exact);
  const circle = untouchedCircle(design, from, wanted, firstSpacing(potential, from));
  const timeStep =
    numerics.timeStep ??
    (order === "exact" ? wanted / EXACT_STEPS : firstTimeStep(order, accuracy, fastestRate(design, from)));
  const effort = order === "exact" ? pairsPerStep(order, design, circle.step, timeStep) : 1;
  refuseTooLarge(
    design,
    circle.points,
    Math.ceil(wanted / timeStep),
    "use crank-nicolson",
    CIRCLE_LIMIT,
    effort,
  );
  return {
    from,
    definition,
    order,
    circle,
    timeStep: wanted / Math.ceil(wanted / timeStep),
    end: wanted,
    forcedSpace: numerics.step !== undefined || numerics.points !== undefined,
    forcedTime: numerics.timeStep !== undefined,
    fixedTime: numerics.timeStep !== undefined || order === "exact",
  };
}

function firstTimeStep(order: number, accuracy: number, rate: number): number {
  const { phase, accuracy: tuned } = FIRST_TIME_PHASE[order] ?? FIRST_TIME_PHASE[2];
  return (phase * Math.min(2, (accuracy / tuned) ** (1 / order))) / rate;
}

/** Rate (1/fs) at which a splitting is taxed: that of the kinetic energy in the structure and that of a swing in its curvature. */
export function fastestRate({ potential, particleMass }: Design, from: Departure): number {
  const range = potential.highest - potential.lowest;
  const energy = Math.max(from.highest - potential.lowest, range);
  const swing = Number.isFinite(potential.scale)
    ? Math.sqrt((2 * range) / particleMass) / potential.scale
    : 0;
  return energy / HBAR + swing;
}
