import type { Potential } from "../potentials/potential.js";

/** Part of the neighbouring layers that is looked at; a half would touch their other ends. */
const WINDOW = 0.25;
/** The same where V is curved beside the interface: the mean then differs from the value by WINDOW_CURVED * (change of V). */
const WINDOW_CURVED = 2 ** -24;
/** Relative difference of mean and value that rounding, and curvature within the window, may cause. */
const ROUNDING = 16 * Number.EPSILON;

/**
 * Strength (eV nm) of the point at an interface, which shows in cell averages alone:
 * lim (b - a) (mean of V over [a, b] - V(x)) for a window [a, b] about x. Zero for a plain jump.
 *
 * @param gap distance to the nearest other interface or face, nm; Infinity when there is none
 */
export function strengthAt(potential: Potential, x: number, gap: number): number {
  const curved = Number.isFinite(potential.scale);
  const reach = Math.min(gap, potential.scale);
  // A power of two, so that x - half and x + half are exact and the window is as wide as it is said to be.
  const window = (curved ? WINDOW_CURVED : WINDOW) * (Number.isFinite(reach) ? reach : 1);
  const half = Math.max(2 ** Math.floor(Math.log2(window)), Math.abs(x) * 2 ** -50);
  const [a, b] = [x - half, x + half];
  const beside = potential.value(x);
  const excess = potential.cellAverage(a, b) - beside;
  const range = Math.max(Math.abs(potential.highest), Math.abs(potential.lowest), Math.abs(beside));
  const unseen = (curved ? 4 * WINDOW_CURVED : ROUNDING) * range;
  return Math.abs(excess) <= unseen ? 0 : excess * (b - a);
}
