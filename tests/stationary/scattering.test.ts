import { describe, expect, it } from "vitest";
import { stationaryRefusal } from "../../src/stationary/refusal.js";
import { prepareScattering, scatter } from "../../src/stationary/scattering.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { build, MASS, samples } from "../potentials/samples.js";
import { layers, pieces, shape } from "./helpers.js";

const m = 0.067 * ELECTRON_MASS;
const scattering = samples.filter((sample) => stationaryRefusal(build(sample)) === undefined);

describe("every shape", () => {
  it.each(scattering.map((sample) => [sample.title, build(sample)] as const))(
    "%s: T + R = 1, the same T from both sides, amplitudes that belong to them",
    (_, potential) => {
      const top = Math.max(potential.levelLeft, potential.levelRight);
      for (const above of [1e-4, 0.01, 0.1, 0.3, 1]) {
        const energy = top + above;
        const [left, right] = (["left", "right"] as const).map((from) =>
          scatter(potential, MASS, energy, from),
        );
        for (const { transmission, reflection, transmittedAmplitude: t, reflectedAmplitude: r } of [
          left,
          right,
        ]) {
          expect(Math.abs(transmission.value + reflection.value - 1)).toBeLessThanOrEqual(
            transmission.error + reflection.error,
          );
          const [near, far] =
            transmission === left.transmission
              ? [potential.levelLeft, potential.levelRight]
              : [potential.levelRight, potential.levelLeft];
          const ratio = Math.sqrt((energy - far) / (energy - near));
          // Amplitudes carry no bound of their own; theirs is that of T and R, and E less a level is rounded once more here.
          const slack = 1e-14 + (2e-16 * energy) / above;
          expect(Math.abs(ratio * (t[0] ** 2 + t[1] ** 2) - transmission.value)).toBeLessThan(
            transmission.error + slack,
          );
          expect(Math.abs(r[0] ** 2 + r[1] ** 2 - reflection.value)).toBeLessThan(reflection.error + slack);
        }
        expect(Math.abs(left.transmission.value - right.transmission.value)).toBeLessThanOrEqual(
          left.transmission.error + right.transmission.error,
        );
        // Time reversal: r_left* t_left + r_right t_left* = 0, with equal or unequal levels.
        const [t, a, b] = [left.transmittedAmplitude, left.reflectedAmplitude, right.reflectedAmplitude];
        const re = a[0] * t[0] + a[1] * t[1] + (b[0] * t[0] + b[1] * t[1]);
        const im = a[0] * t[1] - a[1] * t[0] + (b[1] * t[0] - b[0] * t[1]);
        expect(Math.hypot(re, im)).toBeLessThan(1e-11 * Math.hypot(...t));
      }
    },
  );
});

describe("energies between and below the levels", () => {
  const up = shape("step", { height: 0.2, thickness: 1 }, 0.067);

  it("reflects everything, exactly, at and below the far level", () => {
    for (const energy of [0.001, 0.1, 0.2]) {
      const { transmission, reflection, reflectedAmplitude } = scatter(up, m, energy);
      expect([transmission, reflection]).toEqual([
        { value: 0, error: 0 },
        { value: 1, error: 0 },
      ]);
      expect(Math.hypot(...reflectedAmplitude)).toBeCloseTo(1, 12);
    }
  });

  it("gives the amplitude of the decaying wave there: 2k/(k + i kappa) at a sharp step", () => {
    const [k, kappa] = [0.05, 0.15].map((energy) => Math.sqrt(2 * m * energy) / HBAR);
    const { transmittedAmplitude: t } = scatter(pieces([0], [0, 0.2], [0.067, 0.067]), m, 0.05);
    expect(t[0]).toBeCloseTo((2 * k * k) / (k * k + kappa * kappa), 13);
    expect(t[1]).toBeCloseTo((-2 * k * kappa) / (k * k + kappa * kappa), 13);
  });

  it("keeps T honest just above the far level, where E less the level is rounded", () => {
    const sharp = pieces([0], [0, 0.2], [0.067, 0.067]);
    const { transmission } = scatter(sharp, m, 0.2 + 1e-12);
    const [a, b] = [0.2 + 1e-12, 1e-12].map(Math.sqrt);
    expect(Math.abs(transmission.value - (4 * a * b) / (a + b) ** 2)).toBeLessThanOrEqual(transmission.error);
    expect(transmission.error / transmission.value).toBeGreaterThan(1e-6);
  });

  it("refuses an energy at or below the near level", () => {
    for (const energy of [0, -0.1, Number.NaN, Number.POSITIVE_INFINITY])
      expect(() => scatter(up, m, energy)).toThrow(/above the level that the wave comes from, 0 eV/);
    expect(() => scatter(up, m, 0.15, "right")).toThrow(/0\.2 eV, is needed; got 0\.15 eV/);
  });
});

