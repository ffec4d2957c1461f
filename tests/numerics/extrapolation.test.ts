import { describe, expect, it } from "vitest";
import { ALONE, Extrapolation } from "../../src/numerics/extrapolation.js";

/** Spacings of the Crank-Nicolson study, relative to its first. */
const CELLS = [1, 2, 3, 4, 6, 8];

function extrapolated(cells: readonly number[], f: (h: number) => number) {
  const tableau = new Extrapolation();
  return cells.map((n) => tableau.add(1 / n, f(1 / n)));
}

/** Trapezoidal rule with n panels: its error is a series in h^2 (Euler-Maclaurin). */
function trapezoid(f: (x: number) => number, a: number, b: number, n: number): number {
  const h = (b - a) / n;
  let sum = 0.5 * (f(a) + f(b));
  for (let i = 1; i < n; i++) sum += f(a + i * h);
  return sum * h;
}

describe("extrapolation to vanishing spacing", () => {
  it.each([1, 2, 3, 4, 5])(
    "is exact for a polynomial of degree %i in h^2 once it has one value more",
    (degree) => {
      const coefficients = [0.3, -2, 1.5, 4, -3, 0.7].slice(0, degree + 1);
      const steps = extrapolated(CELLS, (h) => coefficients.reduce((sum, c, j) => sum + c * h ** (2 * j), 0));
      expect(Math.abs(steps[degree].value - 0.3)).toBeLessThan(1e-13);
      // And not before, or the test would show nothing.
      expect(Math.abs(steps[degree - 1].value - 0.3)).toBeGreaterThan(1e-5);
    },
  );

  it("has no bound after one measurement and a cautious one after two", () => {
    const tableau = new Extrapolation();
    expect(tableau.result).toEqual({ value: Number.NaN, error: Number.POSITIVE_INFINITY });
    expect(tableau.add(1, 5)).toEqual({ value: 5, error: Number.POSITIVE_INFINITY });
    // 4 + (4 - 5) / (4 - 1), which changes the row's last by 1/3.
    const { value, error } = tableau.add(0.5, 4);
    expect(value).toBeCloseTo(4 - 1 / 3, 15);
    expect(error).toBeCloseTo(ALONE.factor / 3, 14);
    expect(tableau.result).toEqual({ value, error });
  });

  const integrals: readonly (readonly [string, (x: number) => number, number, number, number])[] = [
    ["exp x from 0 to 1", Math.exp, 0, 1, Math.E - 1],
    ["sin x from 0 to pi", Math.sin, 0, Math.PI, 2],
    ["1/(1 + x^2) from 0 to 1", (x) => 1 / (1 + x * x), 0, 1, Math.PI / 4],
    ["1/x from 1 to 4", (x) => 1 / x, 1, 4, Math.log(4)],
    ["cos 5x from 0 to 2", (x) => Math.cos(5 * x), 0, 2, Math.sin(10) / 5],
    [
      "1/(0.1 + x^2) from -1 to 1",
      (x) => 1 / (0.1 + x * x),
      -1,
      1,
      (2 / Math.sqrt(0.1)) * Math.atan(1 / Math.sqrt(0.1)),
    ],
  ];
  it.each(integrals)(
    "of the trapezoidal rule for %s keeps its bound from the fourth value on",
    (_title, f, a, b, exact) => {
      // Eight panels to start with: the last integrand has poles at distance 0.32, which four do not resolve, and then there is no series.
      const steps = extrapolated([...CELLS, 12, 16], (h) => trapezoid(f, a, b, Math.round(8 / h)));
      for (const { value, error } of steps.slice(3))
        expect(Math.abs(value - exact)).toBeLessThanOrEqual(error + 1e-14 * Math.abs(exact));
      const last = steps[steps.length - 1];
      expect(last.error).toBeLessThan(1e-5 * Math.abs(exact));
      // Worth the name: far better than its best measurement.
      expect(Math.abs(last.value - exact)).toBeLessThan(
        1e-4 * Math.abs(trapezoid(f, a, b, 128) - exact) + 1e-14,
      );
    },
  );

  it("does not take one small change for convergence: the changes before have a say", () => {
    // A cubic in h^2 but for the fourth value, made to leave the extrapolated value where it was.
    const cubic = (h: number) => 1 + 0.5 * h ** 2 + 0.3 * h ** 4 + 0.2 * h ** 6;
    const tableau = new Extrapolation();
    for (const cells of [1, 2, 3]) tableau.add(1 / cells, cubic(1 / cells));
    const third = tableau.result;
    // The parabola in h^2 through the first three values, at the fourth spacing: no fourth term shows.
    const at = (h: number) => {
      const [a, b, c] = [1, 1 / 4, 1 / 9];
      const [fa, fb, fc] = [cubic(1), cubic(1 / 2), cubic(1 / 3)];
      const x = h * h;
      return (
        (fa * (x - b) * (x - c)) / ((a - b) * (a - c)) +
        (fb * (x - a) * (x - c)) / ((b - a) * (b - c)) +
        (fc * (x - a) * (x - b)) / ((c - a) * (c - b))
      );
    };
    const fourth = tableau.add(1 / 4, at(1 / 4));
    expect(Math.abs(fourth.value - third.value)).toBeLessThan(1e-14);
    expect(fourth.error).toBeGreaterThan(1e-4);
  });

  it("passes NaN on as a bound that nothing meets", () => {
    const steps = extrapolated([1, 2, 3], (h) => (h < 0.4 ? Number.NaN : h));
    expect(steps[2].error <= 1).toBe(false);
  });

  it("refuses spacings that do not fall, and says which", () => {
    const tableau = new Extrapolation();
    tableau.add(0.5, 1);
    expect(() => tableau.add(0.5, 1)).toThrow(/spacings must fall; got 0\.5 after 0\.5/);
    expect(() => tableau.add(Number.NaN, 1)).toThrow(RangeError);
  });
});
