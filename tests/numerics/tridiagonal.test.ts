import { Matrix, solve } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { type Complex, TwoEndedFactors } from "../../src/numerics/tridiagonal.js";

/** A small repeatable generator (mulberry32, public domain) of numbers in [0, 1). */
function generator(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

interface System {
  diagRe: Float64Array;
  diagIm: Float64Array;
  below: Float64Array;
  above: Float64Array;
}

/** z + i tau H with couplings and cell widths at random: what the solver is for. */
function randomSystem(n: number, random: () => number): System {
  const coupling = Float64Array.from({ length: n + 1 }, () => 0.1 + 3 * random());
  const weight = Float64Array.from({ length: n }, () => 0.5 + random());
  return {
    diagRe: new Float64Array(n).fill(1 + random()),
    diagIm: weight.map((w, j) => (coupling[j] + coupling[j + 1]) / w + 4 * random() - 2),
    below: weight.map((w, j) => -coupling[j] / w),
    above: weight.map((w, j) => -coupling[j + 1] / w),
  };
}

/** The complex system as a real one of twice the size, [[Re, -Im], [Im, Re]], solved densely. */
function denseSolution(
  { diagRe, diagIm, below, above }: System,
  psi: Float64Array,
): [Float64Array, Float64Array] {
  const n = diagRe.length;
  const matrix = Matrix.zeros(2 * n, 2 * n);
  const put = (row: number, column: number, re: number, im: number) => {
    matrix.set(row, column, re);
    matrix.set(row, n + column, -im);
    matrix.set(n + row, column, im);
    matrix.set(n + row, n + column, re);
  };
  for (let j = 0; j < n; j++) {
    put(j, j, diagRe[j], diagIm[j]);
    if (j > 0) put(j, j - 1, 0, below[j]);
    if (j < n - 1) put(j, j + 1, 0, above[j]);
  }
  const right = Matrix.columnVector(
    Array.from({ length: 2 * n }, (_, i) => (i < n ? psi[2 * i] : psi[2 * (i - n) + 1])),
  );
  const x = solve(matrix, right).to1DArray();
  return [Float64Array.from(x.slice(0, n)), Float64Array.from(x.slice(n))];
}

const times = ([a, b]: Complex, [c, d]: Complex): Complex => [a * c - b * d, a * d + b * c];
const turnBy = (angle: number): Complex => [Math.cos(angle), Math.sin(angle)];

describe("two-ended elimination", () => {
  // Every remainder of n by the rows that a turn takes from both sides, on either side of the first full turn.
  it.each([3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 31, 64])(
    "makes psi <- phase (turn f phi - psi) with the phi of a dense solution (ml-matrix, LU), n = %i",
    (n) => {
      const random = generator(n);
      for (let trial = 0; trial < 10; trial++) {
        const system = randomSystem(n, random);
        const factor = 1 + 4 * random();
        const phase = turnBy(6 * random());
        const turn = trial % 2 === 0 ? undefined : turnBy(6 * random());
        const psi = Float64Array.from({ length: 2 * n }, () => 2 * random() - 1);
        const [phiRe, phiIm] = denseSolution(system, psi);
        const expected = psi.slice();
        for (let j = 0; j < n; j++) {
          const [re, im] = times(turn ?? [1, 0], [factor * phiRe[j], factor * phiIm[j]]);
          const value = times(phase, [re - psi[2 * j], im - psi[2 * j + 1]]);
          expected.set(value, 2 * j);
        }
        const { diagRe, diagIm, below, above } = system;
        new TwoEndedFactors(diagRe, diagIm, below, above, factor).step(psi, phase, turn);
        // Both sides round; the condition of these systems is below 30.
        psi.forEach((value, i) => {
          expect(Math.abs(value - expected[i])).toBeLessThan(1e-13);
        });
      }
    },
  );

  it.each([399, 400, 401, 402])(
    "keeps an amplitude of 1e-90 right relative to itself, n = %i (closed form of a Toeplitz system)",
    (n) => {
      // i b (phi_(j-1) + phi_(j+1)) + d phi_j = delta_j0, phi = 0 beyond both ends: phi_j = A (l^(j+1) - l^(2n+1-j)),
      // i b (l + 1/l) + d = 0, |l| < 1, A = -1 / (i b (1 - l^(2n+2))).
      const b = -1.5;
      const d: Complex = [2, 3.7];
      // l + 1/l = s = i d / b
      const s: Complex = [-d[1] / b, d[0] / b];
      const square = times(s, s);
      const root = complexRoot([square[0] - 4, square[1]]);
      const candidates: Complex[] = [1, -1].map((sign) => [
        (s[0] + sign * root[0]) / 2,
        (s[1] + sign * root[1]) / 2,
      ]);
      const l = candidates.find(([re, im]) => Math.hypot(re, im) < 1) as Complex;
      const psi = new Float64Array(2 * n);
      psi[0] = 1;
      const fill = (value: number) => new Float64Array(n).fill(value);
      const factor = 4;
      new TwoEndedFactors(fill(d[0]), fill(d[1]), fill(b), fill(b), factor).step(psi, [1, 0]);
      psi[0] += 1;
      const power = (exponent: number): Complex => {
        const modulus = Math.hypot(l[0], l[1]) ** exponent;
        const angle = Math.atan2(l[1], l[0]) * exponent;
        return [modulus * Math.cos(angle), modulus * Math.sin(angle)];
      };
      let least = 1;
      for (let j = 0; j < n; j++) {
        const near = power(j + 1);
        const far = power(2 * n + 1 - j);
        // A = -1 / (i b) = i / b, the far end's share in it is below 1e-180.
        const phi = times([0, 1 / b], [near[0] - far[0], near[1] - far[1]]);
        const size = Math.hypot(phi[0], phi[1]);
        const error = Math.hypot(psi[2 * j] / factor - phi[0], psi[2 * j + 1] / factor - phi[1]) / size;
        // One rounding a row on the way, and as many in the power; measured 2e-13.
        expect(error).toBeLessThan(2e-12);
        least = Math.min(least, size);
      }
      expect(least).toBeLessThan(1e-90);
    },
  );

  it("refuses arrays of different lengths, fewer than three rows, and rows without a pivot", () => {
    const ones = (n: number) => new Float64Array(n).fill(1);
    expect(() => new TwoEndedFactors(ones(2), ones(2), ones(2), ones(2), 1)).toThrow(RangeError);
    expect(() => new TwoEndedFactors(ones(5), ones(5), ones(4), ones(5), 1)).toThrow(/one length/);
    const zero = new Float64Array(5);
    expect(() => new TwoEndedFactors(zero, zero, ones(5), ones(5), 1)).toThrow(/pivot of row 0/);
    const bad = ones(5).fill(Number.NaN, 2, 3);
    expect(() => new TwoEndedFactors(bad, ones(5), ones(5), ones(5), 1)).toThrow(/pivot of row 2/);
  });
});

function complexRoot([re, im]: Complex): Complex {
  const modulus = Math.sqrt(Math.hypot(re, im));
  const angle = Math.atan2(im, re) / 2;
  return [modulus * Math.cos(angle), modulus * Math.sin(angle)];
}
