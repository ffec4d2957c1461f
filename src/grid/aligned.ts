import { wavenumberOf } from "../packets/gaussian.js";
import type { Potential } from "../potentials/potential.js";
import { closedGrid, type Grid } from "./grid.js";
import type { Departure, Room } from "./journey.js";

/** A stretch of equal cells between two places that are nodes. */
export interface Stretch {
  readonly from: number;
  readonly to: number;
  readonly cells: number;
}

/** Phase per cell (largest local wavenumber times spacing) of the unrefined grid. Tuned against check-values 3.6. */
export const BASE_PHASE = 1;

/**
 * The unrefined stretches of an interface-aligned grid: one between each pair of neighbouring interfaces or faces and
 * one to either end of the box, each with a spacing of its own: BASE_PHASE over the largest |k| or kappa that a component of
 * the packet has there, and no more than that share of the length over which a smooth V changes.
 * Every refinement multiplies all cell numbers, so that errors go like h^2, h^4, ... of one relative spacing.
 */
export function alignedStretches(potential: Potential, from: Departure, room: Room): Stretch[] {
  const [faceLeft, faceRight] = potential.faces;
  const places = [...new Set([faceLeft, ...potential.interfaces, faceRight])].sort((a, b) => a - b);
  const [left, right] = from.direction > 0 ? [room.near, room.far] : [room.far, room.near];
  const edges = [faceLeft - left, ...places, faceRight + right];
  return edges.slice(1).map((to, i) => {
    const start = edges[i];
    const step = BASE_PHASE / localWavenumber(potential, from, start, to);
    return { from: start, to, cells: Math.max(2, Math.ceil((to - start) / step)) };
  });
}

/** Largest wavenumber or decay constant (1/nm) that the packet's components have between two places. */
function localWavenumber(potential: Potential, from: Departure, a: number, b: number): number {
  const middle = 0.5 * (a + b);
  const mass = potential.mass(middle);
  const outside = middle < potential.faces[0] || middle > potential.faces[1];
  const values =
    outside || potential.scale === Number.POSITIVE_INFINITY
      ? [potential.value(middle)]
      : [potential.lowest, potential.highest];
  // Outside, what matters is the packet itself: its own wavenumber range, on either level.
  const energies = [from.lowest, from.highest];
  let largest = from.spread;
  for (const v of values)
    for (const e of energies) largest = Math.max(largest, wavenumberOf(Math.abs(e - v), mass));
  return outside ? largest : Math.max(largest, 1 / potential.scale);
}

/** Number of nodes of the grid that `alignedGrid` would make. */
export function alignedPoints(stretches: readonly Stretch[], refinement: number): number {
  return stretches.reduce((sum, s) => sum + Math.round(s.cells * refinement), 0) + 1;
}

/** The grid of these stretches with all cell numbers multiplied by `refinement`. */
export function alignedGrid(stretches: readonly Stretch[], refinement: number): Grid {
  const x = new Float64Array(alignedPoints(stretches, refinement));
  let node = 0;
  for (const { from, to, cells } of stretches) {
    const count = Math.round(cells * refinement);
    for (let j = 0; j < count; j++) x[node++] = from + ((to - from) * j) / count;
  }
  x[node] = stretches[stretches.length - 1].to;
  return closedGrid(x);
}

/** Stretches whose spacing is as near to `step` (nm) as whole cells allow: a grid that the user asked for. */
export function forcedStretches(stretches: readonly Stretch[], step: number): Stretch[] {
  return stretches.map((s) => ({ ...s, cells: Math.max(1, Math.round((s.to - s.from) / step)) }));
}
