import { describe, expect, it } from "vitest";
import { ForwardFft, fftWavenumbers } from "../../src/numerics/fft.js";
import { integrate } from "../../src/numerics/quadrature.js";
import {
  kineticEnergy,
  sampleGaussian,
  wavenumberOf,
  wavenumberSpread,
  wavenumberWeight,
} from "../../src/packets/gaussian.js";
import { ATOMIC_MASS, ELECTRON_MASS } from "../../src/units/constants.js";

const nodes = (first: number, step: number, n: number) =>
  Float64Array.from({ length: n }, (_, j) => first + j * step);

function sampled(x: Float64Array, center: number, width: number, wavenumber: number): Float64Array {
  const psi = new Float64Array(2 * x.length);
  sampleGaussian(psi, x, { center, width, wavenumber });
  return psi;
}

describe("Gaussian packet", () => {
  it("has norm 1, mean x0 and standard deviation sigma of |psi|^2", () => {
    const x = nodes(-60, 0.25, 1024);
    const psi = sampled(x, 31.4, 7, 0.8);
    const moment = (power: number) =>
      x.reduce(
        (sum, at, j) => sum + 0.25 * (psi[2 * j] ** 2 + psi[2 * j + 1] ** 2) * (at - 31.4) ** power,
        0,
      );
    expect(moment(0)).toBeCloseTo(1, 13);
    expect(moment(1)).toBeCloseTo(0, 11);
    expect(Math.sqrt(moment(2))).toBeCloseTo(7, 11);
  });

  it.each([0.8, -0.5])("with k0 = %s / nm has the momentum distribution that it states", (k0) => {
    const [n, step, width] = [1024, 0.25, 7];
    const psi = sampled(nodes(-128, step, n), 3, width, k0);
    const spectrum = new Float64Array(2 * n);
    new ForwardFft(n).forward(spectrum, psi);
    fftWavenumbers(n, n * step).forEach((k, j) => {
      const density = (step * step * (spectrum[2 * j] ** 2 + spectrum[2 * j + 1] ** 2)) / (2 * Math.PI);
      expect(Math.abs(density - wavenumberWeight(k, k0, width))).toBeLessThan(1e-13);
    });
  });

  it("weights of k add up to 1 and spread by 1/(2 sigma)", () => {
    const moment = (power: number) =>
      integrate((k) => wavenumberWeight(k, 0.8, 7) * (k - 0.8) ** power, 0, 1.6, 0.1, 16);
    expect(moment(0)).toBeCloseTo(1, 13);
    expect(Math.sqrt(moment(2))).toBeCloseTo(wavenumberSpread(7), 13);
  });

  it.each([
    [0.067 * ELECTRON_MASS, 0.15],
    [ELECTRON_MASS, 1e-9],
    [87 * ATOMIC_MASS, 1e-12],
    [ELECTRON_MASS, 1e6],
  ])("wavenumber and kinetic energy undo each other for mass %s at %s eV", (mass, energy) => {
    expect(kineticEnergy(wavenumberOf(energy, mass), mass) / energy).toBeCloseTo(1, 14);
  });

  it("of an electron of 1 eV has k = 5.123167223161844 / nm (CODATA 2022, computed)", () => {
    expect(Math.abs(wavenumberOf(1, ELECTRON_MASS) / 5.123167223161844 - 1)).toBeLessThan(1e-14);
  });

  it("refuses a state of the wrong length", () => {
    expect(() =>
      sampleGaussian(new Float64Array(7), nodes(0, 1, 4), { center: 0, width: 1, wavenumber: 0 }),
    ).toThrow(/length 8 is needed for 4 nodes; got 7/);
  });
});
