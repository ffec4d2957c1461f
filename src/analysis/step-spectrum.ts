import { kaiserFall } from "../numerics/kaiser.js";
import { HBAR } from "../units/constants.js";

/** Decay of the taper's leakage, e^-18 = 2e-8 in amplitude. Tuned on barriers of 5 to 55 nm: less leaks, more waits longer. */
const TAPER_BETA = 18;
/** Part of the record that the taper takes. */
const TAPER_SHARE = 0.5;

/**
 * The phase theta (radians) that one Crank-Nicolson step of dt (fs) takes off a state of total energy E (eV), and its slope d theta / dE:
 *
 *   theta = E_ref dt / hbar + 2 arctan((E - E_ref) dt / 2 hbar).
 */
export function stepPhase(
  energy: number,
  timeStep: number,
  reference: number,
): { readonly theta: number; readonly slope: number } {
  const tau = timeStep / HBAR;
  const y = 0.5 * tau * (energy - reference);
  return { theta: reference * tau + 2 * Math.atan(y), slope: tau / (1 + y * y) };
}

/**
 * Weights of a record's entries 0 ... `last`, the later half falling smoothly to zero: what still rings at other energies when the record ends
 * is then suppressed instead of being cut off.
 */
export function recordWeights(last: number): Float64Array {
  const falling = Math.floor(TAPER_SHARE * last);
  const weights = new Float64Array(last + 1).fill(1);
  weights.set(kaiserFall(falling, TAPER_BETA), last - falling);
  return weights;
}

/** sum_n w_n a_n exp(i theta n) over a record (interleaved complex, one entry a step) with the weights given. Cost O(n). */
export function stepTransform(
  record: Float64Array,
  weights: Float64Array,
  theta: number,
): [re: number, im: number] {
  let re = 0;
  let im = 0;
  for (let n = 0; n < weights.length; n++) {
    const cos = weights[n] * Math.cos(theta * n);
    const sin = weights[n] * Math.sin(theta * n);
    re += record[2 * n] * cos - record[2 * n + 1] * sin;
    im += record[2 * n] * sin + record[2 * n + 1] * cos;
  }
  return [re, im];
}
