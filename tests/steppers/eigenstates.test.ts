import { describe, expect, it } from "vitest";
import { closedGrid, type Grid, uniformClosedGrid } from "../../src/grid/grid.js";
import { rectangular } from "../../src/potentials/rectangular.js";
import { crankNicolson } from "../../src/steppers/crank-nicolson.js";
import { eigenstates, MOST_EIGENSTATES } from "../../src/steppers/eigenstates.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { distance, overlap, packetOn, probability, uniform } from "./samples.js";

const MASS = 0.067 * ELECTRON_MASS;
const K0 = Math.sqrt(2 * MASS * 0.2) / HBAR;

/** Nodes on both faces of a barrier 5 nm wide, spacings of 0.25 nm inside and of 0.4 nm outside. */
function unevenGrid(): Grid {
  const outside = Array.from({ length: 240 }, (_, j) => 0.4 * j);
  const inside = Array.from({ length: 19 }, (_, j) => -2.5 + 0.25 * (j + 1));
  return closedGrid(
    Float64Array.from([...outside.map((d) => -2.5 - d).reverse(), ...inside, ...outside.map((d) => 2.5 + d)]),
  );
}

describe("the expansion in eigenstates", () => {
  it("is what Crank-Nicolson of order 6 tends to, also where spacing and mass jump", () => {
    const grid = unevenGrid();
    const potential = rectangular.build({ height: 0.3, width: 5, mass: 2 * MASS }, MASS);
    const system = { grid, potential, particleMass: MASS, referenceEnergy: 0.2 };
    const run = (stepper: ReturnType<typeof eigenstates.prepare>, steps: number) => {
      const psi = packetOn(grid, -45, 5, K0);
      for (let step = 0; step < steps; step++) stepper.advance(psi, 0);
      return psi;
    };
    const exact = run(eigenstates.prepare(system, 60), 1);
    // High momenta that the jumps make, few as they are, are never slow against the step: errors fall, but not as regularly as dt^6.
    const errors = [120, 960].map((steps) =>
      distance(grid, run(crankNicolson.prepare(system, 60 / steps, 6), steps), exact),
    );
    // Measured: 2e-9 and 1e-11.
    expect(errors[1]).toBeLessThan(3e-11);
    expect(errors[0] / errors[1]).toBeGreaterThan(100);
    expect(probability(grid, exact, (x) => x > 2.5)).toBeGreaterThan(0.01);
    expect(probability(grid, exact) / probability(grid, packetOn(grid, -45, 5, K0))).toBeCloseTo(1, 13);
  });

  it("brings two levels of a box back after 2 pi hbar over their distance (closed form: 2 tau (1 - cos(pi k / (n + 1))))", () => {
    const n = 511;
    const length = 64;
    const grid = uniformClosedGrid(length / (n + 1), length / (n + 1), n);
    const system = { grid, potential: uniform(0, MASS), particleMass: MASS };
    const tau = (HBAR * HBAR) / (2 * MASS * grid.finest * grid.finest);
    const state = new Float64Array(2 * n);
    const wave = (k: number, j: number) =>
      Math.sin((Math.PI * k * (j + 1)) / (n + 1)) * Math.sqrt(1 / length);
    for (let j = 0; j < n; j++) state[2 * j] = wave(1, j) + wave(3, j);
    const level = (k: number) => 2 * tau * (1 - Math.cos((Math.PI * k) / (n + 1)));
    const time = (2 * Math.PI * HBAR) / (level(3) - level(1));
    const after = state.slice();
    eigenstates.prepare(system, time).advance(after, 0);
    const [re, im] = overlap(grid, state, after);
    expect(Math.hypot(re, im) / probability(grid, state)).toBeCloseTo(1, 12);
    const half = state.slice();
    eigenstates.prepare(system, time / 2).advance(half, 0);
    // Half-way the two have opposite signs: nothing of the start is left in the overlap.
    expect(Math.hypot(...overlap(grid, state, half))).toBeLessThan(1e-11);
  });

  it("refuses more nodes than it has memory for, before it takes any", () => {
    const grid = uniformClosedGrid(0, 0.1, MOST_EIGENSTATES + 1);
    const attempt = () => eigenstates.prepare({ grid, potential: uniform(0, MASS), particleMass: MASS }, 1);
    expect(attempt).toThrow(RangeError);
    expect(attempt).toThrow(/at most 4096 grid points.*got 4097.*crank-nicolson/);
  });
});
