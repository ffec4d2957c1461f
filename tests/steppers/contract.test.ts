import { describe, expect, it } from "vitest";
import { finiteVolume } from "../../src/grid/finite-volume.js";
import type { Grid } from "../../src/grid/grid.js";
import { tridiagonalEigen } from "../../src/numerics/tridiagonal-eigen.js";
import { sech2 } from "../../src/potentials/sech2.js";
import { chebyshev } from "../../src/steppers/chebyshev.js";
import { eigenstates } from "../../src/steppers/eigenstates.js";
import { steppers } from "../../src/steppers/registry.js";
import type { StepperDefinition, System } from "../../src/steppers/stepper.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { distance, gridFor, overlap, packetOn, probability, uniform } from "./samples.js";

/*
 * What every registered stepper must do, whatever its method: a packet of 0.2 eV that meets a smooth barrier of
 * 0.3 eV. It starts well clear of the barrier: on its flank the packet would be torn at once, and the fast part meet the
 * ends of the box, which differ from stepper to stepper. Those that are exact in time are the reference of the others on their kind of grid.
 */

const MASS = 0.067 * ELECTRON_MASS;
const BARRIER = sech2.build({ height: 0.3, width: 2 }, MASS);
const LENGTH = 256;
const K0 = Math.sqrt(2 * MASS * 0.2) / HBAR;

const gridOf = (definition: StepperDefinition, n: number): Grid =>
  gridFor(definition, -LENGTH / 2, LENGTH / n, n);
const start = (grid: Grid) => packetOn(grid, -40, 5, K0);

/** The state after `steps` steps of `timeStep`. */
function advanced(
  definition: StepperDefinition,
  grid: Grid,
  order: number | undefined,
  timeStep: number,
  steps: number,
  psi = start(grid),
): Float64Array {
  const stepper = definition.prepare({ grid, potential: BARRIER, particleMass: MASS }, timeStep, order);
  for (let step = 0; step < steps; step++) stepper.advance(psi, step * timeStep);
  return psi;
}

function meanEnergy(
  grid: Grid,
  psi: Float64Array,
  apply: (out: Float64Array, psi: Float64Array) => void,
): number {
  const image = new Float64Array(psi.length);
  apply(image, psi);
  return overlap(grid, psi, image)[0] / probability(grid, psi);
}

const isExact = ({ defaultOrder }: StepperDefinition) => defaultOrder === "exact";
/** The stepper that is exact in time on the same kind of grid, with the same discrete Hamiltonian. */
const referenceOf = ({ grid }: StepperDefinition) => (grid === "periodic" ? chebyshev : eigenstates);

const cases = steppers.flatMap((definition) =>
  (isExact(definition) ? [undefined] : definition.orders).map((order) => ({
    name: definition.name,
    definition,
    order,
    label: order === undefined ? "exact in time" : `order ${order}`,
  })),
);

