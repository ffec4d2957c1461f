import { describe, expect, it } from "vitest";
import { kaiserFall } from "../../src/numerics/kaiser.js";

const COUNTS = [1, 2, 7, 100, 1001];
const BETAS = [0, 1e-9, 3, 18, 40];

describe("a fall after Kaiser's window", () => {
  it.each(COUNTS.flatMap((count) => BETAS.map((beta) => [count, beta])))(
    "of %i steps, beta = %d, falls from 1 to 0, each step down, and is its own complement turned round",
    (count, beta) => {
      const fall = kaiserFall(count, beta);
      expect(fall).toHaveLength(count + 1);
      expect(fall[0]).toBe(1);
      expect(fall[count]).toBe(0);
      for (let i = 0; i < count; i++) {
        // The window's first and last values may be below a unit in the last place of 1.
        expect(fall[i]).toBeGreaterThanOrEqual(fall[i + 1]);
        // Rounding of a sum of `count` terms.
        expect(Math.abs(fall[i] + fall[count - i] - 1)).toBeLessThan(1e-16 * (4 + count));
      }
      const middle = Math.floor(count / 2);
      if (count > 1) expect(fall[middle]).toBeGreaterThan(fall[middle + 1]);
    },
  );

  it("is a straight line for beta = 0, and nothing at all over no steps", () => {
    kaiserFall(10, 0).forEach((value, i) => {
      expect(value).toBeCloseTo(1 - i / 10, 15);
    });
    expect([...kaiserFall(0, 18)]).toEqual([1]);
  });

  /** |sum_i (w_(i-1) - w_i) exp(i theta i)|: the part of a tone that is cut off by w. */
  function leakage(count: number, beta: number, theta: number): number {
    const fall = kaiserFall(count, beta);
    let [re, im] = [0, 0];
    for (let i = 1; i <= count; i++) {
      re += (fall[i - 1] - fall[i]) * Math.cos(theta * i);
      im += (fall[i - 1] - fall[i]) * Math.sin(theta * i);
    }
    return Math.hypot(re, im);
  }

  it.each([4, 12, 18, 25])(
    "leaks beta/sinh(beta) sin(r)/r, r^2 = (theta n/2)^2 - beta^2, of a tone (transform of the window: Kaiser & Schafer, IEEE Trans. ASSP 28, 105 (1980), citation from memory), beta = %d",
    (beta) => {
      const count = 2000;
      for (const x of [0.3 * beta, 0.9 * beta, 1.1 * beta, 2 * beta, 5 * beta]) {
        const r = Math.sqrt(Math.abs(x * x - beta * beta));
        const exact = (beta / Math.sinh(beta)) * Math.abs((x > beta ? Math.sin(r) : Math.sinh(r)) / r);
        // The transform of samples differs from that of the window by its jump at the ends, I_0(0) of I_0(beta), and by (theta/2)^2/6.
        const theta = (2 * x) / count;
        expect(Math.abs(leakage(count, beta, theta) - exact)).toBeLessThan(
          (theta * theta * exact) / 6 + 4 * beta * Math.exp(-beta) * theta + 1e-15,
        );
      }
    },
  );

  it("lets less than 2 e^-beta through everywhere beyond theta n/2 = 2 beta, where a sudden end lets through all", () => {
    const [count, beta] = [600, 18];
    for (let x = 2 * beta; x < 8 * beta; x += 0.37) {
      expect(leakage(count, beta, (2 * x) / count)).toBeLessThan(2 * Math.exp(-beta));
    }
    expect(leakage(1, beta, (4 * beta) / count)).toBeCloseTo(1, 12);
  });
});
