import { describe, expect, it } from "vitest";
import type { Potential } from "../../src/potentials/potential.js";
import { profile, strengthPoints } from "../../src/potentials/profile.js";
import { shapeNamed } from "../../src/potentials/registry.js";
import { build, MASS, samples } from "./samples.js";

const make = (shape: string, values: object): Potential => {
  const definition = shapeNamed(shape);
  if (definition === undefined) throw new Error(shape);
  return definition.build(values as never, MASS);
};

describe("profile", () => {
  it("of a barrier is its six corners", () => {
    expect(profile(make("rectangular", { height: 0.3, width: 5 }), -10, 10, 500)).toEqual([
      { x: -10, energy: 0 },
      { x: -2.5, energy: 0 },
      { x: -2.5, energy: 0.3 },
      { x: 2.5, energy: 0.3 },
      { x: 2.5, energy: 0 },
      { x: 10, energy: 0 },
    ]);
  });

  it("gives one point where only the mass jumps", () => {
    const layers = [{ width: 2, height: 0, mass: 2 * MASS }];
    expect(profile(make("layers", { layers }), -1, 3, 9).map((point) => point.x)).toEqual([-1, 0, 2, 3]);
  });

  it("leaves out interfaces outside the window", () => {
    const points = profile(make("rectangular", { height: 0.3, width: 5 }), -1, 10, 2);
    expect(points.map((point) => point.x)).toEqual([-1, 2.5, 2.5, 10]);
  });

  it("spends its samples where V is curved, however wide the window", () => {
    const points = profile(make("gaussian", { height: 0.3, width: 2 }), -1e6, 1e6, 401);
    expect(points.length).toBe(403);
    expect(Math.max(...points.map((point) => point.energy))).toBe(0.3);
  });

  it.each(samples.map((sample) => [sample.title, sample] as const))(
    "of %s lies on V, x never falling",
    (_, sample) => {
      const potential = build(sample);
      const points = profile(potential, -20, 15, 101);
      expect(points[0].x).toBe(-20);
      expect(points[points.length - 1].x).toBe(15);
      points.forEach(({ x, energy }, i) => {
        if (i > 0) expect(x).toBeGreaterThanOrEqual(points[i - 1].x);
        if (i > 1) expect(x, "at most two points share a place").toBeGreaterThan(points[i - 2].x);
        if (!potential.interfaces.includes(x)) expect(energy).toBe(potential.value(x));
      });
    },
  );

  it("refuses an empty or endless window and a single sample", () => {
    const barrier = make("rectangular", { height: 0.3, width: 5 });
    for (const [from, to, count] of [
      [1, 1, 5],
      [2, 1, 5],
      [0, Number.POSITIVE_INFINITY, 5],
      [Number.NaN, 1, 5],
      [0, 1, 1],
      [0, 1, 2.5],
    ]) {
      expect(() => profile(barrier, from, to, count)).toThrow(RangeError);
    }
  });
});

describe("points of strength", () => {
  it("are found for a delta and nowhere else", () => {
    for (const sample of samples) {
      const points = strengthPoints(build(sample));
      if (sample.shape === "delta") {
        expect(points.length).toBe(1);
        expect(points[0].x).toBe(0);
        expect(points[0].strength).toBeCloseTo(sample.values.strength as number, 12);
      } else {
        expect(points).toEqual([]);
      }
    }
  });
});
