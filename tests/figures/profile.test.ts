import { describe, expect, it } from "vitest";
import { energyRange, massStretches, pointsOf, sampleProfile } from "../../src/figures/profile.js";
import { massText } from "../../src/figures/profile-panel.js";
import { delta } from "../../src/potentials/delta.js";
import { gaussian } from "../../src/potentials/gaussian.js";
import { layers } from "../../src/potentials/layers.js";
import { ATOMIC_MASS, ELECTRON_MASS } from "../../src/units/constants.js";
import { inventedProfile, smoothProfile } from "./invented.js";

describe("sampleProfile", () => {
  it("draws an interface as a vertical between the values on its two sides", () => {
    const line = sampleProfile(inventedProfile([-2.5, 2.5], [0.3], { right: -0.1 }), -100, 100, 500);
    expect(line.x).toEqual([-100, -2.5, -2.5, 2.5, 2.5, 100]);
    expect(line.energy).toEqual([0, 0, 0.3, 0.3, -0.1, -0.1]);
  });

  it("sees a structure much thinner than a sample", () => {
    const line = sampleProfile(
      smoothProfile((x) => Math.exp(-(x * x) / 2e-6), { faces: [-0.01, 0.01] }),
      -100,
      100,
      50,
    );
    expect(Math.max(...line.energy)).toBeGreaterThan(0.99);
  });

  it("holds the shapes of the library", () => {
    const barrier = layers.build(
      {
        layers: [
          { width: 2.5, height: 0.3, mass: 0.09 * ELECTRON_MASS },
          { width: 5, height: 0, mass: undefined },
        ],
      },
      0.067 * ELECTRON_MASS,
    );
    expect(sampleProfile(barrier, -10, 20, 100).x).toEqual([-10, 0, 0, 2.5, 2.5, 20]);
    const hill = gaussian.build({ height: 2, width: 3, center: 0 }, ELECTRON_MASS);
    const line = sampleProfile(hill, -10, 10, 100);
    line.x.forEach((x, n) => {
      expect(line.energy[n]).toBeCloseTo(2 * Math.exp((-x * x) / 18), 12);
    });
  });
});

describe("pointsOf", () => {
  it("finds a delta of the library with its strength, and none in other shapes", () => {
    const [point, ...others] = pointsOf(delta.build({ strength: -0.4 }, ELECTRON_MASS), -50, 80);
    expect(others).toEqual([]);
    expect(point.x).toBe(0);
    expect(point.strength).toBeCloseTo(-0.4, 12);
    expect(pointsOf(inventedProfile([-5, -2, 1], [0.3, -0.3]), -50, 50)).toEqual([]);
  });

  it("finds deltas that stand on steps", () => {
    const found = pointsOf(inventedProfile([0, 5], [3], { strengths: [0.2, 0] }), -50, 50);
    expect(found).toHaveLength(1);
    expect(found[0].strength).toBeCloseTo(0.2, 9);
  });

  it("leaves out what lies outside the drawing", () => {
    expect(pointsOf(inventedProfile([0], [], { strengths: [1] }), 5, 50)).toEqual([]);
  });
});

describe("energyRange", () => {
  const range = (profile = inventedProfile([-5, 5], [0.3]), energy?: number) =>
    energyRange(profile, sampleProfile(profile, -150, 150, 600), pointsOf(profile, -150, 150), energy);

  it("holds the potential, its levels and the mean energy", () => {
    const [low, high] = range(inventedProfile([-5, 5], [0.3], { right: -0.2 }), 0.5);
    expect(low).toBeLessThan(-0.2);
    expect(high).toBeGreaterThan(0.5);
    expect(high - low).toBeLessThan(1.5 * 0.7);
  });

  it("cuts a confining potential off at a few times the energy", () => {
    const well = smoothProfile((x) => 0.01 * x * x, {
      confining: true,
      levelLeft: Number.POSITIVE_INFINITY,
      levelRight: Number.POSITIVE_INFINITY,
    });
    const [low, high] = range(well, 2);
    expect(low).toBeLessThan(0);
    expect(high).toBeGreaterThan(3);
    expect(high).toBeLessThan(8);
  });

  it("never collapses, and takes a wall that is infinite", () => {
    for (const profile of [
      inventedProfile([], []),
      smoothProfile((x) => (x < 0 ? Number.POSITIVE_INFINITY : 0)),
    ]) {
      const [low, high] = range(profile);
      expect(Number.isFinite(low) && Number.isFinite(high)).toBe(true);
      expect(high).toBeGreaterThan(low);
    }
  });
});

describe("massStretches", () => {
  it("lists the layers whose mass differs, and names the masses", () => {
    const found = massStretches(inventedProfile([0, 2, 7, 9], [0.3, 0, 0.3], { masses: [2, 1, 3] }), -50, 50);
    expect(found.map(({ from, to }) => [from, to])).toEqual([
      [0, 2],
      [7, 9],
    ]);
    expect(massText(found)).toBe("0.13–0.2 mₑ");
    expect(massText(found.slice(0, 1))).toBe("0.134 mₑ");
    expect(massText([])).toBeUndefined();
    expect(massText([{ from: 0, to: 1, mass: 86.9092 * ATOMIC_MASS }])).toBe("86.9 u");
    expect(massStretches(inventedProfile([0, 2], [0.3]), -50, 50)).toEqual([]);
  });
});
