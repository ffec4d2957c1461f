import { HBAR } from "../units/constants.js";
import type { PhaseStep } from "./phase-division.js";
import { fitPole } from "./pole-fit.js";
import type { Scatterer } from "./scattering.js";

/** A quasi-level: the pole E - i width/2 of the transmitted amplitude, eV. */
export interface Resonance {
  /** Total energy. */
  readonly energy: number;
  /** Full width at half height; hbar/width is its lifetime. Below 1e-15 of the energy only its order is right. */
  readonly width: number;
}

/** How much faster the phase must turn at a resonance than that of a free wave over the same length. */
const DISTINCT = 3;
/** Searches for the pole, each about the result of the one before. */
const SEARCHES = 4;
/** Half the range of energies fitted, in widths. */
const FITTED_WIDTHS = 1;
/** Never so close that rounding moves the nodes: parts of the energy. */
const CLOSEST = 2 ** 12 * Number.EPSILON;
/** Nor so wide that the fit comes near a threshold: part of the distance to it. */
const WIDEST = 0.5;

/** d(phase)/dE (rad/eV) of a free wave over `length`, and of the threshold itself; E in eV above the higher level. */
export function freePace(above: number, mass: number, length: number): number {
  const kinetic = Math.max(above, Number.MIN_VALUE);
  return (Math.sqrt(mass / (2 * kinetic)) / HBAR) * length + 1 / kinetic;
}

/**
 * Resonances seen as steps of the phase.
 * @param steps panels whose ends are total energies, ascending
 * @param length of the structure, nm
 */
export function resonancesAmong(
  steps: readonly PhaseStep[],
  scatterer: Scatterer,
  length: number,
): Resonance[] {
  const { near, far, nearMass, farMass } = scatterer;
  const top = Math.max(near, far);
  const pace = (energy: number) => freePace(energy - top, near >= far ? nearMass : farMass, length);
  const slope = (i: number) => (steps[i] === undefined ? 0 : steps[i].turn / (steps[i].b - steps[i].a));
  const found: Resonance[] = [];
  for (let i = 0; i < steps.length; i++) {
    if (!(slope(i) > slope(i - 1) && slope(i) >= slope(i + 1))) continue;
    const { a, b } = steps[i];
    if (slope(i) < DISTINCT * pace((a + b) / 2)) continue;
    // The slope of arctan((E - E_r)/(width/2)) at its middle is 2/width.
    const pole = refine({ energy: (a + b) / 2, width: Math.max(2 / slope(i), b - a) }, scatterer, top);
    const inside = pole.energy > steps[0].a && pole.energy < steps[steps.length - 1].b;
    if (!inside || !(pole.width > 0) || 2 / pole.width < DISTINCT * pace(pole.energy)) continue;
    const same = (other: Resonance) =>
      Math.abs(other.energy - pole.energy) < (other.width + pole.width) / 4 + CLOSEST * Math.abs(pole.energy);
    if (!found.some(same)) found.push(pole);
  }
  return found.sort((p, q) => p.energy - q.energy);
}

function refine(start: Resonance, scatterer: Scatterer, top: number): Resonance {
  let { energy, width } = start;
  for (let search = 0; search < SEARCHES; search++) {
    const reach = Math.min(
      Math.max(FITTED_WIDTHS * width, CLOSEST * Math.abs(energy)),
      WIDEST * (energy - top),
    );
    const { centre, pole } = fitPole(scatterer, energy, width, reach);
    // A zero outside the fitted range is no more than a hint; it is not believed further than the range.
    if (!(Math.hypot(...pole) < 4 * reach)) return { energy, width: Number.NaN };
    energy = centre + pole[0];
    width = Math.abs(2 * pole[1]);
  }
  return { energy, width };
}
