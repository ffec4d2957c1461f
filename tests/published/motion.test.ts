import { describe, expect, it } from "vitest";
import { type Grid, periodicGrid, uniformClosedGrid } from "../../src/grid/grid.js";
import { sampleGaussian } from "../../src/packets/gaussian.js";
import { harmonic } from "../../src/potentials/harmonic.js";
import { crankNicolson } from "../../src/steppers/crank-nicolson.js";
import { splitOperator } from "../../src/steppers/split-operator.js";
import type { Stepper } from "../../src/steppers/stepper.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { distance, overlap, packetOn, probability, uniform } from "../steppers/samples.js";

/* Motions with a closed form, nm, eV, fs. Every tolerance is the round-off of the method unless its line says otherwise. */

const GAAS = 0.067 * ELECTRON_MASS;

function run(stepper: Stepper, psi: Float64Array, steps: number): void {
  for (let step = 0; step < steps; step++) stepper.advance(psi, step * stepper.timeStep);
}

/** <x> and the standard deviation of |psi|^2. */
function position(grid: Grid, psi: Float64Array): { mean: number; spread: number } {
  const moment = (power: number, about: number) => {
    let sum = 0;
    grid.x.forEach((x, j) => {
      sum += grid.weight[j] * (psi[2 * j] ** 2 + psi[2 * j + 1] ** 2) * (x - about) ** power;
    });
    return sum / probability(grid, psi);
  };
  const mean = moment(1, 0);
  return { mean, spread: Math.sqrt(moment(2, mean)) };
}

const size = ([re, im]: readonly [number, number]) => Math.hypot(re, im);

describe("free spreading", () => {
  it.each([
    {
      mass: 1,
      width: 1,
      length: 160,
      n: 1024,
      values: [
        [1, 1.001673867276254],
        [10, 1.155445212208995],
        [50, 3.06208114856828],
        [100, 5.874126645014469],
      ],
    },
    {
      mass: 0.067,
      width: 5,
      length: 2400,
      n: 4096,
      values: [
        [10, 5.2901372932207],
        [50, 9.981924390021735],
        [100, 17.9876418163261],
        [500, 86.53832360758487],
      ],
    },
  ])(
    "sigma(t) = sigma sqrt(1 + (hbar t / 2 m sigma^2)^2), m = $mass m_e, sigma = $width nm (Schiff, Quantum Mechanics; citation from memory)",
    ({ mass, width, length, n, values }) => {
      const grid = periodicGrid(-length / 2, length / n, n);
      const particleMass = mass * ELECTRON_MASS;
      for (const [time, expected] of values) {
        const psi = packetOn(grid, 0, width, 0);
        const system = { grid, potential: uniform(0, particleMass), particleMass };
        run(splitOperator.prepare(system, time / 10), psi, 10);
        const { mean, spread } = position(grid, psi);
        // The box reaches 13 sigma(t) either side: what wraps around weighs less than round-off.
        expect(Math.abs(spread / expected - 1)).toBeLessThan(1e-12);
        expect(Math.abs(mean)).toBeLessThan(1e-11);
      }
    },
  );
});

