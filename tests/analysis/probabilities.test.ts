import { describe, expect, it } from "vitest";
import { core, divide, norm, shares } from "../../src/analysis/probabilities.js";
import { closedGrid, periodicGrid, uniformClosedGrid } from "../../src/grid/grid.js";
import { potentialOf } from "../grid/samples.js";

describe("division of a grid", () => {
  it("counts a node on a face as inside, also when its coordinate is rounded", () => {
    const grid = closedGrid(Float64Array.of(-2, -1, 0.1 + 0.2, 1, 2, 3));
    expect(divide(grid, [0.3, 2])).toEqual({ first: 2, end: 5, seam: 6 });
    expect(divide(grid, [0.3, 2 - 1e-14])).toEqual({ first: 2, end: 5, seam: 6 });
    expect(divide(grid, [-1, -1])).toEqual({ first: 1, end: 2, seam: 6 });
  });

  it("gives what follows the seam of a circle to the left", () => {
    const grid = periodicGrid(0, 1, 8);
    const division = divide(grid, [2, 3], 6);
    const psi = Float64Array.from({ length: 16 }, (_, i) => (i % 2 ? 0 : 2 ** (i / 4)));
    // |psi_j|^2 = 2^j
    const { left, inside, right } = shares(psi, grid, division);
    expect(left).toBeCloseTo(1 + 2 + 64 + 128, 12);
    expect(inside).toBeCloseTo(4 + 8, 12);
    expect(right).toBeCloseTo(16 + 32, 12);
  });

  it("loses nothing: the shares add up to the norm", () => {
    const grid = uniformClosedGrid(-5, 0.25, 41);
    const psi = Float64Array.from({ length: 82 }, (_, i) => Math.sin(i * i));
    for (const faces of [
      [-1, 1],
      [-9, -8],
      [8, 9],
      [-9, 9],
      [0, 0],
    ] as const) {
      const { left, inside, right } = shares(psi, grid, divide(grid, faces));
      expect(left + inside + right).toBeCloseTo(norm(psi, grid.weight), 12);
    }
  });
});

describe("core of a structure", () => {
  it("is between its faces where V is piecewise constant or confines", () => {
    for (const potential of [
      potentialOf("rectangular", { height: 0.3, width: 5 }),
      potentialOf("delta", { strength: 1 }, 2),
      potentialOf("harmonic", { quantum: 0.1 }),
    ])
      expect(core(potential)).toBe(potential.faces);
  });

  it.each([
    ["sech2", { height: 0.3, width: 2 }, 0],
    ["sech2", { height: -0.28, width: 2 }, 40],
    ["gaussian", { height: 1e-12, width: 1e3 }, 0],
    ["eckart", { height: 0.3, drop: -0.25, width: 2 }, -7],
    ["step", { height: 0.2, thickness: 1.5 }, 3],
  ] as const)(
    "of a smooth %s %o at %s nm ends where V has come within 1e-5 of its range of the level",
    (shape, values, center) => {
      const potential = potentialOf(shape, values, center);
      const [left, right] = core(potential);
      const range = potential.highest - potential.lowest;
      const off = (x: number, level: number) => Math.abs(potential.value(x) - level) / range;
      expect(off(left, potential.levelLeft)).toBeLessThan(1e-5);
      expect(off(right, potential.levelRight)).toBeLessThan(1e-5);
      // One pace further in it is no more so.
      expect(off(left + potential.scale / 8, potential.levelLeft)).toBeGreaterThanOrEqual(1e-5);
      expect(off(right - potential.scale / 8, potential.levelRight)).toBeGreaterThanOrEqual(1e-5);
      expect(left).toBeGreaterThan(potential.faces[0]);
      expect(right).toBeLessThan(potential.faces[1]);
    },
  );

  it("comes to an end for a shape without height", () => {
    const flat = potentialOf("sech2", { height: 0, width: 2 });
    expect(core(flat)).toEqual(flat.faces);
  });
});
