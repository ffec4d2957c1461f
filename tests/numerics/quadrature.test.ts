import { describe, expect, it } from "vitest";
import { gaussLegendre, integrate } from "../../src/numerics/quadrature.js";

describe("Gauss-Legendre rule", () => {
  it("has the closed-form nodes of 1, 2, 3 and 5 points", () => {
    expect([...gaussLegendre(1).nodes]).toEqual([0]);
    expect(gaussLegendre(2).nodes[1]).toBeCloseTo(1 / Math.sqrt(3), 15);
    expect(gaussLegendre(3).nodes[2]).toBeCloseTo(Math.sqrt(0.6), 15);
    expect(gaussLegendre(3).weights[1]).toBeCloseTo(8 / 9, 15);
    expect(gaussLegendre(5).nodes[4]).toBeCloseTo(Math.sqrt(5 + 2 * Math.sqrt(10 / 7)) / 3, 15);
    expect(gaussLegendre(5).weights[2]).toBeCloseTo(128 / 225, 15);
  });

  it.each([1, 2, 3, 8, 16, 33, 64, 200])("of %i points is exact up to degree 2n - 1, and not at 2n", (n) => {
    const { nodes, weights } = gaussLegendre(n);
    const moment = (degree: number) => nodes.reduce((sum, x, i) => sum + weights[i] * x ** degree, 0);
    for (const degree of [0, 1, 2, n, 2 * n - 2, 2 * n - 1]) {
      if (degree < 2 * n) expect(moment(degree)).toBeCloseTo(degree % 2 ? 0 : 2 / (degree + 1), 13);
    }
    // The defect at degree 2n is 2^(2n+1) (n!)^4 / ((2n+1) ((2n)!)^2), far above round-off for few points.
    if (n <= 8) expect(2 / (2 * n + 1) - moment(2 * n)).toBeGreaterThan(1e-6);
    expect([...nodes].every((x, i) => i === 0 || x > nodes[i - 1])).toBe(true);
  });

  it("refuses a number of points that is none", () => {
    for (const n of [0, -1, 2.5, Number.NaN]) expect(() => gaussLegendre(n)).toThrow(RangeError);
  });
});

describe("integrate", () => {
  it("reaches round-off on a smooth function, whatever the panels", () => {
    for (const panel of [0.3, 1, Number.POSITIVE_INFINITY]) {
      expect(integrate(Math.exp, -1, 2, panel, 16)).toBeCloseTo(Math.E ** 2 - 1 / Math.E, 13);
    }
  });

  it.each([1e-9, 1, 1e9])("gives the same at the scale %d", (scale) => {
    const bell = integrate((x) => Math.exp(-((x / scale) ** 2) / 2), -9 * scale, 9 * scale, scale / 2, 16);
    expect(bell / scale).toBeCloseTo(Math.sqrt(2 * Math.PI), 13);
  });
});
