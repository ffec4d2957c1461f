import { alignedStretches, forcedStretches, type Stretch } from "../grid/aligned.js";
import {
  type CayleyClock,
  type Clock,
  cayleyClock,
  type Departure,
  departure,
  passage,
  type Room,
  roomFor,
} from "../grid/journey.js";
import type { Design } from "../problem/design.js";
import { crankNicolson } from "../steppers/crank-nicolson.js";
import { HBAR } from "../units/constants.js";
import { structureLength } from "./common-checks.js";
import { forcedRoom } from "./forced.js";

/** All that is fixed before the first step. */
export interface ClosedPlan {
  readonly from: Departure;
  readonly clock: CayleyClock;
  readonly timeStep: number;
  readonly order: number;
  readonly end: number;
  readonly steps: number;
  readonly room: Room;
  readonly stretches: readonly Stretch[];
  /** True for a grid that the user asked for, which is taken once and not refined. */
  readonly forced: boolean;
}

/**
 * Plans the Crank-Nicolson calculation that ends at `end` (fs; automatic when undefined). The time step is that of the clock with
 * least work (see `cayleyClock`): the transmission does not depend on it; the room needed and the number of steps do.
 */
export function planClosed(design: Design, end?: number): ClosedPlan {
  const { numerics, potential } = design;
  const from = departure(design);
  const automatic = cayleyClock(from);
  const clock: CayleyClock =
    numerics.timeStep === undefined
      ? automatic
      : { kind: "cayley", reference: from.energy, cutoff: (2 * HBAR) / numerics.timeStep };
  const timeStep = (2 * HBAR) / clock.cutoff;
  const reach = from.distance + structureLength(potential) + 6 * design.packet.width;
  const wanted = numerics.end ?? end ?? passage(from, reach, clock);
  const steps = Math.max(10, Math.ceil(wanted / timeStep));
  const actual = steps * timeStep;
  const order = numerics.order ?? crankNicolson.defaultOrder;
  // Higher orders slow fast groups down less than the clock says: room for them as if they were not slowed at all.
  const pace: Clock = order === 2 ? clock : { kind: "exact" };
  const room = forcedRoom(design, from, roomFor(from, actual, pace, "closed"));
  const unforced = alignedStretches(potential, from, room);
  const step = forcedStep(design, room);
  const stretches = step === undefined ? unforced : forcedStretches(unforced, step);
  return { from, clock, timeStep, order, end: actual, steps, room, stretches, forced: step !== undefined };
}

function forcedStep(design: Design, room: Room): number | undefined {
  const { step, points } = design.numerics;
  if (step !== undefined) return step;
  return points === undefined
    ? undefined
    : (room.near + room.far + structureLength(design.potential)) / (points - 1);
}

/** Widest and finest spacing (nm) of the plan's grid refined so many times, and the length of its box. */
export function extent(
  { stretches }: ClosedPlan,
  refinement: number,
): { widest: number; finest: number; length: number } {
  const spacings = stretches.map((s) => (s.to - s.from) / s.cells / refinement);
  return {
    widest: Math.max(...spacings),
    finest: Math.min(...spacings),
    length: stretches[stretches.length - 1].to - stretches[0].from,
  };
}
