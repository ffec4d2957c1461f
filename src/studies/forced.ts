import type { Departure, Room } from "../grid/journey.js";
import type { Design, Numerics } from "../problem/design.js";
import { structureLength } from "./common-checks.js";
import { DesignLimitError } from "./limits.js";

/** Widths of the packet that a forced box must hold behind its start. */
const LEAST_WIDTHS_BEHIND = 5;

/** The room that `numerics.length` leaves, shared between the sides as the automatic room is. */
export function forcedRoom(design: Design, from: Departure, automatic: Room): Room {
  const { length } = design.numerics;
  if (length === undefined) return automatic;
  const free = length - structureLength(design.potential);
  const least = from.distance + LEAST_WIDTHS_BEHIND * design.packet.width;
  const near = Math.max(least, (free * automatic.near) / (automatic.near + automatic.far));
  if (!(free > near)) {
    const needed = Math.ceil(1.02 * (least + structureLength(design.potential)));
    throw new DesignLimitError(
      "numerics.length",
      `a box that holds the packet at its start and the structure is needed, here more than "${needed} nm"; got "${length} nm"`,
    );
  }
  return { near, far: free - near };
}

/** True when the user fixed something that the error of the transmission depends on, so that it must be measured from outside. */
export function isForced(numerics: Numerics): boolean {
  return [numerics.step, numerics.points, numerics.length, numerics.timeStep, numerics.end].some(
    (x) => x !== undefined,
  );
}
