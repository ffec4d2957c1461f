import { describe, expect, it } from "vitest";
import { SEAM_ROOM } from "../../src/grid/band-limited.js";
import { circleFor, circleGrid, firstSpacing, largestTimeStep, refined } from "../../src/grid/circle.js";
import { departure } from "../../src/grid/journey.js";
import { kineticEnergy } from "../../src/packets/gaussian.js";
import { HBAR } from "../../src/units/constants.js";
import { designOf, MASS, potentialOf } from "./samples.js";

const barrier = potentialOf("rectangular", { height: 0.3, width: 5 });
const from = departure(designOf(barrier, { energy: 0.15, width: 10 }));
const room = { near: 200, far: 120 };

describe("circle", () => {
  it.each([0.1, 0.37, 0.5, 1.3])(
    "for a spacing of %s nm has a power of two of points, none coarser, and all the room",
    (spacing) => {
      const { first, step, points } = circleFor(barrier, from, room, spacing);
      expect(Math.log2(points) % 1).toBe(0);
      expect(step).toBeLessThanOrEqual(spacing);
      expect(step).toBeGreaterThan(spacing / 2);
      expect(first).toBeLessThanOrEqual(-2.5 - room.near - SEAM_ROOM * step);
      expect(first + points * step).toBeGreaterThanOrEqual(2.5 + room.far + SEAM_ROOM * step);
    },
  );

  it("does not double for a rounding error of a whole power of two", () => {
    const need = room.near + room.far + 5;
    const tight = { tight: true };
    expect(circleFor(barrier, from, room, need / 1024, tight).points).toBe(1024);
    expect(circleFor(barrier, from, room, (need / 1024) * (1 - 1e-6), tight).points).toBe(2048);
  });

  it("keeps a forced spacing or number of points", () => {
    expect(circleFor(barrier, from, room, 0.4, { keepStep: true }).step).toBe(0.4);
    expect(circleFor(barrier, from, room, 0.4, { points: 1000 }).points).toBe(1024);
  });

  it("swaps its sides for a packet from the right", () => {
    const right = departure(designOf(barrier, { energy: 0.15, width: 10, from: "right" }));
    const a = circleFor(barrier, from, room, 0.5);
    const b = circleFor(barrier, right, room, 0.5);
    // The two leave the same stretch free, mirrored about the barrier's middle.
    expect(b.first + a.first + a.points * a.step).toBeCloseTo(0, 9);
  });

  it("refined has the old nodes among its own", () => {
    const circle = circleFor(barrier, from, room, 0.5);
    const [coarse, fine] = [circleGrid(circle), circleGrid(refined(circle, 2))];
    expect(fine.x.length).toBe(4 * coarse.x.length);
    for (let j = 0; j < coarse.x.length; j += 31) expect(fine.x[4 * j]).toBeCloseTo(coarse.x[j], 9);
  });

  it("starts finer where V is deeper, higher or changes faster", () => {
    const spacing = (shape: string, values: Record<string, number>) => {
      const potential = potentialOf(shape, values);
      return firstSpacing(potential, departure(designOf(potential, { energy: 0.15, width: 10 })));
    };
    const free = spacing("rectangular", { height: 0.01, width: 5 });
    expect(spacing("rectangular", { height: -1, width: 5 })).toBeLessThan(0.8 * free);
    expect(spacing("rectangular", { height: 3, width: 5 })).toBeLessThan(0.5 * free);
    expect(spacing("sech2", { height: 0.01, width: 0.1 })).toBeLessThan(0.1);
  });

  it("lets no drift turn the fastest momentum by more than pi", () => {
    const dt = largestTimeStep(0.4, MASS, 1.5);
    expect((1.5 * kineticEnergy(Math.PI / 0.4, MASS) * dt) / HBAR).toBeCloseTo(Math.PI, 12);
  });
});
