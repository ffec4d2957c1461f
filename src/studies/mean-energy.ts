import type { Departure } from "../grid/journey.js";
import { kineticEnergy, wavenumberOf, wavenumberWeight } from "../packets/gaussian.js";
import type { Bounded } from "../units/bounded.js";
import { HBAR } from "../units/constants.js";
import { beyondFace } from "./common-checks.js";
import type { Outcome } from "./outcome.js";

/** Energies at which the distribution of what got through is surveyed, and those at which its peak is looked at more closely. */
const SAMPLES = 200;
const CLOSE_SAMPLES = 12;
/** Spreads of k above the mean up to which it is looked for: behind a thick barrier the far tail carries all that gets through. */
const FURTHEST_SPREADS = 12;

/**
 * T at the mean energy with its bound: what the extrapolation left, and what the amplitude still inside the structure or near it, or
 * beyond its face from the start (probability P over a length L) can add to the projection on one plane wave, sqrt(P L) at most.
 */
export function boundedAtMean(
  value: number,
  extrapolationError: number,
  outcome: Outcome,
  from: Departure,
  length: number,
): Bounded {
  const density = wavenumberWeight(from.k0, from.k0, from.packet.width);
  const missing = Math.sqrt(
    ((outcome.unfinished + beyondFace(from)) * Math.max(length, from.packet.width)) / (2 * Math.PI * density),
  );
  // The truth lies between 0 and 1: a value beyond is moved towards it.
  const probability = Math.min(1, Math.max(0, value));
  const amplitude = Math.sqrt(probability);
  return { value: probability, error: extrapolationError + missing * (2 * amplitude + missing) };
}

/**
 * The total energy (eV) at which the energy distribution of what got through peaks. A resonance narrower than a two-hundredth of
 * the packet's range can be missed: it carries little. Cost: 200 projections of `survey`, which may be a coarse
 * calculation, and 15 of `outcome`.
 */
export function carryingEnergy(outcome: Outcome, from: Departure, survey: Outcome = outcome): number {
  const low = Math.max(from.lowest, from.near, from.far);
  const high = from.near + kineticEnergy(from.k0 + FURTHEST_SPREADS * from.spread, from.mass);
  const step = (high - low) / SAMPLES;
  const coarse = peak(survey, from, low + step, step, SAMPLES - 1);
  const closeStep = (3 * step) / CLOSE_SAMPLES;
  const close = peak(outcome, from, coarse - 1.5 * step, closeStep, CLOSE_SAMPLES + 1);
  const [a, b, c] = [-1, 0, 1].map((i) => energyDensity(outcome, from, close + i * closeStep));
  const bend = a - 2 * b + c;
  // The vertex of the parabola through the three highest samples.
  return bend < 0 ? close + (0.5 * closeStep * (a - c)) / bend : close;
}

/** Where the density is greatest among `count` energies from `first` on. */
function peak(outcome: Outcome, from: Departure, first: number, step: number, count: number): number {
  let best = first;
  let most = -1;
  for (let i = 0; i < count; i++) {
    const density = energyDensity(outcome, from, first + i * step);
    if (density > most) [best, most] = [first + i * step, density];
  }
  return best;
}

/** Probability per energy (1/eV) of what got through: T(E) |phi(k)|^2 / (dE/dk). */
function energyDensity(outcome: Outcome, from: Departure, energy: number): number {
  const k = wavenumberOf(Math.max(0, energy - from.near), from.mass);
  const slope = (HBAR * HBAR * k) / from.mass;
  return k > 0
    ? ((outcome.transmissionAt(energy) ?? 0) * wavenumberWeight(k, from.k0, from.packet.width)) / slope
    : 0;
}
