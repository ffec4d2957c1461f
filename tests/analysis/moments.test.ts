import { describe, expect, it } from "vitest";
import { meanEnergy, positionMoments, wavenumberMoments } from "../../src/analysis/moments.js";
import { closedGrid, type Grid, periodicGrid, uniformClosedGrid } from "../../src/grid/grid.js";
import { sampleGaussian } from "../../src/packets/gaussian.js";
import { HBAR } from "../../src/units/constants.js";

const packet = { center: 17.3, width: 4, wavenumber: -0.7 };

function state(grid: Grid, scale = 1): Float64Array {
  const psi = new Float64Array(2 * grid.x.length);
  sampleGaussian(psi, grid.x, packet);
  return psi.map((value) => value * scale);
}

describe("position", () => {
  it.each([1, 1e-8, 1e8])("of a packet is its centre and width, whatever its norm (factor %s)", (scale) => {
    const grid = periodicGrid(-60, 0.25, 512);
    const { mean, spread } = positionMoments(state(grid, scale), grid);
    expect(mean).toBeCloseTo(17.3, 11);
    expect(spread).toBeCloseTo(4, 11);
  });

  it("keeps the digits of a narrow spread far from the origin", () => {
    const far = 1e6;
    const grid = uniformClosedGrid(far - 40, 0.25, 320);
    const psi = new Float64Array(2 * grid.x.length);
    sampleGaussian(psi, grid.x, { ...packet, center: far + 3 });
    expect(positionMoments(psi, grid).spread).toBeCloseTo(4, 10);
  });
});

describe("wavenumber", () => {
  it("by Fourier transform is exact on a circle: k0 and 1/(2 sigma)", () => {
    const grid = periodicGrid(-60, 0.25, 512);
    const { mean, spread } = wavenumberMoments(grid)(state(grid));
    expect(mean).toBeCloseTo(-0.7, 12);
    expect(spread).toBeCloseTo(1 / 8, 12);
  });

  it("by differences has an error of second order: a quarter of it on half the spacing", () => {
    const errors = [0.2, 0.1, 0.05].map((h) => {
      const grid = uniformClosedGrid(-40, h, Math.round(110 / h));
      const { mean, spread } = wavenumberMoments(grid)(state(grid));
      return [mean + 0.7, spread - 1 / 8];
    });
    for (const which of [0, 1])
      for (const i of [1, 2]) {
        const ratio = errors[i - 1][which] / errors[i][which];
        expect(ratio).toBeGreaterThan(3.8);
        expect(ratio).toBeLessThan(4.2);
      }
    expect(Math.abs(errors[2][0])).toBeLessThan(1e-3);
  });

  it("by differences takes spacings that vary", () => {
    const nodes: number[] = [];
    for (let x = -40; x < 70; x += x < 10 ? 0.05 : 0.1) nodes.push(x);
    const grid = closedGrid(Float64Array.from(nodes));
    // k^3 h^2 / 6 at the coarser spacing.
    expect(Math.abs(wavenumberMoments(grid)(state(grid)).mean + 0.7)).toBeLessThan((0.7 ** 3 * 0.1 ** 2) / 5);
  });
});

describe("mean energy", () => {
  it("of a plane wave of the box is its level, normalised, and the state is left alone", () => {
    const [n, h, mass] = [64, 0.5, 0.38];
    const grid = uniformClosedGrid(h, h, n);
    const wave = Float64Array.from(
      { length: 2 * n },
      (_, i) => (i % 2 ? 2 : -3) * Math.sin((3 * Math.PI * ((i >> 1) + 1)) / (n + 1)),
    );
    const before = wave.slice();
    const scale = HBAR ** 2 / (2 * mass * h * h);
    const apply = (out: Float64Array, psi: Float64Array) => {
      for (let i = 0; i < out.length; i++)
        out[i] = scale * (2 * psi[i] - (psi[i - 2] ?? 0) - (psi[i + 2] ?? 0));
    };
    const energy = meanEnergy(wave, grid, apply, new Float64Array(2 * n));
    expect(energy / (2 * scale * (1 - Math.cos((3 * Math.PI) / (n + 1))))).toBeCloseTo(1, 12);
    expect([...wave]).toEqual([...before]);
  });
});
