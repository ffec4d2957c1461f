import { describe, expect, test } from "vitest";
import { shapeNamed } from "../../src/potentials/registry.js";
import type { ParameterValues } from "../../src/potentials/shape.js";
import { shifted } from "../../src/potentials/shifted.js";

const build = (name: string, values: ParameterValues) => {
  const shape = shapeNamed(name);
  if (shape === undefined) throw new Error(`no shape ${name}`);
  return shape.build(values, 0.4);
};

describe("shifted", () => {
  const original = build("rectangular", { height: 0.3, width: 5, mass: 0.5 });
  const moved = shifted(original, 8);

  test("moves everything that has a place", () => {
    for (const x of [-3, 5.4, 5.5, 5.6, 8, 10.5, 11]) {
      expect(moved.value(x)).toBe(original.value(x - 8));
      expect(moved.mass(x)).toBe(original.mass(x - 8));
      expect(moved.cellAverage(x, x + 0.25)).toBe(original.cellAverage(x - 8, x - 8 + 0.25));
      expect(moved.massAverage(x, x + 0.25)).toBe(original.massAverage(x - 8, x - 8 + 0.25));
    }
    expect(moved.interfaces).toEqual([5.5, 10.5]);
    expect(moved.faces).toEqual([5.5, 10.5]);
  });

  test("keeps everything else", () => {
    for (const key of [
      "shape",
      "levelLeft",
      "levelRight",
      "lowest",
      "highest",
      "scale",
      "uniformMass",
      "confining",
    ] as const) {
      expect(moved[key]).toBe(original[key]);
    }
  });

  test("its slope transform is that of two jumps at their new places", () => {
    for (const k of [0, 0.1, 1, 7.3]) {
      // V' is 0.3 eV (delta(x - 5.5) - delta(x - 10.5)).
      const re = 0.3 * (Math.cos(5.5 * k) - Math.cos(10.5 * k));
      const im = -0.3 * (Math.sin(5.5 * k) - Math.sin(10.5 * k));
      const [a, b] = moved.slopeTransform?.(k) ?? [Number.NaN, Number.NaN];
      // Round-off of a phase of up to 77 rad.
      expect(Math.hypot(a - re, b - im)).toBeLessThan(1e-14);
    }
  });

  test("a smooth shape stays without slope transform; no shift gives the potential itself", () => {
    expect(shifted(build("gaussian", { height: 0.3, width: 2 }), 1).slopeTransform).toBeUndefined();
    expect(shifted(original, 0)).toBe(original);
  });

  test("refuses a shift that is not finite", () => {
    expect(() => shifted(original, Number.NaN)).toThrow(RangeError);
    expect(() => shifted(original, Number.POSITIVE_INFINITY)).toThrow(RangeError);
  });
});
