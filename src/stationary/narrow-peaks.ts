import { wavenumberWeight } from "../packets/gaussian.js";
import type { EnergyAxis } from "./energy-axis.js";
import type { Spectrum } from "./packet-integrand.js";
import { fitPole, type PoleFit } from "./pole-fit.js";
import { freePace, type Resonance } from "./resonances.js";
import type { Scatterer } from "./scattering.js";

/** A peak counts as narrow, and is integrated in closed form, from this many widths beside it to as many on the other side or more. */
const LEAST_WIDTHS = 30;
/** Half a window in units of sqrt(width/pace): tuned against the bounds for walls of 11 to 20 nm. */
const BEST = 2.5;
/** Half a window is at most this part of the distance to the next threshold or pole, and to where the weight changes by a factor of e. */
const WINDOW = 1 / 40;
/** Order of what the fit through eight nodes leaves out. */
const ORDER = 8;
/** Lebesgue constant of eight Chebyshev nodes, rounded up: how much errors at the nodes can grow between them. */
const LEBESGUE = 3;

/** Relative error of a peak above which it is bounded instead of computed. */
const KNOWN = 0.3;

/** A peak's integral, and the range of total energies that it covers. */
export interface NarrowPeak {
  readonly low: number;
  readonly high: number;
  readonly value: number;
  readonly error: number;
}

/**
 * integral density T dE over a window about each narrow resonance, eV. With A = (E - pole) q(E), T = (v_far/v_near)/|A|^2 is a smooth
 * function over (E - E_r)^2 + (width/2)^2, which is integrated exactly.
 *
 * Why: near a peak of 1e-9 eV each T is uncertain by the rounding of the energy, 1e-16 eV in 1e-9 eV or far worse, but that only moves the peak and
 * hardly changes what is under it. Here A is taken at the edge of the window, where it is known well, and the bound holds the phase
 * of A, which sets the width, apart from its size.
 */
export function narrowPeaks(
  resonances: readonly Resonance[],
  scatterer: Scatterer,
  axis: EnergyAxis,
  { k0, width: sigma }: Spectrum,
  length: number,
  range: readonly [low: number, high: number],
): NarrowPeak[] {
  const top = Math.max(scatterer.near, scatterer.far);
  const mass = scatterer.near >= scatterer.far ? scatterer.nearMass : scatterer.farMass;
  const peaks: NarrowPeak[] = [];
  resonances.forEach(({ energy, width }, i) => {
    const { k, slope } = axis.perEnergy(energy);
    const free = Math.min(
      energy - top,
      ...[resonances[i - 1], resonances[i + 1]].map((other) =>
        other === undefined ? Number.POSITIVE_INFINITY : Math.abs(other.energy - energy),
      ),
      // The weight changes by e over 1/(4 sigma^2 |k - k0|), or over 1/(2 sigma) about its top.
      1 / ((4 * sigma * sigma * Math.abs(k - k0) + 2 * sigma) * slope),
    );
    // In a wide window the phase is blurred by what turns with it, in a narrow one the size by rounding: the best lies between.
    const best = BEST * Math.sqrt(width / freePace(energy - top, mass, length));
    const half = Math.min(Math.max(best, LEAST_WIDTHS * width), WINDOW * free);
    if (half < LEAST_WIDTHS * width || energy - half < range[0] || energy + half > range[1]) return;
    const fit = fitPole(scatterer, energy, width, half);
    if (!(Math.abs(fit.pole[0]) < 0.1 * half)) return;
    const { value, error } = under(fit, half, 4 * (half / free) ** ORDER, (at) => {
      const point = axis.perEnergy(at);
      return wavenumberWeight(point.k, k0, sigma) * point.slope;
    });
    if (Number.isFinite(value) && Number.isFinite(error))
      peaks.push({ low: energy - half, high: energy + half, value, error });
  });
  return peaks;
}

