import { wavenumberOf } from "../packets/gaussian.js";
import type { Potential } from "../potentials/potential.js";
import { HBAR } from "../units/constants.js";
import { SEAM_ROOM } from "./band-limited.js";
import { type Grid, periodicGrid } from "./grid.js";
import type { Departure, Room } from "./journey.js";

/** Spacing of the first, coarsest circle: this phase per spacing at the packet's largest wavenumber, ... */
const FIRST_PHASE = 1.2;
/** ... this share of the length over which a smooth V changes. Tuned against check-values 3.6, sech2. */
const FIRST_SHARE = 0.55;

/** Largest spacing (nm) that a circle should start from for this packet and structure. */
export function firstSpacing(potential: Potential, from: Departure): number {
  const depth = Math.max(
    from.highest - potential.lowest,
    potential.highest - from.lowest,
    from.highest - from.near,
  );
  return Math.min(FIRST_PHASE / wavenumberOf(depth, from.mass), FIRST_SHARE * potential.scale);
}

/** A circle of n points that leaves at least `room` on either side of the structure and the seam's ramp at its end. */
export interface Circle {
  readonly first: number;
  readonly step: number;
  readonly points: number;
}

/**
 * The circle with the least power of two of points whose spacing is at most `spacing`. What the power of two gives
 * beyond the need makes the spacing finer, not the circle longer. `forced` replaces the number of points (raised to a power of two) or
 * keeps the spacing, when that is what the user asked for; `tight` leaves no room of its own for the ramp at the seam.
 */
export function circleFor(
  potential: Potential,
  from: Departure,
  room: Room,
  spacing: number,
  forced: { readonly points?: number; readonly keepStep?: boolean; readonly tight?: boolean } = {},
): Circle {
  const left = from.direction > 0 ? room.near : room.far;
  const seam = forced.tight ? 0 : SEAM_ROOM * spacing;
  const [faceLeft, faceRight] = potential.faces;
  const need = room.near + room.far + (faceRight - faceLeft) + 2 * seam;
  const points = powerOfTwo(forced.points ?? need / spacing);
  return { first: faceLeft - left - seam, step: forced.keepStep ? spacing : need / points, points };
}

function powerOfTwo(atLeast: number): number {
  return 2 ** Math.max(4, Math.ceil(Math.log2(atLeast) - 1e-9));
}

/** The same circle with its points doubled so many times. */
export function refined(circle: Circle, times: number): Circle {
  return { first: circle.first, step: circle.step / 2 ** times, points: circle.points * 2 ** times };
}

export function circleGrid(circle: Circle): Grid {
  return periodicGrid(circle.first, circle.step, circle.points);
}

/**
 * Largest time step (fs) at which no drift of the splitting turns the fastest momentum of the grid by more than pi:
 * max|a| hbar k_max^2 dt / 2m <= pi, k_max = pi / step. Beyond it high momenta are folded onto low ones.
 */
export function largestTimeStep(step: number, mass: number, largestDrift: number): number {
  const k = Math.PI / step;
  return (2 * Math.PI * mass) / (HBAR * k * k * largestDrift);
}
