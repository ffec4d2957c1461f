import type { Bounded } from "../analysis/results.js";
import type { Departure } from "../grid/journey.js";
import { wavenumberOf, wavenumberWeight } from "../packets/gaussian.js";
import { HBAR } from "../units/constants.js";
import { beyondFace } from "./common-checks.js";
import type { Outcome } from "./outcome.js";

/** Energies at which the distribution of what got through is looked at. */
const SAMPLES = 60;

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
  const amplitude = Math.sqrt(Math.max(0, value));
  return { value, error: extrapolationError + missing * (2 * amplitude + missing) };
}

/** The total energy (eV) at which the energy distribution of what got through peaks. Cost: 60 projections. */
export function carryingEnergy(outcome: Outcome, from: Departure): number {
  const low = Math.max(from.lowest, from.near, from.far);
  const step = (from.highest - low) / SAMPLES;
  const density = (energy: number): number => {
    const k = wavenumberOf(energy - from.near, from.mass);
    const slope = (HBAR * HBAR * k) / from.mass;
    return ((outcome.transmissionAt(energy) ?? 0) * wavenumberWeight(k, from.k0, from.packet.width)) / slope;
  };
  let best = low + step;
  let most = -1;
  for (let i = 1; i < SAMPLES; i++) {
    const d = density(low + i * step);
    if (d > most) [best, most] = [low + i * step, d];
  }
  const [a, b, c] = [density(best - step), most, density(best + step)];
  const bend = a - 2 * b + c;
  // The vertex of the parabola through the three highest samples.
  return bend < 0 ? best + (0.5 * step * (a - c)) / bend : best;
}
