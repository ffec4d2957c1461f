import type { Potential } from "../potentials/potential.js";

/** Samples of V between the faces. */
const SAMPLES = 400;
/** V counts as different from its level by more than this part of its range. */
const VISIBLE = 1e-3;

/** The stretch (nm) outside which V is near its levels: for a smooth shape much shorter than from face to face. */
export function coreOf(potential: Potential): readonly [left: number, right: number] {
  const { faces, scale, interfaces, levelLeft, levelRight } = potential;
  const [left, right] = faces;
  if (!Number.isFinite(scale) || !(right > left)) return faces;
  const least = VISIBLE * (potential.highest - potential.lowest);
  const places = Array.from({ length: SAMPLES + 1 }, (_, i) => left + ((right - left) * i) / SAMPLES);
  const first = places.find((x) => Math.abs(potential.value(x) - levelLeft) > least) ?? right;
  const last = places.findLast((x) => Math.abs(potential.value(x) - levelRight) > least) ?? left;
  // Interfaces belong to it, since only the mass may change there.
  return [Math.min(first, last, ...interfaces.slice(0, 1)), Math.max(first, last, ...interfaces.slice(-1))];
}
