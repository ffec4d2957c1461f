import { alignedStretches, type Stretch } from "../grid/aligned.js";
import { type Circle, firstSpacing, largestTimeStep } from "../grid/circle.js";
import { type Departure, departure, passage, roomFor } from "../grid/journey.js";
import type { Design } from "../problem/design.js";
import { HBAR } from "../units/constants.js";
import { fastestRate, largestDrift, untouchedCircle } from "./circle-plan.js";
import { structureLength } from "./common-checks.js";

/** Common instants at which both steppers are looked at. */
export const INSTANTS = 160;
/** Start in widths of the packet from the structure: |psi| at the face is exp(-25) of its peak, below what the states are compared to. */
const CLEARANCE = 10;
/**
 * The boxes are made for a run so much longer: within the end itself one of the usual size is reached by a probability of 3e-14, whose amplitude is seen
 * in a distance of states.
 */
const ROOM_TO_SPARE = 1.15;
/** Spreads of k that have left the structure by the end. */
const PASSED_SPREADS = 3;
/** Cells of the coarsest grid on interfaces in units of the unrefined one's, whose nodes all refinements share. */
export const COMMON_REFINEMENT = 4;
/** Turn of the phase per step of order 6, (E - E_ref) dt / hbar, at the packet's edge; tuned on the smooth examples for an error below 1e-8. */
const CLOSED_PHASE = 0.4;
/**
 * The same for the split operator of order 6, in units of its fastest rate: a first guess, refined as needed. Tuned on the smooth examples.
 * Order 2, where V has jumps, starts at the kinetic phase of pi.
 */
const CIRCLE_PHASE = 0.8;

/** What two runs have in common, and where they start from: box, end, instants, first grids and steps. */
export interface MatchedPlan {
  readonly from: Departure;
  /** fs */
  readonly end: number;
  readonly closed: { readonly stretches: readonly Stretch[]; readonly order: number; readonly steps: number };
  readonly circle: { readonly circle: Circle; readonly order: number; readonly steps: number };
  /** True when V has jumps or points, which a circle can only hold in part. */
  readonly jumps: boolean;
}

/**
 * Plans the matched runs: the same packet, the same end, boxes whose ends nothing reaches, steps that meet at INSTANTS common instants.
 * Forced numerics are left aside: what is compared here is what each method makes of the same motion.
 */
export function planMatched(original: Design): MatchedPlan {
  const design = { ...original, numerics: {} };
  const { potential, particleMass } = design;
  const from = departure(design, CLEARANCE);
  const reach = from.distance + structureLength(potential) + PASSED_SPREADS * from.packet.width;
  const end = passage(from, reach, { kind: "exact" }, PASSED_SPREADS);
  const room = roomFor(from, ROOM_TO_SPARE * end, { kind: "exact" }, "untouched");
  const jumps = potential.slopeTransform !== undefined;
  const circle = untouchedCircle(design, from, ROOM_TO_SPARE * end, firstSpacing(potential, from));
  const order = jumps ? 2 : 6;
  const kinetic = largestTimeStep(circle.step, particleMass, largestDrift(order));
  const closedRange = Math.max(from.highest - from.energy, from.energy - from.lowest);
  return {
    from,
    end,
    jumps,
    closed: {
      stretches: alignedStretches(potential, from, room),
      order: 6,
      steps: stepsOf(end, (CLOSED_PHASE * HBAR) / closedRange, INSTANTS),
    },
    circle: {
      circle,
      order,
      // Twice the instants: a twin with half the steps passes them too.
      steps: stepsOf(end, jumps ? kinetic : CIRCLE_PHASE / fastestRate(design, from), 2 * INSTANTS),
    },
  };
}

/** A multiple of `multiple` steps, none longer than `largest` (fs). */
function stepsOf(end: number, largest: number, multiple: number): number {
  return multiple * Math.max(1, Math.ceil(end / largest / multiple));
}
