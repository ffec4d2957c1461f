import { describe, expect, it } from "vitest";
import { finiteVolume } from "../../src/grid/finite-volume.js";
import { closedGrid, type Grid, uniformClosedGrid } from "../../src/grid/grid.js";
import type { Potential } from "../../src/potentials/potential.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { MASS, potentialOf } from "./samples.js";

const HEAVY = 0.4 * ELECTRON_MASS;
const stack = potentialOf("layers", {
  layers: [
    { width: 2, height: 0.3, mass: HEAVY },
    { width: 4, height: -0.1 },
  ],
});
/** Spacings that differ, with nodes on 0, 2 and 6. */
const uneven = closedGrid(Float64Array.of(-9, -7, -4, -2, 0, 0.5, 1.1, 2, 2.9, 4, 4.4, 6, 7, 9, 12, 16));

/** w_j (H f)_j from the equation in the docstring, f vanishing beyond the ends. */
function weighted(grid: Grid, potential: Potential, f: readonly number[]): number[] {
  const { diagonal, coupling } = finiteVolume(grid, potential);
  return f.map(
    (value, j) =>
      grid.weight[j] * diagonal[j] * value -
      coupling[j] * (f[j - 1] ?? 0) -
      coupling[j + 1] * (f[j + 1] ?? 0),
  );
}

describe("finite-volume Hamiltonian", () => {
  it("is symmetric in the weights, also where mass and spacing jump", () => {
    const n = uneven.x.length;
    const unit = (i: number) => Array.from({ length: n }, (_, j) => (i === j ? 1 : 0));
    const columns = Array.from({ length: n }, (_, i) => weighted(uneven, stack, unit(i)));
    for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) expect(columns[i][j]).toBe(columns[j][i]);
  });

  it("of a constant function is V, away from the closed ends", () => {
    const { potential } = finiteVolume(uneven, stack);
    const result = weighted(uneven, stack, new Array(uneven.x.length).fill(1));
    for (let j = 1; j < uneven.x.length - 1; j++)
      expect(result[j] / uneven.weight[j]).toBeCloseTo(potential[j], 13);
    // A closed end adds what pulls the constant down to zero one spacing further on.
    const pull = HBAR ** 2 / (2 * MASS * uneven.spacing[0] * uneven.weight[0]);
    expect(result[0] / uneven.weight[0]).toBeCloseTo(pull, 12);
  });

  it("lets the flux psi'/m pass an interface unchanged: the kink that it prescribes has no kinetic energy", () => {
    const flat: Potential = { ...stack, cellAverage: () => 0, levelLeft: 0, levelRight: 0 };
    // Slope proportional to the mass: x/m is continuous with equal flux on either side.
    const f = [...uneven.x].map((x) => (x < 0 ? MASS * x : x < 2 ? HEAVY * x : HEAVY * 2 + MASS * (x - 2)));
    const scale = HBAR ** 2 / 2;
    weighted(uneven, flat, f)
      .slice(1, -1)
      .forEach((value) => {
        expect(Math.abs(value)).toBeLessThan(1e-13 * scale);
      });
  });

  it("has the exact mean of V in each cell, the level beyond the faces", () => {
    const { potential } = finiteVolume(uneven, stack);
    const at = (x: number) => potential[uneven.x.indexOf(x)];
    // Cell of the node at 0: from -1 (level 0) to 0.25 (0.3 eV).
    expect(at(0)).toBeCloseTo((0.25 * 0.3) / 1.25, 14);
    expect(at(2)).toBeCloseTo((0.45 * 0.3 - 0.45 * 0.1) / 0.9, 14);
    expect([at(-7), at(9), at(4)]).toEqual([0, 0, -0.1]);
  });

  it("has the energies of a particle in a box on a lattice (hbar^2/m h^2)(1 - cos(n pi h / L)), psi vanishing one spacing beyond", () => {
    const n = 40;
    const h = 0.25;
    const grid = uniformClosedGrid(h, h, n);
    const free = potentialOf("rectangular", { height: 0, width: 1 });
    for (const level of [1, 2, 7, 39]) {
      const f = [...grid.x].map((x) => Math.sin((level * Math.PI * x) / (h * (n + 1))));
      const energy = (HBAR ** 2 / (MASS * h * h)) * (1 - Math.cos((level * Math.PI) / (n + 1)));
      weighted(grid, free, f).forEach((value, j) => {
        expect(Math.abs(value / h - energy * f[j])).toBeLessThan(1e-13 * (HBAR ** 2 / (MASS * h * h)));
      });
    }
  });
});
