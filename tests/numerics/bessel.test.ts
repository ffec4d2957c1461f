import { describe, expect, it } from "vitest";
import { besselSeries } from "../../src/numerics/bessel.js";

/** J_n(x) = (1/pi) int_0^pi cos(n t - x sin t) dt by the trapezoidal rule, which is exact to round-off for a periodic integrand. */
function bySum(n: number, x: number): number {
  const points = 2 * Math.ceil(Math.abs(x) + n + 60);
  let sum = 0;
  for (let i = 0; i < points; i++) {
    const t = (2 * Math.PI * i) / points;
    sum += Math.cos(n * t - x * Math.sin(t));
  }
  return sum / points;
}

describe("Bessel functions of the first kind", () => {
  it.each([
    [1, 0, 0.7651976866],
    [1, 1, 0.4400505857],
    [1, 10, 2.630615124e-10],
    [10, 0, -0.2459357645],
    [10, 10, 0.2074861066],
    [100, 0, 0.0199858503],
    [100, 100, 0.0963666733],
  ])(
    "J_n(%s), n = %i, is %s (Abramowitz and Stegun, tables 9.1 and 9.4; values from memory, confirmed by computation)",
    (x, n, value) => {
      expect(Math.abs(besselSeries(x)[n] / value - 1)).toBeLessThan(1e-9);
    },
  );

  it.each([1e-12, 1e-3, 0.5, 2.404825557695773, 7, 31.4, 250, 3000])(
    "agrees with Bessel's integral at %s, and at its negative with the signs of the odd ones turned",
    (x) => {
      const values = besselSeries(x);
      const mirrored = besselSeries(-x);
      const spread = Math.max(1, Math.floor(values.length / 40));
      for (let n = 0; n < values.length; n += spread) {
        // The sum's own rounding: arguments of size x carry x times 1e-16.
        expect(Math.abs(values[n] - bySum(n, x))).toBeLessThan(4e-16 * (4 + x));
        expect(mirrored[n]).toBe(n % 2 === 0 ? values[n] : -values[n]);
      }
    },
  );

  it.each([
    [10, 34],
    [40, 77],
    [100, 149],
    [400, 476],
    [1000, 1102],
    [4000, 4160],
  ])(
    "at R = %i fall below 1e-15 after %i terms (the law R + 10 R^(1/3) of Tal-Ezer and Kosloff, J. Chem. Phys. 81, 3967 (1984); counts computed for this project)",
    (r, terms) => {
      expect(besselSeries(r, 1e-15).length).toBe(terms);
      expect(terms - r).toBeGreaterThan(9.9 * Math.cbrt(r));
      expect(terms - r).toBeLessThan(11.2 * Math.cbrt(r));
    },
  );

  it.each([1e-3, 3, 77, 1500])(
    "sum to one as the generating function demands at %s: J_0 + 2 sum J_2n",
    (x) => {
      const sum = besselSeries(x, 1e-20).reduce((s, v, n) => s + (n === 0 ? v : n % 2 === 0 ? 2 * v : 0), 0);
      expect(Math.abs(sum - 1)).toBeLessThan(1e-14);
    },
  );

  it("of nothing are J_0 = 1 alone", () => {
    expect(Array.from(besselSeries(0))).toEqual([1]);
    expect(Array.from(besselSeries(1e-300))).toEqual([1]);
  });

  it("are refused for arguments that are no numbers and thresholds out of reach", () => {
    for (const x of [Number.NaN, Number.POSITIVE_INFINITY]) expect(() => besselSeries(x)).toThrow(RangeError);
    for (const negligible of [0, 1e-40, 1, Number.NaN])
      expect(() => besselSeries(1, negligible)).toThrow(RangeError);
  });
});
