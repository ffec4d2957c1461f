import { describe, expect, it } from "vitest";
import { dividedAt } from "../../src/analysis/divided.js";
import { periodicGrid, uniformClosedGrid } from "../../src/grid/grid.js";
import { normalTail } from "../../src/numerics/erfc.js";
import { sampleGaussian } from "../../src/packets/gaussian.js";

const PACKET = { center: 1.3, width: 4, wavenumber: 0.8 };
const [LEFT, RIGHT] = [-2.2, 2.9];
/** Probability right of x: a normal distribution about the packet's centre. */
const beyond = (x: number) => normalTail((x - PACKET.center) / PACKET.width);

describe("probabilities on either side of two places", () => {
  it("are exact on a circle wherever the places lie between its nodes", () => {
    const grid = periodicGrid(-60, 120 / 128, 128);
    const psi = new Float64Array(256);
    sampleGaussian(psi, grid.x, PACKET);
    const { left, inside, right } = dividedAt(grid, LEFT, RIGHT)(psi);
    expect(right).toBeCloseTo(beyond(RIGHT), 12);
    expect(inside).toBeCloseTo(beyond(LEFT) - beyond(RIGHT), 12);
    expect(left).toBeCloseTo(1 - beyond(LEFT), 12);
  });

  it("have an error of second order on a closed grid whose nodes the places are", () => {
    const error = (cells: number) => {
      const h = 5.1 / cells;
      const grid = uniformClosedGrid(LEFT - 12 * cells * h, h, 25 * cells);
      const psi = new Float64Array(2 * grid.x.length);
      sampleGaussian(psi, grid.x, PACKET);
      const { left, inside, right } = dividedAt(grid, LEFT, RIGHT)(psi);
      expect(left + inside + right).toBeCloseTo(1, 11);
      return right - beyond(RIGHT);
    };
    expect(Math.abs(error(8))).toBeLessThan(1e-3);
    expect(error(4) / error(8)).toBeCloseTo(4, 1);
    expect(error(8) / error(16)).toBeCloseTo(4, 1);
  });

  it("share a node that is both places out to its sides", () => {
    const grid = uniformClosedGrid(-50, 0.5, 201);
    const psi = new Float64Array(402);
    sampleGaussian(psi, grid.x, { ...PACKET, center: 0 });
    const { left, inside, right } = dividedAt(grid, 0, 0)(psi);
    expect(inside).toBe(0);
    expect(left).toBeCloseTo(0.5, 12);
    expect(right).toBeCloseTo(0.5, 12);
  });

  it("need nodes at the places on a closed grid", () => {
    expect(() => dividedAt(uniformClosedGrid(0, 1, 10), 2, 3.5)).toThrow(/a node at 3.5 nm/);
  });
});
