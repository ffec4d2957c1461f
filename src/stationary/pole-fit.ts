import type { Scatterer } from "./scattering.js";

/** Nodes of the fit. An even number, so that none falls on the resonance itself, where the amplitude is known worst. */
const NODES = 8;
/** Newton steps from a start that is right within a width or so. */
const NEWTON_STEPS = 40;

type Complex = readonly [re: number, im: number];

/** The incoming amplitude A(E) about a resonance as (E - pole) times a smooth quotient, known at some energies. */
export interface PoleFit {
  /** Energy from which offsets are taken, eV. */
  readonly centre: number;
  /** Of the pole from `centre`, eV; the imaginary part is minus half the width. */
  readonly pole: Complex;
  /** Of the nodes from `centre`, eV, exactly. */
  readonly offsets: readonly number[];
  /** A / (E - pole) at the nodes, times 2^exponent. */
  readonly quotients: readonly Complex[];
  readonly exponent: number;
  /** v_far/v_near at the nodes. */
  readonly velocities: readonly number[];
  /** Greatest relative error of |A|, and error of its phase, among the nodes. */
  readonly sizeError: number;
  readonly phaseError: number;
}

/**
 * Finds the zero of the incoming amplitude, a polynomial through Chebyshev nodes on centre +- reach, by Newton's method from
 * centre - i width/2. Right to about (width/energy above the threshold)^8.
 */
export function fitPole(scatterer: Scatterer, centre: number, width: number, reach: number): PoleFit {
  const offsets: number[] = [];
  const amplitudes: Complex[] = [];
  const velocities: number[] = [];
  let exponent = 0;
  let sizeError = 0;
  let phaseError = 0;
  for (let i = 0; i < NODES; i++) {
    const energy = centre + reach * Math.cos((Math.PI * (i + 0.5)) / NODES);
    const [near, far] = [energy - scatterer.near, energy - scatterer.far];
    const sweep = scatterer.sweep({ energy, near, far });
    if (i === 0) exponent = sweep.exponent;
    const factor = 2 ** (sweep.exponent - exponent);
    offsets.push(energy - centre);
    amplitudes.push([sweep.incoming[0] * factor, sweep.incoming[1] * factor]);
    velocities.push(sweep.farVelocity / sweep.nearVelocity);
    // The kinetic energies are differences of rounded numbers here.
    const rounding = (Number.EPSILON * Math.abs(energy)) / Math.min(near, far);
    const size = Math.hypot(sweep.incoming[0], sweep.incoming[1]);
    sizeError = Math.max(sizeError, sweep.error / size + rounding);
    phaseError = Math.max(phaseError, sweep.phaseError + rounding);
  }
  const scaled = offsets.map((offset) => offset / reach);
  const [re, im] = zeroOf(scaled, dividedDifferences(scaled, amplitudes), -width / (2 * reach));
  const pole: Complex = [re * reach, im * reach];
  const quotients = amplitudes.map((a, i) => over(a, [offsets[i] - pole[0], -pole[1]]));
  return { centre, pole, offsets, quotients, exponent, velocities, sizeError, phaseError };
}

/** Newton's divided differences of complex values. */
function dividedDifferences(t: readonly number[], values: readonly Complex[]): Complex[] {
  const table = values.map(([re, im]) => [re, im] as [number, number]);
  for (let order = 1; order < t.length; order++)
    for (let i = t.length - 1; i >= order; i--)
      for (const part of [0, 1])
        table[i][part] = (table[i][part] - table[i - 1][part]) / (t[i] - t[i - order]);
  return table;
}

/** Newton's method on the polynomial, value and slope by Horner's rule in its nested form. */
function zeroOf(t: readonly number[], coefficients: readonly Complex[], imaginary: number): Complex {
  let z: Complex = [0, imaginary];
  for (let step = 0; step < NEWTON_STEPS; step++) {
    let value: Complex = coefficients[coefficients.length - 1];
    let slope: Complex = [0, 0];
    for (let i = coefficients.length - 2; i >= 0; i--) {
      const from: Complex = [z[0] - t[i], z[1]];
      slope = plus(times(slope, from), value);
      value = plus(times(value, from), coefficients[i]);
    }
    const change = over(value, slope);
    if (!Number.isFinite(change[0]) || !Number.isFinite(change[1])) break;
    z = [z[0] - change[0], z[1] - change[1]];
    if (Math.hypot(...change) <= Number.EPSILON * Math.hypot(...z)) break;
  }
  return z;
}

const plus = ([ar, ai]: Complex, [br, bi]: Complex): Complex => [ar + br, ai + bi];
const times = ([ar, ai]: Complex, [br, bi]: Complex): Complex => [ar * br - ai * bi, ar * bi + ai * br];
function over([ar, ai]: Complex, [br, bi]: Complex): Complex {
  const square = br * br + bi * bi;
  return [(ar * br + ai * bi) / square, (ai * br - ar * bi) / square];
}
