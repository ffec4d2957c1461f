import type { Departure } from "../grid/journey.js";
import { normalTail } from "../numerics/erfc.js";
import type { Potential } from "../potentials/potential.js";
import { atMost, type Check } from "./calculation.js";
import type { Outcome } from "./outcome.js";

/** Largest |psi| of the start at the structure's face, relative to its peak, that counts as clear. */
export const CLEAR_AMPLITUDE = 1e-9;
/** Largest change of the norm over a calculation that counts as round-off. */
const NORM_LIMIT = 1e-9;
/** Largest error of the sampled packet's norm. */
const SAMPLING_LIMIT = 1e-9;

/** error / value as a check shows it: huge where there is no positive value to relate it to. */
export function relativeError(error: number, value: number): number {
  const relative = error / value;
  return value > 0 && Number.isFinite(relative) ? relative : Number.MAX_VALUE;
}

/** Probability of the part of the packet that lies beyond the face it meets from the start. */
export function beyondFace({ distance, packet }: Departure): number {
  return normalTail(distance / packet.width);
}

/** |psi| at that face at the start, relative to its peak: exp(-(distance / 2 sigma)^2). */
export function amplitudeAtFace({ distance, packet }: Departure): number {
  return Math.exp(-((Math.max(0, distance) / (2 * packet.width)) ** 2));
}

/**
 * What the part of the packet that lies beyond the near face from the start (probability P) may add to or take from the
 * transmission T: 4 (P + sqrt(T P)). Without it the amplitude is another by sqrt(P) at most, once for itself and once for the norm.
 */
export function startError(from: Departure, transmitted: number): number {
  const beyond = beyondFace(from);
  return 4 * (beyond + Math.sqrt(Math.max(0, transmitted) * beyond));
}

/** Distance between the faces, nm. */
export function structureLength(potential: Potential): number {
  return potential.faces[1] - potential.faces[0];
}

/** The checks that every transmission calculation owes, whichever stepper it used. */
export function commonChecks(
  from: Departure,
  outcome: Outcome,
  drift: number,
  accuracy: number,
  transmitted: number,
  held = false,
): Check[] {
  return [
    atMost(
      "start",
      amplitudeAtFace(from),
      CLEAR_AMPLITUDE,
      "the packet's amplitude at the structure's face at the start, relative to its peak",
    ),
    atMost("packet", outcome.sampling, SAMPLING_LIMIT, "the norm of the packet on the grid, minus one"),
    atMost("norm", drift, NORM_LIMIT, "change of the norm over the whole calculation"),
    atMost(
      "remaining",
      relativeError(outcome.unfinished, transmitted),
      accuracy,
      held
        ? "a part of the packet is held in the structure (bound, or for longer than can be waited for); relative to what got through"
        : "what is still inside or still to arrive at the end, relative to what got through",
    ),
  ];
}
