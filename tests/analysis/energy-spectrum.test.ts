import { describe, expect, it } from "vitest";
import { gridWave, wallDensity, wavenumberDensity } from "../../src/analysis/energy-spectrum.js";
import { periodicGrid, uniformClosedGrid } from "../../src/grid/grid.js";
import { kineticEnergy, sampleGaussian, wavenumberOf, wavenumberWeight } from "../../src/packets/gaussian.js";
import { crankNicolson } from "../../src/steppers/crank-nicolson.js";
import { HBAR } from "../../src/units/constants.js";
import { MASS, potentialOf } from "../grid/samples.js";

describe("plane wave of a grid", () => {
  it.each([0, 0.1, 0.8])(
    "of spacing %s nm solves its dispersion relation, and its slope is dE/dk",
    (step) => {
      const energyOf = (k: number) =>
        step === 0
          ? kineticEnergy(k, MASS)
          : ((2 * HBAR ** 2) / (MASS * step * step)) * Math.sin((k * step) / 2) ** 2;
      for (const energy of [1e-6, 0.01, 0.15, 0.6]) {
        const wave = gridWave(energy, MASS, step);
        if (!wave) throw new Error("inside the band");
        expect(energyOf(wave.k) / energy).toBeCloseTo(1, 12);
        const dk = 1e-4 * wave.k;
        expect((energyOf(wave.k + dk) - energyOf(wave.k - dk)) / (2 * dk) / wave.slope).toBeCloseTo(1, 6);
      }
    },
  );

  it("is undefined at and below zero, above the band, and for NaN", () => {
    const top = (2 * HBAR ** 2) / (MASS * 0.5 * 0.5);
    expect(gridWave(top * 1.0001, MASS, 0.5)).toBeUndefined();
    expect(gridWave(top * 0.9999, MASS, 0.5)).toBeDefined();
    for (const energy of [0, -0.1, Number.NaN]) expect(gridWave(energy, MASS, 0.5)).toBeUndefined();
  });
});

describe("density over wavenumbers", () => {
  it("of a packet is its own, at any k and not only at those of a transform", () => {
    const grid = periodicGrid(-80, 0.25, 640);
    const psi = new Float64Array(1280);
    sampleGaussian(psi, grid.x, { center: 5, width: 6, wavenumber: 0.5 });
    for (const k of [0.3123, 0.5, 0.61, -0.2])
      expect(Math.abs(wavenumberDensity(psi, grid, 0, 640, k) - wavenumberWeight(k, 0.5, 6))).toBeLessThan(
        1e-12,
      );
  });

  it("before a closed end does not change while the packet is turned round there", () => {
    const grid = uniformClosedGrid(0, 0.25, 800);
    const wall = 200;
    const free = potentialOf("rectangular", { height: 0, width: 1 }, 50);
    const stepper = crankNicolson.prepare({ grid, potential: free, particleMass: MASS }, 1);
    const psi = new Float64Array(1600);
    sampleGaussian(psi, grid.x, { center: 120, width: 8, wavenumber: wavenumberOf(0.15, MASS) });
    const k = 0.49;
    const before = wallDensity(psi, grid, 0, 800, k, wall);
    expect(before).toBeCloseTo(wavenumberWeight(k, wavenumberOf(0.15, MASS), 8), 10);
    let sines = 0;
    for (let step = 1; step <= 120; step++) {
      stepper.advance(psi, step);
      const now = wallDensity(psi, grid, 0, 800, k, wall);
      // The sine is an eigenstate of the lattice before the wall, but k is none of the box's: the far end shows in the digits left off.
      sines = Math.max(sines, Math.abs(now / before - 1));
      if (step === 100) expect(wavenumberDensity(psi, grid, 0, 800, k) / before).toBeLessThan(0.5);
    }
    expect(sines).toBeLessThan(1e-8);
  });
});