describe.each(cases)("$name, $label", ({ definition, order }) => {
  const grid = gridOf(definition, 512);

  it(
    order === undefined
      ? "has an error that does not depend on the time step"
      : "converges in the time step with the order that it declares",
    () => {
      // A high, smooth barrier under the packet, so that V and T fail to commute where the packet is. Spacing 0.5 nm: twice
      // that, and V no longer fits the band of the FFT grid well enough for [V, [V, [V, T]]] = 0, which order 6 rests on.
      const grid = gridOf(definition, 512);
      const potential = sech2.build({ height: 4, width: 4 }, MASS);
      const time = 6;
      const run = (by: StepperDefinition, chosen: number | undefined, steps: number) => {
        const stepper = by.prepare({ grid, potential, particleMass: MASS }, time / steps, chosen);
        const psi = packetOn(grid, -2, 3, K0);
        for (let step = 0; step < steps; step++) stepper.advance(psi, step * stepper.timeStep);
        return psi;
      };
      const exact = run(referenceOf(definition), undefined, 1);
      if (order === undefined) {
        for (const steps of [3, 24, 384])
          expect(distance(grid, run(definition, order, steps), exact)).toBeLessThan(1e-12);
        return;
      }
      const errors = [24, 48, 96, 192, 384, 768, 1536].map((steps) =>
        distance(grid, run(definition, order, steps), exact),
      );
      // The finest halving that stays well above the round-off of some thousand steps.
      const last = errors.findLastIndex((error) => error > 3e-12);
      expect(last).toBeGreaterThan(0);
      expect(Math.abs(Math.log2(errors[last - 1] / errors[last]) - order)).toBeLessThan(0.15);
    },
  );

  if (definition.conserves.includes("norm"))
    it("keeps the norm to round-off", () => {
      const before = probability(grid, start(grid));
      const after = probability(grid, advanced(definition, grid, order, 0.3, 200));
      // At most 11 transforms or 3 solutions a step, 200 steps; measured: below 3e-13.
      expect(Math.abs(after / before - 1)).toBeLessThan(2e-12);
    });

  if (definition.conserves.includes("energy"))
    it("keeps <H> to round-off", () => {
      const { applyHamiltonian } = definition.prepare(
        { grid, potential: BARRIER, particleMass: MASS },
        1,
        order,
      );
      const before = meanEnergy(grid, start(grid), applyHamiltonian);
      const after = meanEnergy(grid, advanced(definition, grid, order, 0.3, 200), applyHamiltonian);
      expect(Math.abs(after - before)).toBeLessThan(1e-12);
    });

  it("composes: going on from where it stopped is as if it had never stopped", () => {
    if (order === undefined) {
      const whole = advanced(definition, grid, order, 40, 1);
      const parts = [11, 29].reduce(
        (psi, time) => advanced(definition, grid, order, time, 1, psi),
        start(grid),
      );
      expect(distance(grid, parts, whole)).toBeLessThan(1e-12);
    } else {
      // At equal steps to the last bit: a stepper keeps nothing of what it has seen.
      const whole = advanced(definition, grid, order, 0.3, 40);
      const part = advanced(definition, grid, order, 0.3, 11);
      expect(advanced(definition, grid, order, 0.3, 29, part)).toEqual(whole);
    }
  });

  it("leaves stationary states as they are and turns their phase", () => {
    const timeStep = order === undefined ? 20 : 0.05;
    const steps = 20 / timeStep;
    for (const { system, state, energy, exact } of stationaryStates(definition)) {
      const stepper = definition.prepare({ ...system, referenceEnergy: 0.1 }, timeStep, order);
      const psi = state.slice();
      for (let step = 0; step < steps; step++) stepper.advance(psi, step * timeStep);
      const [re, im] = overlap(system.grid, state, psi).map((c) => c / probability(system.grid, state));
      const turnedState = psi.map((_, i) =>
        i % 2 === 0 ? re * state[i] - im * state[i + 1] : re * state[i] + im * state[i - 1],
      );
      // What a splitting leaves of an eigenstate of H, and what any stepper with an order leaves of its phase: 400 times x^3 / 12
      // and less, with x = 0.01 at most. Measured: 7e-6, 5e-12, 1e-13.
      const error = ({ 2: 2e-5, 4: 2e-11 } as Record<number, number>)[order ?? 0] ?? 0;
      expect(distance(system.grid, psi, turnedState)).toBeLessThan((exact ? 0 : error) + 1e-12);
      const turned = Math.atan2(im, re) + (energy * 20) / HBAR;
      expect(Math.abs(Math.sin(turned / 2))).toBeLessThan(error + 1e-12);
    }
  });

  it("goes back to where it started with the time step reversed", () => {
    const there = advanced(definition, grid, order, 0.3, 100);
    const moved = distance(grid, there, start(grid));
    const back = advanced(definition, grid, order, -0.3, 100, there);
    expect(moved).toBeGreaterThan(1);
    expect(distance(grid, back, start(grid))).toBeLessThan(1e-12);
  });

  it("turns the phase by exp(-i V t / hbar), and does nothing else, for a V the same everywhere", () => {
    const level = 0.15;
    const time = 20;
    const run = (potential: ReturnType<typeof uniform>, referenceEnergy: number) => {
      const system = { grid, potential, particleMass: MASS, referenceEnergy };
      const stepper = definition.prepare(system, 0.5, order);
      const psi = start(grid);
      for (let step = 0; step < time / 0.5; step++) stepper.advance(psi, 0.5 * step);
      return psi;
    };
    // The reference energy rises with V: an implicit step is a rational function of H - E_ref, so only then is the statement exact.
    const free = run(uniform(0, MASS), 0.2);
    const lifted = run(uniform(level, MASS), 0.2 + level);
    const [re, im] = [Math.cos((-level * time) / HBAR), Math.sin((-level * time) / HBAR)];
    const turned = free.map((value, i) =>
      i % 2 === 0 ? re * value - im * free[i + 1] : re * value + im * free[i - 1],
    );
    expect(distance(grid, lifted, turned)).toBeLessThan(1e-12);
    expect(distance(grid, lifted, free)).toBeGreaterThan(0.5);
  });

  it("allocates nothing while it advances", () => {
    const stepper = definition.prepare({ grid, potential: BARRIER, particleMass: MASS }, 0.1, order);
    const psi = start(grid);
    const batch = () => {
      const before = process.memoryUsage();
      for (let step = 0; step < 20; step++) stepper.advance(psi, 0);
      const after = process.memoryUsage();
      return after.heapUsed - before.heapUsed + (after.arrayBuffers - before.arrayBuffers);
    };
    // The least of many batches, because compilers and collectors allocate and free beside it. One state in every step
    // would be 20 times 8 kB, one number in every row 20 times 6 kB.
    const grown = Array.from({ length: 80 }, batch).filter((bytes) => bytes >= 0);
    expect(grown.length).toBeGreaterThan(10);
    expect(Math.min(...grown)).toBeLessThan(20 * 4096);
  });
});

