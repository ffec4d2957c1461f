import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  logistic,
  logisticDifference,
  logisticIntegral,
  logisticSlope,
} from "../../src/numerics/logistic.js";

const end = fc.double({ min: -400, max: 400, noNaN: true });
const length = fc.double({ min: 1e-6, max: 50, noNaN: true });
const options = { seed: 7, numRuns: 500 };

describe("logistic function", () => {
  it("and its slope are symmetric, also where exp overflows", () => {
    for (const z of [0, 1e-9, 0.3, 5, 40, 700]) {
      expect(logistic(z) + logistic(-z)).toBeCloseTo(1, 15);
      expect(logisticSlope(z)).toBe(logisticSlope(-z));
      expect(logisticSlope(z) / (logistic(z) * logistic(-z))).toBeCloseTo(1, 14);
    }
    expect([logistic(-1e9), logistic(1e9), logisticSlope(1e9), logisticSlope(-1e9)]).toEqual([0, 1, 0, 0]);
  });

  it("has an integral between a + d and its mirror image that adds up to d", () => {
    fc.assert(
      fc.property(end, length, (a, d) => {
        const sum = logisticIntegral(a, d) + logisticIntegral(-a - d, d);
        // The far end a + d is rounded by eps |a|, so that is how well the mirror image can be hit.
        expect(Math.abs(sum - d)).toBeLessThanOrEqual(1e-15 * d + 1e-13 * Math.min(d, 1));
      }),
      options,
    );
  });

  it("has integrals that agree with the mean value theorem in a short cell", () => {
    fc.assert(
      fc.property(end, (a) => {
        const d = 1e-4;
        // Midpoint rule: the error is d^2/24 times the second derivative, below 1e-9 of the value for both functions.
        expect(logisticIntegral(a, d) / d / logistic(a + d / 2)).toBeCloseTo(1, 8);
        expect(logisticDifference(a, d) / d / logisticSlope(a + d / 2)).toBeCloseTo(1, 8);
      }),
      options,
    );
  });

  it("has a difference equal to that of its values where those do not cancel", () => {
    for (const [a, d] of [
      [-3, 5],
      [-1, 0.5],
      [0, 2],
      [-40, 80],
      [-2, 2],
    ]) {
      expect(logisticDifference(a, d)).toBeCloseTo(logistic(a + d) - logistic(a), 15);
    }
  });
});