/**
 * What is under a peak. Where not even its width is known, T <= 1 still bounds it: with A = (E - pole) q and r = v_far/v_near the peak is
 * r/(|q| gamma)^2 <= 1 high, so that its area pi r/(|q|^2 gamma) lies between 0 and pi sqrt(r)/|q|.
 */
function under(
  fit: PoleFit,
  half: number,
  left: number,
  weight: (energy: number) => number,
): { value: number; error: number } {
  const relative = relativeError(fit, half) + left + 64 * Number.EPSILON;
  if (fit.pole[1] < 0 && relative < KNOWN) {
    const value = integral(fit, half, weight);
    return { value, error: relative * value };
  }
  const most = fit.quotients.reduce((sum, [re, im], i) => {
    const size = Math.hypot(re, im) * 2 ** fit.exponent;
    return Math.max(
      sum,
      (Math.PI * weight(fit.centre + fit.offsets[i]) * Math.sqrt(fit.velocities[i])) / size,
    );
  }, 0);
  // Values at the nodes stand for those between; a tenth more covers how little they differ.
  return { value: most / 2, error: 0.6 * most };
}

/**
 * An error of |A| common to size and phase moves the real part of the pole, which nothing depends on; the rest is an error of q, twice in its square,
 * and of the width: by the phases' own errors, and by errors of size seen under the angle by which q turns over the window.
 */
function relativeError({ pole, quotients, sizeError, phaseError }: PoleFit, half: number): number {
  const reference = Math.atan2(quotients[0][1], quotients[0][0]);
  const turned = quotients.reduce((most, [re, im]) => {
    const angle = Math.abs(Math.atan2(im, re) - reference);
    return Math.max(most, Math.min(angle, 2 * Math.PI - angle));
  }, 0);
  const gamma = -pole[1];
  return LEBESGUE * (4 * sizeError + (half / gamma) * (phaseError + sizeError * turned));
}

/** integral over [-half, half] of g(x)/((x - a)^2 + gamma^2), g through its values at the nodes: moments in closed form. */
function integral(fit: PoleFit, half: number, weight: (energy: number) => number): number {
  const { centre, pole, offsets, quotients, exponent, velocities } = fit;
  const gamma = -pole[1] / half;
  const x = offsets.map((offset) => (offset - pole[0]) / half);
  const g = quotients.map(
    ([re, im], i) => (weight(centre + offsets[i]) * velocities[i]) / (re * re + im * im),
  );
  const powers = monomials(x, g);
  const [from, to] = [(-half - pole[0]) / half, (half - pole[0]) / half];
  // I_n = int x^n/(x^2 + gamma^2) dx: I_0 by arctan, I_1 by logarithm, I_n = int x^(n-2) - gamma^2 I_(n-2).
  const moments = [
    (Math.atan(to / gamma) - Math.atan(from / gamma)) / gamma,
    0.5 * Math.log((to * to + gamma * gamma) / (from * from + gamma * gamma)),
  ];
  for (let n = 2; n < powers.length; n++)
    moments.push((to ** (n - 1) - from ** (n - 1)) / (n - 1) - gamma * gamma * moments[n - 2]);
  const sum = powers.reduce((total, power, n) => total + power * moments[n], 0);
  return (sum / half) * 2 ** -exponent * 2 ** -exponent;
}

/** Coefficients of the powers of x of the polynomial through the given values. */
function monomials(x: readonly number[], values: readonly number[]): number[] {
  const differences = [...values];
  for (let order = 1; order < x.length; order++)
    for (let i = x.length - 1; i >= order; i--)
      differences[i] = (differences[i] - differences[i - 1]) / (x[i] - x[i - order]);
  let powers = [differences[x.length - 1]];
  for (let i = x.length - 2; i >= 0; i--) {
    const next = [differences[i], ...powers];
    for (let j = 0; j < powers.length; j++) next[j] -= x[i] * powers[j];
    powers = next;
  }
  return powers;
}
