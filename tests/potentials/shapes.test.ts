import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { build, MASS, samples, scaled } from "./samples.js";
import { integrateBetween } from "./tanh-sinh.js";

const PROPERTY = { seed: 20240229, numRuns: 200 };

/** Relative agreement, with an absolute floor for sums that cancel. */
function expectClose(actual: number, expected: number, relative: number, floor = 0): void {
  expect(Math.abs(actual - expected)).toBeLessThanOrEqual(relative * Math.abs(expected) + floor);
}

describe.each(samples.map((sample) => [sample.title, sample] as const))("%s", (_title, sample) => {
  const potential = build(sample);
  const { interfaces, faces } = potential;
  /** A length that the sample lives on, for choosing places. */
  const reach = Number.isFinite(faces[1] - faces[0]) ? Math.max(10, faces[1] - faces[0]) : 30;
  const height = Math.max(
    0.1,
    Math.abs(potential.lowest),
    Number.isFinite(potential.highest) ? potential.highest : 1,
  );
  // Whole steps of reach/2^30: cells from 1e-8 of the structure up, and zero itself now and then.
  const place = fc
    .oneof(fc.constant(0), fc.integer({ min: -(2 ** 30), max: 2 ** 30 }))
    .map((i) => (i / 2 ** 30) * reach);
  const offInterface = place.filter((x) => interfaces.every((edge) => Math.abs(x - edge) > 1e-9));

  it("has the V(x) of its formula", () => {
    fc.assert(
      fc.property(offInterface, (x) => {
        // exp(x/width) and its square carry |x/width| round-offs: 1e-13 covers |x/width| up to some hundred.
        expectClose(potential.value(x), sample.formula(x, MASS), 1e-13, 1e-16 * height);
      }),
      PROPERTY,
    );
  });

  it("is the mean of both sides at an interface", () => {
    for (const x of interfaces) {
      const beside = 1e-9;
      expectClose(
        potential.value(x),
        (potential.value(x - beside) + potential.value(x + beside)) / 2,
        1e-14,
        1e-16,
      );
      expectClose(potential.mass(x), (potential.mass(x - beside) + potential.mass(x + beside)) / 2, 1e-14);
    }
  });

  it("averages over a cell as an independent quadrature does", () => {
    const width = fc.double({ min: 1e-3, max: 3, noNaN: true });
    const panel = Math.min(1, potential.scale / 2);
    fc.assert(
      fc.property(place, width, (a, w) => {
        const b = a + w;
        fc.pre(b > a);
        const covered = sample.shape !== "delta" || a > 0 || b < 0 ? 0 : a < 0 && b > 0 ? 1 : 0.5;
        const points = covered === 0 ? 0 : covered * (sample.values.strength as number);
        const integral = integrateBetween((x) => potential.value(x), a, b, interfaces, panel) + points;
        // 3e-13: the ends a and b = a + w are themselves known to eps |a|, felt as |a|/scale eps in an exponential tail.
        expectClose(potential.cellAverage(a, b), integral / (b - a), 3e-13, 1e-300);
      }),
      PROPERTY,
    );
  });

  it("averages over wide cells too", () => {
    for (const [a, b] of [
      [-3 * reach, 2 * reach],
      [-reach, 1e-3],
      [-1e-3, reach],
    ]) {
      const points = sample.shape === "delta" ? (sample.values.strength as number) : 0;
      const panel = Math.min(1, potential.scale);
      const integral = integrateBetween((x) => potential.value(x), a, b, interfaces, panel) + points;
      expectClose(potential.cellAverage(a, b), integral / (b - a), 2e-14, 1e-16 * height);
    }
  });

  it("has cell averages that add up, ends on interfaces included", () => {
    const ends = fc.oneof(place, fc.constantFrom(...interfaces, 0));
    fc.assert(
      fc.property(fc.uniqueArray(ends, { minLength: 3, maxLength: 3 }), (three) => {
        const [a, b, c] = three.sort((p, q) => p - q);
        const sum = potential.cellAverage(a, b) * (b - a) + potential.cellAverage(b, c) * (c - b);
        const whole = potential.cellAverage(a, c) * (c - a);
        expectClose(sum, whole, 1e-13, 4e-16 * height * (c - a));
        const mass = potential.massAverage(a, b) * (b - a) + potential.massAverage(b, c) * (c - b);
        expectClose(mass, potential.massAverage(a, c) * (c - a), 1e-13);
      }),
      PROPERTY,
    );
  });

  it("averages the mass as the quadrature does", () => {
    const integral = integrateBetween((x) => potential.mass(x), -3, 9.5, interfaces, 20);
    expectClose(potential.massAverage(-3, 9.5), integral / 12.5, 1e-14);
    const differs = interfaces.some((x) => potential.mass(x - 1e-9) !== potential.mass(x + 1e-9));
    expect(potential.uniformMass).toBe(!differs);
    expect(potential.mass(-1e6)).toBe(MASS);
    expect(potential.mass(1e6)).toBe(MASS);
  });

  it("keeps V within its extremes, and reaches them", () => {
    let least = Number.POSITIVE_INFINITY;
    let most = Number.NEGATIVE_INFINITY;
    for (let i = -20000; i <= 20000; i++) {
      const v = potential.value((i / 20000) * reach);
      least = Math.min(least, v);
      most = Math.max(most, v);
    }
    expect(least).toBeGreaterThanOrEqual(potential.lowest - 2e-16 * height);
    expect(most).toBeLessThanOrEqual(potential.highest + 2e-16 * height);
    // The samples stand at most reach/20000 from the top: V is flat there, so the square of that over the width counts.
    expectClose(least, potential.lowest, 1e-5, 1e-12);
    if (Number.isFinite(potential.highest)) expectClose(most, potential.highest, 1e-5, 1e-12);
  });

  it("equals its levels to round-off beyond its faces, and not long before", () => {
    if (potential.confining) {
      expect(potential.levelLeft).toBe(Number.POSITIVE_INFINITY);
      expect(potential.levelRight).toBe(Number.POSITIVE_INFINITY);
      expect(faces).toEqual([Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY]);
      expect(potential.value(-1e6)).toBeGreaterThan(1e6);
      return;
    }
    for (const [face, outwards, level] of [
      [faces[0], -1, potential.levelLeft],
      [faces[1], 1, potential.levelRight],
    ]) {
      for (const far of [1e-9, 1, 1e3, 1e9, 1e300]) {
        expect(Math.abs(potential.value(face + outwards * far) - level)).toBeLessThanOrEqual(
          1.2e-16 * height,
        );
      }
      if (potential.scale < 1e6) {
        // A quarter nearer to the centre the deviation is at least 1e4 times as large for all these tails.
        expect(Math.abs(potential.value(0.7 * face) - level)).toBeGreaterThan(1e-13 * height);
      } else if (faces[1] > faces[0]) {
        expect(potential.value(face - outwards * 1e-6)).not.toBe(level);
      }
    }
  });

  it("has interfaces in ascending order between its faces, and none when it is smooth", () => {
    expect([...interfaces].sort((a, b) => a - b)).toEqual(interfaces);
    for (const x of interfaces) expect(x >= faces[0] && x <= faces[1]).toBe(true);
    expect(interfaces.length > 0).toBe(potential.slopeTransform !== undefined);
    expect(Number.isFinite(potential.scale)).toBe(interfaces.length === 0);
  });

  it("has the slope's transform of a numerical integral, when it has jumps", () => {
    if (interfaces.length === 0) {
      expect(potential.slopeTransform).toBeUndefined();
      return;
    }

    for (const k of [-3.1, -0.4, 0, 0.2, 1.7, 9]) {
      const [re, im] = potential.slopeTransform?.(k) ?? [];
      // By parts over [-L, L]: V(L) e^{-ikL} - V(-L) e^{ikL} + i k integral V e^{-ikx}; a point adds i k strength.
      const L = 12;
      const cos = integrateBetween((x) => potential.value(x) * Math.cos(k * x), -L, L, interfaces, 0.25);
      const sin = integrateBetween((x) => potential.value(x) * Math.sin(k * x), -L, L, interfaces, 0.25);
      const strength = sample.shape === "delta" ? (sample.values.strength as number) : 0;
      const difference = potential.value(L) - potential.value(-L);
      const sum = potential.value(L) + potential.value(-L);
      expectClose(re as number, difference * Math.cos(k * L) + k * sin, 1e-12, 1e-13);
      expectClose(im as number, -sum * Math.sin(k * L) + k * (cos + strength), 1e-12, 1e-13);
    }
  });

  it("keeps its form at any scale of length and energy, 1e-9 to 1e9", () => {
    for (const length of [1e-9, 1e-4, 1, 1e5, 1e9]) {
      for (const energy of [1e-9, 1, 1e9]) {
        const other = scaled(sample, length, energy);
        for (const x of [-31.3, -6.1, -0.37, 0, 0.021, 1.9, 8.1, 40]) {
          // Far from the centre the rounding of x length/width is felt |x/width| times in an exponential.
          expectClose(other.value(length * x), energy * potential.value(x), 1e-13);
          const average = other.cellAverage(length * x, length * (x + 0.3));
          expectClose(average, energy * potential.cellAverage(x, x + 0.3), 3e-13);
          expectClose(other.mass(length * x) * energy * length * length, potential.mass(x), 1e-14);
        }
        for (const side of [0, 1]) {
          if (faces[side] !== 0 && !potential.confining)
            expectClose(other.faces[side] / length, faces[side], 1e-13);
        }
        if (potential.highest !== 0 && !potential.confining)
          expectClose(other.highest / energy, potential.highest, 1e-14);
      }
    }
  });

  it("stays finite at the ends of the number range", () => {
    if (potential.confining) return;
    for (const x of [-1e300, -1e9, 1e9, 1e300]) {
      const level = x < 0 ? potential.levelLeft : potential.levelRight;
      expect(Math.abs(potential.value(x) - level)).toBe(0);
      expect(potential.cellAverage(x - Math.abs(x) / 4, x)).toBeCloseTo(level, 14);
    }
  });
});