interface Stationary {
  readonly system: System;
  readonly state: Float64Array;
  readonly energy: number;
  /** True where every step, of any order, leaves the state as it is. */
  readonly exact: boolean;
}

/**
 * Stationary states of a stepper's own discrete Hamiltonian: on a closed grid some of its eigenvectors, on a circle plane waves of a uniform V
 * and the bound state sech(x/a) of the well -2 E_a sech^2(x/a), E_a = hbar^2 / 2 m a^2, at -E_a (Poeschl and Teller, Z. Phys. 83, 143
 * (1933), citation from memory).
 */
function stationaryStates(definition: StepperDefinition): Stationary[] {
  const grid = gridOf(definition, 512);
  const n = grid.x.length;
  if (definition.grid === "closed") {
    const system = { grid, potential: BARRIER, particleMass: MASS };
    const { diagonal, coupling } = finiteVolume(grid, BARRIER);
    const { values, vectors } = tridiagonalEigen(
      diagonal,
      Float64Array.from(
        { length: n - 1 },
        (_, j) => -coupling[j + 1] / Math.sqrt(grid.weight[j] * grid.weight[j + 1]),
      ),
    );
    return [0, 7, 30].map((k) => {
      const state = new Float64Array(2 * n);
      for (let j = 0; j < n; j++) state[2 * j] = vectors[k * n + j] / Math.sqrt(grid.weight[j]);
      return { system, state, energy: values[k], exact: true };
    });
  }
  const level = 0.15;
  const waves = [0, 5, -20].map((wave) => {
    const k = (2 * Math.PI * wave) / LENGTH;
    const state = new Float64Array(2 * n);
    grid.x.forEach((x, j) => {
      state[2 * j] = Math.cos(k * x) / Math.sqrt(LENGTH);
      state[2 * j + 1] = Math.sin(k * x) / Math.sqrt(LENGTH);
    });
    const system = { grid, potential: uniform(level, MASS), particleMass: MASS };
    return { system, state, energy: level + (HBAR * k) ** 2 / (2 * MASS), exact: true };
  });
  const a = 3;
  const energy = (HBAR / a) ** 2 / (2 * MASS);
  const state = new Float64Array(2 * n);
  grid.x.forEach((x, j) => {
    state[2 * j] = 1 / Math.cosh(x / a) / Math.sqrt(2 * a);
  });
  const system = {
    grid,
    potential: sech2.build({ height: -2 * energy, width: a }, MASS),
    particleMass: MASS,
  };
  return [...waves, { system, state, energy: -energy, exact: false }];
}