describe("a coherent state in a harmonic well (Schrodinger, Naturwissenschaften 14, 664 (1926); citation from memory)", () => {
  const quantum = 0.1;
  const period = 41.35667696923859;
  const sigma = 2.38464682167658;
  const amplitude = 8;
  const grid = periodicGrid(-32, 64 / 128, 128);
  const potential = harmonic.build({ quantum }, GAAS);
  const steps = 400;

  it("has the period 2 pi / omega and sigma^2 = hbar / 2 m omega of the table", () => {
    expect(Math.abs((2 * Math.PI * HBAR) / quantum / period - 1)).toBeLessThan(1e-15);
    expect(Math.abs(Math.sqrt((HBAR * HBAR) / (2 * GAAS * quantum)) / sigma - 1)).toBeLessThan(1e-14);
  });

  it("keeps its width, follows the classical orbit, and is itself again after a period", () => {
    // Order 6 at 400 steps a period: (omega dt)^6 = 1.5e-11 times a constant far below one.
    const stepper = splitOperator.prepare({ grid, potential, particleMass: GAAS }, period / steps, 6);
    const psi = packetOn(grid, amplitude, sigma, 0);
    const start = psi.slice();
    for (let step = 1; step <= steps; step++) {
      stepper.advance(psi, 0);
      const { mean, spread } = position(grid, psi);
      expect(Math.abs(mean - amplitude * Math.cos((2 * Math.PI * step) / steps))).toBeLessThan(1e-11);
      expect(Math.abs(spread / sigma - 1)).toBeLessThan(1e-11);
    }
    // The vacuum energy hbar omega / 2 turns the sign over a period.
    const [re, im] = overlap(grid, start, psi);
    expect(Math.abs(re + 1)).toBeLessThan(1e-11);
    expect(Math.abs(im)).toBeLessThan(1e-11);
  });

  it("moves by Strang splitting exactly as leapfrog does: cos(omega' dt) = 1 - (omega dt)^2 / 2, 1000 steps at omega dt = 0.3 (metaplectic argument; Hairer, Lubich, Wanner, Geometric Numerical Integration, citation from memory)", () => {
    const phase = 0.3;
    const turned = Math.acos(1 - phase ** 2 / 2);
    expect(Math.abs(turned / phase - 1.003788485177907)).toBeLessThan(1e-14);
    const stepper = splitOperator.prepare(
      { grid, potential, particleMass: GAAS },
      (phase * HBAR) / quantum,
      2,
    );
    const psi = packetOn(grid, amplitude, sigma, 0);
    let worst = 0;
    for (let step = 1; step <= 1000; step++) {
      stepper.advance(psi, 0);
      worst = Math.max(worst, Math.abs(position(grid, psi).mean - amplitude * Math.cos(turned * step)));
    }
    // Round-off of 1000 steps on a length of 8 nm.
    expect(worst).toBeLessThan(1e-11);
    // Against the true frequency the packet would be half a turn out: the test can tell.
    expect(Math.abs(Math.cos(turned * 1000) - Math.cos(phase * 1000))).toBeGreaterThan(0.5);
  });
});

describe("revival on a circle: levels n^2 E1, E1 = hbar^2 (2 pi / L)^2 / 2m (Robinett, arXiv:quant-ph/0307041, for the box)", () => {
  const length = 10;
  const revival = 18.4220418744374;
  const n = 256;
  const grid = periodicGrid(-length / 2, length / n, n);
  const system = { grid, potential: uniform(0, GAAS), particleMass: GAAS };

  it("is complete at T = m L^2 / (pi hbar)", () => {
    const exact = (GAAS * length ** 2) / (Math.PI * HBAR);
    expect(Math.abs(exact / revival - 1)).toBeLessThan(1e-14);
    for (const steps of [1, 16, 100]) {
      const psi = packetOn(grid, -1, 0.5, 6);
      const start = psi.slice();
      run(splitOperator.prepare(system, exact / steps), psi, steps);
      // The kinetic phases themselves are rounded: up to 2 pi 128^2 at the edge of the band, 2 pi 20^2 where the packet is.
      expect(distance(grid, psi, start)).toBeLessThan(1e-11);
    }
  });

  it("is complete at half that time too, shifted by half the circle", () => {
    const psi = packetOn(grid, -1, 0.5, 6);
    const shifted = psi.map((_, i) => psi[(i + n) % (2 * n)]);
    run(splitOperator.prepare(system, (GAAS * length ** 2) / (2 * Math.PI * HBAR) / 16), psi, 16);
    expect(distance(grid, psi, shifted)).toBeLessThan(1e-11);
  });
});

