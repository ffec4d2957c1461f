import { describe, expect, it } from "vitest";
import { wavenumberOf } from "../../src/packets/gaussian.js";
import { packetAverage } from "../../src/stationary/packet-average.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { slabs } from "../potentials/closed-forms.js";
import { integrateBetween, tanhSinh } from "../potentials/tanh-sinh.js";
import { layers } from "./helpers.js";
import { double, exactTransmission, fixed, over, root } from "./multiprecision.js";

const MASS = 0.067;
const m = MASS * ELECTRON_MASS;
const ONE = fixed(1);

/**
 * A symmetric double barrier in 512-bit arithmetic: 1/T - 1 = x^2 with x(E) = (E - E_r)/gamma near a resonance. E_r by the secant rule on x,
 * whose sign is known on either side, from a guess that is right to 1e-9 eV.
 */
function resonanceOf(
  transmission: (energy: bigint) => bigint,
  guess: number,
): { energy: bigint; gamma: number } {
  const x = (energy: bigint) => root(over(ONE, transmission(energy)) - ONE);
  let energy = fixed(guess);
  let gamma = 0n;
  for (let reach = fixed(1e-7); reach > fixed(1e-40); reach >>= 10n) {
    const [below, above] = [energy - reach, energy + reach];
    const [a, b] = [-x(below), x(above)];
    // Zero of the line through (below, a) and (above, b).
    energy = below - (a * (above - below)) / (b - a);
    gamma = over(above - below, b - a);
  }
  return { energy, gamma: double(gamma) };
}

describe("a packet whose transmission is one narrow resonance, against 512-bit arithmetic", () => {
  it.each([
    [11, 0.1077236802878553, 2.1e-9, 1e-7],
    [13, 0.1077236809869, 7.6e-11, 1e-6],
    [16, 0.1077236810130416, 5.2e-13, 1e-5],
    [20, 0.1077236810132207, 6.8e-16, 3e-4],
  ])("walls of %f nm: E_r near %f eV, width %f eV", (wall, guess, width, known) => {
    const stack = [
      { width: wall, height: 0.5, mass: m },
      { width: 5, height: 0, mass: m },
      { width: wall, height: 0.5, mass: m },
    ];
    const leads = { left: 0, right: 0, massLeft: m, massRight: m };
    const exact = (energy: bigint) => exactTransmission(stack, energy, leads);
    const { energy, gamma } = resonanceOf(exact, guess);
    const sigma = 20;
    const k0 = wavenumberOf(0.1, m);
    const weight = (E: number) => {
      const k = wavenumberOf(E, m);
      const density = Math.sqrt(2 / Math.PI) * sigma * Math.exp(-2 * (sigma * (k - k0)) ** 2);
      return density * (m / (HBAR * HBAR * k));
    };
    const centre = double(energy);
    // Within 1e-5 eV: E - E_r = gamma t, t = tan(theta), T in 512 bits; the integrand is nearly constant then. Beyond: T in double precision.
    const half = 1e-5;
    const peak = tanhSinh(
      (theta) => {
        const t = Math.tan(theta);
        return gamma * (1 + t * t) * weight(centre + gamma * t) * double(exact(energy + fixed(gamma * t)));
      },
      -Math.atan(half / gamma),
      Math.atan(half / gamma),
    );
    const breaks: number[] = [];
    for (let d = half; d < 0.3; d *= 2) breaks.push(centre - d, centre + d);
    breaks.sort((a, b) => a - b);
    const T = slabs(stack);
    const outside = (from: number, to: number) =>
      integrateBetween((E) => weight(E) * T(E, m), from, to, breaks, Number.POSITIVE_INFINITY);
    const reference = peak + outside(0.01, centre - half) + outside(centre + half, 0.28);

    const potential = layers(MASS, [wall, 0.5], [5, 0], [wall, 0.5]);
    const { transmission, resonances } = packetAverage(potential, m, {
      center: -13 * sigma,
      width: sigma,
      wavenumber: k0,
    });
    const context = JSON.stringify({ reference, transmission, resonances });
    // Both sums are right to 1e-11: T beyond the window is known to 1e-16 eV in 1e-5 eV.
    expect(Math.abs(transmission.value - reference), context).toBeLessThanOrEqual(
      transmission.error + 1e-10 * reference,
    );
    expect(transmission.error, context).toBeLessThan(known * reference);
    expect(Math.abs(resonances[0].energy - centre), context).toBeLessThan(1e-15);
    expect(resonances[0].width, context).toBeGreaterThan(0.9 * 2 * gamma);
    expect(resonances[0].width, context).toBeLessThan(1.1 * 2 * gamma);
    expect(Math.abs(2 * gamma - width)).toBeLessThan(0.03 * width);
  });

  it("bounds one of 2e-19 eV, which double precision cannot resolve, by T <= 1", () => {
    const stack = [25, 5, 25].map((width, i) => ({ width, height: i === 1 ? 0 : 0.5, mass: m }));
    const leads = { left: 0, right: 0, massLeft: m, massRight: m };
    const { energy, gamma } = resonanceOf((E) => exactTransmission(stack, E, leads), 0.1077236810132209);
    expect(gamma).toBeLessThan(1e-18);
    const [sigma, k0, k] = [20, wavenumberOf(0.1, m), wavenumberOf(double(energy), m)];
    const density = Math.sqrt(2 / Math.PI) * sigma * Math.exp(-2 * (sigma * (k - k0)) ** 2);
    const area = Math.PI * gamma * density * (m / (HBAR * HBAR * k));
    const potential = layers(MASS, [25, 0.5], [5, 0], [25, 0.5]);
    const { transmission } = packetAverage(potential, m, { center: -260, width: sigma, wavenumber: k0 });
    expect(Math.abs(transmission.value - area)).toBeLessThanOrEqual(transmission.error);
    expect(transmission.error).toBeLessThan(area);
  });
});
