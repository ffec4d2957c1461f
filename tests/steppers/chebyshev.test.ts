import { describe, expect, it } from "vitest";
import { periodicGrid } from "../../src/grid/grid.js";
import { besselSeries } from "../../src/numerics/bessel.js";
import { harmonic } from "../../src/potentials/harmonic.js";
import { rectangular } from "../../src/potentials/rectangular.js";
import { chebyshev, chebyshevTerms } from "../../src/steppers/chebyshev.js";
import { splitOperator } from "../../src/steppers/split-operator.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { distance, packetOn, probability, uniform } from "./samples.js";

const MASS = 0.067 * ELECTRON_MASS;
const K0 = Math.sqrt(2 * MASS * 0.2) / HBAR;

describe("the Chebyshev expansion", () => {
  it.each([1, 7])(
    "returns a packet of the harmonic oscillator with its sign turned after one period, in %i steps (closed form: levels (n + 1/2) hbar omega)",
    (steps) => {
      const quantum = 0.05;
      const grid = periodicGrid(-60, 120 / 512, 512);
      const potential = harmonic.build({ quantum }, MASS);
      const period = (2 * Math.PI * HBAR) / quantum;
      const start = packetOn(grid, -6, 3, 0.1);
      const stepper = chebyshev.prepare({ grid, potential, particleMass: MASS }, period / steps);
      const psi = start.slice();
      for (let step = 0; step < steps; step++) stepper.advance(psi, 0);
      const back = psi.map((value) => -value);
      // V reaches 4 eV and T 102 eV on this grid: some 6700 terms, each with a few roundings.
      expect(distance(grid, back, start)).toBeLessThan(1e-11);
      expect(distance(grid, psi, start)).toBeGreaterThan(1.9);
    },
  );

  it("is what the split operator tends to where V has jumps, slowly as that converges there", () => {
    const grid = periodicGrid(-64, 0.25, 512);
    const potential = rectangular.build({ height: 0.3, width: 5 }, MASS);
    const system = { grid, potential, particleMass: MASS };
    const run = (stepper: ReturnType<typeof chebyshev.prepare>, steps: number) => {
      const psi = packetOn(grid, -30, 4, K0);
      for (let step = 0; step < steps; step++) stepper.advance(psi, 0);
      return psi;
    };
    const exact = run(chebyshev.prepare(system, 30), 1);
    const errors = [2000, 4000].map((steps) =>
      distance(grid, run(splitOperator.prepare(system, 30 / steps, 2), steps), exact),
    );
    // Order 2 at last, because now no drift turns the fastest momentum by more than pi; measured: 4.6e-5 and 1.1e-5.
    expect(errors[1]).toBeLessThan(2e-5);
    expect(Math.abs(Math.log2(errors[0] / errors[1]) - 2)).toBeLessThan(0.1);
    expect(probability(grid, exact, (x) => x > 2.5)).toBeGreaterThan(0.05);
  });

  it("plans no fewer terms than it takes, and few more", () => {
    for (const r of [0.1, 1, 3, 10, 40, 100, 400, 1000, 4000]) {
      const planned = chebyshevTerms((2 * r * HBAR) / 0.5, 0.5);
      const taken = besselSeries(r).length;
      expect(planned).toBeGreaterThanOrEqual(taken);
      expect(planned - taken).toBeLessThan(6 + 2 * Math.cbrt(r));
    }
  });

  it("refuses a mass that varies, and a step of more terms than can be kept", () => {
    const grid = periodicGrid(-64, 0.25, 512);
    const heavy = rectangular.build({ height: 0.3, width: 5, mass: 2 * MASS }, MASS);
    expect(chebyshev.refusal(heavy)).toMatch(/crank-nicolson/);
    expect(() => chebyshev.prepare({ grid, potential: heavy, particleMass: MASS }, 1)).toThrow(/one mass/);
    const free = { grid, potential: uniform(0, MASS), particleMass: MASS };
    expect(() => chebyshev.prepare(free, 1e9)).toThrow(/shorter/);
  });
});