describe("what it refuses", () => {
  it("a potential that confines, with the reason", () => {
    const harmonic = shape("harmonic", { quantum: 0.1 }, 0.067);
    expect(stationaryRefusal(harmonic)).toMatch(/harmonic potential confines the particle/);
    expect(() => scatter(harmonic, m, 0.1)).toThrow(RangeError);
  });

  it("levels and faces that lie at infinity", () => {
    const barrier = shape("sech2", { height: 0.3, width: 2 }, 0.067);
    expect(stationaryRefusal({ ...barrier, levelRight: Number.NEGATIVE_INFINITY })).toMatch(/without limit/);
    expect(stationaryRefusal({ ...barrier, faces: [-5, Number.POSITIVE_INFINITY] })).toMatch(
      /only at infinity/,
    );
    expect(stationaryRefusal(barrier)).toBeUndefined();
  });

  it("a potential built for another particle", () => {
    expect(() => scatter(shape("sech2", { height: 0.3, width: 2 }, 0.067), 2 * m, 0.1)).toThrow(
      /another mass/,
    );
  });
});

describe("scales of 1e-9 to 1e9", () => {
  it("changes nothing but the units", () => {
    const reference = scatter(layers(0.067, [2, 0.5], [5, 0], [2, 0.5]), m, 0.1).transmission;
    for (const [length, energy] of [
      [1e-9, 1e9],
      [1e9, 1e-9],
      [1e6, 1e3],
      [1e-4, 1e-6],
    ]) {
      const heights = [0, 0.5, 0, 0.5, 0].map((height) => height * energy);
      const edges = [0, 2, 7, 9].map((x) => x * length);
      const mass = m / (energy * length * length);
      const potential = pieces(
        edges,
        heights,
        heights.map(() => mass / ELECTRON_MASS),
      );
      const { transmission } = scatter(potential, mass, 0.1 * energy);
      expect(Math.abs(transmission.value - reference.value)).toBeLessThanOrEqual(
        transmission.error + reference.error,
      );
    }
  });
});

describe("bound states", () => {
  it("counts those of a sech2 well: lambda (lambda + 1) K/(m a^2) deep holds lambda (Landau and Lifshitz, par. 23, problem 5, from memory)", () => {
    const unit = HBAR ** 2 / (2 * m * 4);
    for (const [lambda, count] of [
      [0.5, 1],
      [1.5, 2],
      [2.9, 3],
      [4.1, 5],
    ]) {
      const well = shape("sech2", { height: -lambda * (lambda + 1) * unit, width: 2 }, 0.067);
      expect(prepareScattering(well, m).boundStates()).toBe(count);
    }
  });

  it("counts none in barriers, steps and free space, one in a point well", () => {
    expect(prepareScattering(layers(0.067, [2, 0.5], [5, 0], [2, 0.5]), m).boundStates()).toBe(0);
    expect(prepareScattering(shape("step", { height: -0.2, thickness: 1 }, 0.067), m).boundStates()).toBe(0);
    expect(prepareScattering(pieces([0, 5], [0, 0, 0], [0.067, 0.067, 0.067]), m).boundStates()).toBe(0);
    expect(prepareScattering(shape("delta", { strength: -0.1 }, 0.067), m, "right").boundStates()).toBe(1);
  });
});
