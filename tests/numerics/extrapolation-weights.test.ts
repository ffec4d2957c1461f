import { describe, expect, it } from "vitest";
import { Extrapolation } from "../../src/numerics/extrapolation.js";
import { extrapolationWeights, weightedSum } from "../../src/numerics/extrapolation-weights.js";

const SPACINGS = [1 / 8, 1 / 12, 1 / 16, 1 / 20];

describe("weights of an extrapolation to vanishing spacing", () => {
  it("add up a series in h^2 to its value at zero, exactly up to as many terms as there are spacings", () => {
    const weights = extrapolationWeights(SPACINGS);
    const f = (h: number) => 0.7 - 3 * h ** 2 + 11 * h ** 4 - 5 * h ** 6;
    const sum = weights.reduce((total, w, i) => total + w * f(SPACINGS[i]), 0);
    expect(sum).toBeCloseTo(0.7, 13);
    expect(weights.reduce((total, w) => total + w, 0)).toBeCloseTo(1, 13);
  });

  it("give the number of the tableau for any measurements", () => {
    const measured = [0.31, 0.36, 0.35, 0.33];
    const tableau = new Extrapolation();
    SPACINGS.forEach((h, i) => {
      tableau.add(h, measured[i]);
    });
    const arrays = measured.map((value) => Float64Array.of(value, 2 * value));
    const sum = weightedSum(extrapolationWeights(SPACINGS), arrays);
    expect(sum[0]).toBeCloseTo(tableau.result.value, 12);
    expect(sum[1]).toBeCloseTo(2 * tableau.result.value, 12);
  });

  it("refuse a spacing that comes twice", () => {
    expect(() => extrapolationWeights([0.5, 0.5])).toThrow(RangeError);
  });
});