describe("revival in a box with hard walls (Aronstein and Stroud, Phys. Rev. A 55, 4526 (1997); Robinett, arXiv:quant-ph/0307041)", () => {
  const length = 10;
  const revival = 73.68816749774977;
  const interior = (cells: number) => uniformClosedGrid(length / cells, length / cells, cells - 1);
  const system = (grid: Grid) => ({ grid, potential: uniform(0, GAAS), particleMass: GAAS });
  const packet = (grid: Grid) => {
    const psi = packetOn(grid, 4, 0.6, 1);
    const norm = Math.sqrt(probability(grid, psi));
    return psi.map((value) => value / norm);
  };

  it("turns every level of the lattice, E_l = (4 tau) sin^2(l pi / 2 N), by its own Cayley phase: (2 / dt) tan(omega dt / 2) = E / hbar", () => {
    const cells = 200;
    const grid = interior(cells);
    const h = length / cells;
    const timeStep = revival / 300;
    const stepper = crankNicolson.prepare(system(grid), timeStep, 2);
    const psi = packet(grid);
    const start = psi.slice();
    run(stepper, psi, 300);
    // Sine transform by its definition: the levels of the lattice are sin(l pi j / N).
    const expected = new Float64Array(psi.length);
    for (let l = 1; l < cells; l++) {
      const energy = ((2 * HBAR * HBAR) / (GAAS * h * h)) * Math.sin((l * Math.PI) / (2 * cells)) ** 2;
      const angle = -2 * 300 * Math.atan((energy * timeStep) / (2 * HBAR));
      let re = 0;
      let im = 0;
      for (let j = 1; j < cells; j++) {
        const level = Math.sin((Math.PI * ((l * j) % (2 * cells))) / cells);
        re += (2 / cells) * level * start[2 * (j - 1)];
        im += (2 / cells) * level * start[2 * (j - 1) + 1];
      }
      for (let j = 1; j < cells; j++) {
        const level = Math.sin((Math.PI * ((l * j) % (2 * cells))) / cells);
        expected[2 * (j - 1)] += level * (re * Math.cos(angle) - im * Math.sin(angle));
        expected[2 * (j - 1) + 1] += level * (re * Math.sin(angle) + im * Math.cos(angle));
      }
    }
    expect(distance(grid, psi, expected)).toBeLessThan(1e-11);
    // The same state is far from where it began: the time step is coarse for the upper levels.
    expect(distance(grid, psi, start)).toBeGreaterThan(1e-3);
  });

  it.each([
    { part: 1, mirrored: false },
    { part: 2, mirrored: true },
  ])(
    "comes back at T_rev / $part, T_rev = 4 m L^2 / (pi hbar) = 73.688 fs for 10 nm and 0.067 m_e (mirrored: $mirrored)",
    ({ part, mirrored }) => {
      const exact = (4 * GAAS * length ** 2) / (Math.PI * HBAR);
      expect(Math.abs(exact / revival - 1)).toBeLessThan(1e-14);
      const missing = [400, 800].map((cells) => {
        const grid = interior(cells);
        const psi = packet(grid);
        const n = grid.x.length;
        // psi(x, T/2) = -psi(L - x, 0)
        const target = psi.map((value, i) => (mirrored ? -psi[2 * (n - 1 - (i >> 1)) + (i & 1)] : value));
        run(crankNicolson.prepare(system(grid), exact / part / 2000, 6), psi, 2000);
        return distance(grid, psi, target);
      });
      // The lattice's levels lie (l pi / N)^2 / 12 below those of the box, so the packet, made of l up to about 15, comes
      // back short by a phase of about 2 pi l^4 pi^2 / (12 N^2), a quarter of it at half the spacing.
      expect(missing[1]).toBeLessThan(0.02);
      expect(Math.abs(Math.log2(missing[0] / missing[1]) - 2)).toBeLessThan(0.05);
    },
  );
});

describe("a uniform grid of plane waves", () => {
  it("lets a packet keep its momentum distribution to round-off while it moves freely", () => {
    const grid = periodicGrid(-100, 200 / 512, 512);
    const psi = packetOn(grid, -20, 6, 0.8);
    const still = new Float64Array(psi.length);
    sampleGaussian(still, grid.x, { center: -20, width: 6, wavenumber: 0.8 });
    const stepper = splitOperator.prepare({ grid, potential: uniform(0, GAAS), particleMass: GAAS }, 1, 4);
    run(stepper, psi, 20);
    run(splitOperator.prepare({ grid, potential: uniform(0, GAAS), particleMass: GAAS }, -20, 2), psi, 1);
    expect(Math.abs(size(overlap(grid, still, psi)) - 1)).toBeLessThan(1e-12);
    expect(distance(grid, still, psi)).toBeLessThan(1e-12);
  });
});
