import { HBAR } from "../../src/units/constants.js";

/**
 * Transmission of piecewise constant potentials in fixed-point arithmetic with 512 binary places, for the tests: shares nothing with the
 * program but the constants. Doubles enter exactly.
 */
const PLACES = 512n;
const ONE = 1n << PLACES;

/** A double as a fixed-point number, exactly (down to 2^-512). */
export function fixed(value: number): bigint {
  if (value === 0) return 0n;
  let exponent = Math.floor(Math.log2(Math.abs(value))) - 60;
  // 2^-exponent may itself overflow for tiny values; none are used here.
  let scaled = value * 2 ** -exponent;
  while (!Number.isInteger(scaled)) {
    scaled *= 2;
    exponent--;
  }
  const shift = BigInt(exponent) + PLACES;
  return shift >= 0n ? BigInt(scaled) << shift : BigInt(scaled) >> -shift;
}

export const times = (a: bigint, b: bigint): bigint => (a * b) >> PLACES;
export const over = (a: bigint, b: bigint): bigint => (a << PLACES) / b;

/** The nearest double but for a unit or two. */
export function double(value: bigint): number {
  if (value < 0n) return -double(-value);
  const bits = value.toString(2).length;
  const shift = bits - 62;
  const leading = shift > 0 ? value >> BigInt(shift) : value << BigInt(-shift);
  const exponent = shift - Number(PLACES);
  return Number(leading) * 2 ** Math.trunc(exponent / 2) * 2 ** (exponent - Math.trunc(exponent / 2));
}

export function root(value: bigint): bigint {
  let x = 1n << (BigInt(value.toString(2).length + Number(PLACES)) / 2n + 1n);
  const target = value << PLACES;
  for (;;) {
    const next = (x + target / x) >> 1n;
    if (next >= x) return x;
    x = next;
  }
}

/** sum z^n/(2n + first)!: cosh sqrt z for first = 0, sinh(sqrt z)/sqrt z for first = 1, of either sign of z. */
function series(z: bigint, first: bigint): bigint {
  let term = ONE;
  let sum = ONE;
  for (let n = 1n; term !== 0n && n < 4000n; n++) {
    term = times(term, z) / ((2n * n + first) * (2n * n + first - 1n));
    if (term === -1n) break;
    sum += term;
  }
  return sum;
}

export interface ExactSlab {
  readonly width: number;
  readonly height: number;
  readonly mass: number;
}

/**
 * T = 4 v1 v3 / [(v1 M22 + v3 M11)^2 + (M21 - v1 v3 M12)^2], M mapping (psi, psi'/m) from left to right, v = k/m (check-values, 2.8).
 * @param energy total, as a double or in fixed point
 */
export function exactTransmission(
  slabs: readonly ExactSlab[],
  energy: number | bigint,
  leads: {
    readonly left: number;
    readonly right: number;
    readonly massLeft: number;
    readonly massRight: number;
  },
): bigint {
  const E = typeof energy === "bigint" ? energy : fixed(energy);
  const factor = over(2n * ONE, times(fixed(HBAR), fixed(HBAR)));
  let [m11, m12, m21, m22] = [ONE, 0n, 0n, ONE];
  for (const { width, height, mass } of slabs) {
    const [w, m] = [fixed(width), fixed(mass)];
    const u = times(factor, fixed(height) - E);
    const z = times(times(m, u), times(w, w));
    const [c, s] = [series(z, 0n), times(series(z, 1n), w)];
    const [b, d] = [times(m, s), times(u, s)];
    [m11, m12, m21, m22] = [
      times(c, m11) + times(b, m21),
      times(c, m12) + times(b, m22),
      times(d, m11) + times(c, m21),
      times(d, m12) + times(c, m22),
    ];
  }
  const v1 = root(times(factor, over(E - fixed(leads.left), fixed(leads.massLeft))));
  const v3 = root(times(factor, over(E - fixed(leads.right), fixed(leads.massRight))));
  const real = times(v1, m22) + times(v3, m11);
  const imaginary = m21 - times(times(v1, v3), m12);
  return over(4n * times(v1, v3), times(real, real) + times(imaginary, imaginary));
}
