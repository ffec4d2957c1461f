import { erf } from "mathjs";
import { describe, expect, it } from "vitest";
import { erfc, normalTail } from "../../src/numerics/erfc.js";
import { integrate } from "../../src/numerics/quadrature.js";

const SQRT_PI = Math.sqrt(Math.PI);

/** What erfc promises: 1e-13 relative, down to the least normal number. */
const RELATIVE = 1e-13;

/**
 * erfc x = (2/sqrt pi) exp(-x^2) integral_0^inf exp(-s^2 - 2 x s) ds: by quadrature, with x^2 split so that the exponential keeps its digits.
 */
function byQuadrature(x: number): number {
  const reach = Math.min(7, 40 / x);
  const head = Math.fround(x);
  const square = Math.exp(-head * head) * Math.exp(-(x - head) * (x + head));
  return (2 / SQRT_PI) * square * integrate((s) => Math.exp(-s * (s + 2 * x)), 0, reach, reach / 40, 16);
}

describe("erfc", () => {
  it.each([
    [0.5, 0.4795001221869535],
    [1, 0.15729920705028513],
    [2, 0.004677734981047266],
    [3, 2.209049699858544e-5],
    [5, 1.5374597944280349e-12],
    [10, 2.088487583762545e-45],
  ])("of %s is %s (values from memory, tables of the error function)", (x, value) => {
    expect(Math.abs(erfc(x) / value - 1)).toBeLessThan(RELATIVE);
  });

  it("agrees with a general-purpose library's erf where that does not cancel", () => {
    // The library's erf is good to some units in the last place of 1.
    for (let x = -3; x <= 3; x += 0.01) expect(Math.abs(erfc(x) - (1 - erf(x)))).toBeLessThan(1e-15);
  });

  it("keeps its digits relative to itself far out, and across the change of method", () => {
    for (const x of [0.2, 1, 1.5, 1.999999, 2, 2.000001, 2.5, 4, 7.3, 12, 20, 25.9])
      expect(Math.abs(erfc(x) / byQuadrature(x) - 1), `at ${x}`).toBeLessThan(RELATIVE);
  });

  it("is 1 at 0, 2 and 0 at the ends, and passes NaN on", () => {
    expect(erfc(0)).toBe(1);
    expect(erfc(Number.NEGATIVE_INFINITY)).toBe(2);
    expect(erfc(Number.POSITIVE_INFINITY)).toBe(0);
    expect(erfc(40)).toBe(0);
    expect(erfc(Number.NaN)).toBeNaN();
    expect(erfc(-0.7) + erfc(0.7)).toBeCloseTo(2, 15);
  });
});

describe("tail of the normal distribution", () => {
  it.each([
    [0, 0.5],
    [1, 0.15865525393145705],
    [6, 9.865876450376981e-10],
  ])("above %s standard deviations is %s (values from memory, statistical tables)", (z, value) => {
    expect(Math.abs(normalTail(z) / value - 1)).toBeLessThan(RELATIVE);
  });
});