describe.each(steppers)("$name", (definition) => {
  const grid = gridOf(definition, 64);
  const system = { grid, potential: BARRIER, particleMass: MASS };

  it("says what it offers", () => {
    if (isExact(definition)) expect(definition.orders).toEqual([]);
    else expect(definition.orders).toContain(definition.defaultOrder);
    expect(definition.prepare(system, 1).order).toBe(definition.defaultOrder);
    expect(definition.source.length).toBeGreaterThan(20);
    expect(definition.refusal(BARRIER)).toBeUndefined();
  });

  it("refuses an order that it does not offer, a time step that is none, and the other kind of grid", () => {
    for (const order of [0, 1, 3, 5, 100, Number.NaN])
      expect(() => definition.prepare(system, 1, order)).toThrow(RangeError);
    for (const timeStep of [0, Number.NaN, Number.POSITIVE_INFINITY])
      expect(() => definition.prepare(system, timeStep)).toThrow(/time step/);
    const ends = definition.grid === "periodic" ? "closed" : "periodic";
    const other = gridFor({ ...definition, grid: ends }, -LENGTH / 2, 4, 64);
    expect(() => definition.prepare({ ...system, grid: other }, 1)).toThrow(/grid/);
    const { applyHamiltonian } = definition.prepare(system, 1);
    const psi = start(grid);
    expect(() => applyHamiltonian(psi, psi)).toThrow(RangeError);
  });

  it("has a Hamiltonian that is Hermitian and gives a plane packet its kinetic energy", () => {
    const fine = gridFor(definition, -LENGTH / 4, LENGTH / 2048, 1024);
    const { applyHamiltonian } = definition.prepare({ ...system, grid: fine }, 1);
    const a = packetOn(fine, -15, 5, K0);
    const b = packetOn(fine, 2, 4, -0.5 * K0);
    const image = new Float64Array(a.length);
    applyHamiltonian(image, b);
    const [abRe, abIm] = overlap(fine, a, image);
    applyHamiltonian(image, a);
    const [baRe, baIm] = overlap(fine, b, image);
    expect(Math.abs(abRe - baRe)).toBeLessThan(1e-14);
    expect(Math.abs(abIm + baIm)).toBeLessThan(1e-14);
    // hbar^2 (k0^2 + 1/(4 sigma^2)) / 2m, far from the barrier; three points are short by (k h)^2 / 12 of it, 0.0005 here.
    const away = packetOn(fine, -32, 4, K0);
    const expected = 0.2 + (HBAR * HBAR) / (2 * MASS) / (4 * 4 * 4);
    expect(Math.abs(meanEnergy(fine, away, applyHamiltonian) / expected - 1)).toBeLessThan(1e-3);
  });
});

describe("steppers against each other on a smooth barrier", () => {
  const beyond = (x: number) => x > 0;

  it.each(cases.filter(({ definition, order }) => order === Math.max(...definition.orders)))(
    "$name of $label ends in the state of the exact stepper on its grid, phase included",
    ({ definition, order }) => {
      const grid = gridOf(definition, 1024);
      const expected = advanced(referenceOf(definition), grid, undefined, 50, 1);
      // 400 steps; left over: dt^6.
      expect(distance(grid, advanced(definition, grid, order, 0.125, 400), expected)).toBeLessThan(1e-10);
      expect(probability(grid, expected, beyond)).toBeGreaterThan(0.1);
    },
  );

  it("the two exact ones agree in the limit of vanishing spacing, phase included", () => {
    const time = 60;
    // Half the energy, so that the waves are longer against the spacing, and ten widths from the barrier: neither end sees 1e-12 of it.
    const slow = (definition: StepperDefinition, n: number) => {
      const grid = gridOf(definition, n);
      const psi = packetOn(grid, -60, 6, K0 * Math.SQRT1_2);
      definition.prepare({ grid, potential: BARRIER, particleMass: MASS }, time).advance(psi, 0);
      return new Float64Array(2 * 256).map((_, i) => psi[2 * (i >> 1) * (n / 256) + (i & 1)]);
    };
    // On a closed grid errors go like h^2, h^4, ...: Neville's scheme in h^2. On a circle they are spectral.
    const counts = [512, 768, 1024, 1280, 1536];
    let row = counts.map((n) => slow(eigenstates, n));
    for (let column = 1; row.length > 1; column++)
      row = row.slice(1).map((finer, level) => {
        const ratio = (counts[level + column] / counts[level]) ** 2;
        return finer.map((value, i) => value + (value - row[level][i]) / (ratio - 1));
      });
    const coarse = gridOf(chebyshev, 256);
    const expected = slow(chebyshev, 1024);
    // Left over: the product of the five h^2, 2e-6, times k^10 and some; measured: 1e-9, and a fifteenth of what four leave.
    expect(distance(coarse, row[0], expected)).toBeLessThan(4e-9);
    const difference = probability(coarse, row[0], beyond) - probability(coarse, expected, beyond);
    expect(Math.abs(difference)).toBeLessThan(1e-9);
    expect(probability(coarse, expected, beyond)).toBeGreaterThan(0.001);
  });
});
