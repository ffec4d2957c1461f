import { describe, expect, it } from "vitest";
import { periodicGrid } from "../../src/grid/grid.js";
import { erfc } from "../../src/numerics/erfc.js";
import { sampleGaussian } from "../../src/packets/gaussian.js";
import { smooth } from "../../src/potentials/smooth.js";
import { chebyshev } from "../../src/steppers/chebyshev.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";

const MASS = 0.067 * ELECTRON_MASS;
const QUANTUM = 0.1;
/** omega (1/fs) and mu = m omega/hbar (1/nm^2). */
const OMEGA = QUANTUM / HBAR;
const MU = (MASS * OMEGA) / HBAR;
const [START, WIDTH] = [-10, 3];

/** V = -m omega^2 x^2/2 on a circle that the packet does not come near the ends of. */
const hilltop = smooth(
  {
    shape: "hilltop",
    value: (x) => -0.5 * MASS * (OMEGA * x) ** 2,
    cellAverage: (a, b) => (-MASS * OMEGA ** 2 * (a * a + a * b + b * b)) / 6,
    faces: [0, 0],
    levelLeft: 0,
    levelRight: 0,
    lowest: Number.NEGATIVE_INFINITY,
    highest: 0,
    scale: 1,
  },
  MASS,
);

/** Mean and standard deviation of a packet that started at the hilltop's flank: the Wigner function moves as classical points do. */
function gaussianAt(time: number, k0: number): { mean: number; deviation: number } {
  const [cosh, sinh] = [Math.cosh(OMEGA * time), Math.sinh(OMEGA * time)];
  return {
    mean: START * cosh + (k0 / MU) * sinh,
    deviation: Math.hypot(WIDTH * cosh, sinh / (2 * MU * WIDTH)),
  };
}

const beyond = ({ mean, deviation }: ReturnType<typeof gaussianAt>) =>
  0.5 * erfc(-mean / (Math.SQRT2 * deviation));

describe("a packet on a parabolic barrier: P(x > 0) tends to erfc(-z/sqrt 2)/2, z = (k0 + mu x0)/sqrt(1/(4 sigma^2) + mu^2 sigma^2) (classical motion of the Wigner function, arXiv:1302.1030)", () => {
  it.each([
    [0.8, 0.3997285989277411],
    [0.9, 0.5264862395232498],
    [1.0, 0.6505958603402821],
  ])("k0 = %f / nm", (k0, published) => {
    expect(MU).toBeCloseTo(0.08792692202820748, 15);
    // exp(-2 omega t) of the way is left after t: 60 fs leave 1e-8, 200 fs nothing that double precision sees.
    expect(beyond(gaussianAt(200, k0))).toBeCloseTo(published, 14);

    const grid = periodicGrid(-128, 0.25, 1024);
    const stepper = chebyshev.prepare({ grid, potential: hilltop, particleMass: MASS }, 6);
    const psi = new Float64Array(2 * grid.x.length);
    sampleGaussian(psi, grid.x, { center: START, width: WIDTH, wavenumber: k0 });
    for (const time of [6, 12]) {
      stepper.advance(psi, time - 6);
      const expected = gaussianAt(time, k0);
      const { mean, deviation } = expected;
      const peak = 1 / (Math.sqrt(2 * Math.PI) * deviation);
      let [norm, first, second, worst] = [0, 0, 0, 0];
      grid.x.forEach((x, j) => {
        const density = psi[2 * j] ** 2 + psi[2 * j + 1] ** 2;
        norm += 0.25 * density;
        first += 0.25 * x * density;
        second += 0.25 * (x - mean) ** 2 * density;
        const exact = peak * Math.exp(-0.5 * ((x - mean) / deviation) ** 2);
        worst = Math.max(worst, Math.abs(density - exact) / peak);
      });
      // The stepper is exact but for rounding, of some thousand terms of a series; measured 2e-14.
      expect(worst).toBeLessThan(1e-13);
      expect(Math.abs(norm - 1)).toBeLessThan(1e-13);
      const measured = { mean: first, deviation: Math.sqrt(second) };
      expect(Math.abs(beyond(measured) - beyond(expected))).toBeLessThan(1e-13);
    }
  });
});
