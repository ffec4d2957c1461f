import { describe, expect, it } from "vitest";
import type { Grid } from "../../src/grid/grid.js";
import { sech2 } from "../../src/potentials/sech2.js";
import { steppers } from "../../src/steppers/registry.js";
import type { StepperDefinition } from "../../src/steppers/stepper.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { distance, gridFor, overlap, packetOn, probability, uniform } from "./samples.js";

/*
 * What every registered stepper must do, whatever its method: a packet of 0.2 eV that meets a smooth barrier of
 * 0.3 eV. It starts well clear of the barrier: on its flank the packet would be torn at once, and the fast part meet the
 * ends of the box, which differ from stepper to stepper.
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
  order: number,
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

const cases = steppers.flatMap((definition) =>
  definition.orders.map((order) => ({ name: definition.name, definition, order })),
);

describe.each(cases)("$name, order $order", ({ definition, order }) => {
  const grid = gridOf(definition, 512);

  it("converges in the time step with the order that it declares", () => {
    // A high, smooth barrier under the packet, so that V and T fail to commute where the packet is. Spacing 0.5 nm: twice
    // that, and V no longer fits the band of the FFT grid well enough for [V, [V, [V, T]]] = 0, which order 6 rests on.
    const grid = gridOf(definition, 512);
    const potential = sech2.build({ height: 4, width: 4 }, MASS);
    const time = 6;
    const run = (chosen: number, steps: number) => {
      const stepper = definition.prepare({ grid, potential, particleMass: MASS }, time / steps, chosen);
      const psi = packetOn(grid, -2, 3, K0);
      for (let step = 0; step < steps; step++) stepper.advance(psi, step * stepper.timeStep);
      return psi;
    };
    const exact = run(Math.max(...definition.orders), 3072);
    const errors = [24, 48, 96, 192, 384, 768, 1536].map((steps) => distance(grid, run(order, steps), exact));
    // The finest halving that stays well above the round-off of some thousand steps.
    const last = errors.findLastIndex((error) => error > 3e-12);
    expect(last).toBeGreaterThan(0);
    expect(Math.abs(Math.log2(errors[last - 1] / errors[last]) - order)).toBeLessThan(0.15);
  });

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

describe.each(steppers)("$name", (definition) => {
  const grid = gridOf(definition, 64);
  const system = { grid, potential: BARRIER, particleMass: MASS };

  it("says what it offers", () => {
    expect(definition.orders).toContain(definition.defaultOrder);
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
    const fine = gridOf(definition, 2048);
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
    const away = packetOn(fine, -40, 4, K0);
    const expected = 0.2 + (HBAR * HBAR) / (2 * MASS) / (4 * 4 * 4);
    expect(Math.abs(meanEnergy(fine, away, applyHamiltonian) / expected - 1)).toBeLessThan(1e-3);
  });
});

describe("steppers against each other on a smooth barrier", () => {
  /**
   * The state at the coarse nodes in the limit of vanishing spacing: on a periodic grid, which is spectral, as it is; on a
   * closed one, where errors go like h^2, h^4, ..., by Romberg over halvings.
   */
  function limit(definition: StepperDefinition): { grid: Grid; psi: Float64Array } {
    const counts = definition.grid === "periodic" ? [1024] : [1024, 2048, 4096, 8192];
    const grids = counts.map((n) => gridOf(definition, n));
    const order = Math.max(...definition.orders);
    let row = grids.map((grid, level) => {
      const psi = advanced(definition, grid, order, 0.125, 400);
      return start(grids[0]).map((_, i) => psi[2 * ((i >> 1) << level) + (i & 1)]);
    });
    for (let column = 1; row.length > 1; column++)
      row = row
        .slice(1)
        .map((finer, level) => finer.map((value, i) => value + (value - row[level][i]) / (4 ** column - 1)));
    return { grid: grids[0], psi: row[0] };
  }

  const [reference, ...others] = steppers;
  it.each(others)(`$name ends in the state of ${reference.name}, phase included`, (other) => {
    const expected = limit(reference);
    const found = limit(other);
    expect(Array.from(found.grid.x)).toEqual(Array.from(expected.grid.x));
    // Left over: h^8 of the coarsest spacings, 0.25 nm, and dt^6 of the implicit step.
    expect(distance(expected.grid, found.psi, expected.psi)).toBeLessThan(1e-8);
    const beyond = (x: number) => x > 0;
    const difference =
      probability(expected.grid, found.psi, beyond) - probability(expected.grid, expected.psi, beyond);
    expect(Math.abs(difference)).toBeLessThan(1e-9);
    expect(probability(expected.grid, expected.psi, beyond)).toBeGreaterThan(0.1);
  });
});
