import { describe, expect, it } from "vitest";
import { alignedGrid } from "../../src/grid/aligned.js";
import { composedState } from "../../src/studies/composed-state.js";
import { COMMON_REFINEMENT, planMatched } from "../../src/studies/matched-plan.js";
import { distance } from "../../src/studies/motion.js";
import { HBAR } from "../../src/units/constants.js";
import { designOf, MASS, potentialOf } from "../grid/samples.js";

/**
 * A free Gaussian packet after a time t, interleaved: with s = 1 + i hbar t / (2 m sigma^2) and xi = x - x0 - hbar k0 t / m,
 * psi = (2 pi sigma^2)^(-1/4) s^(-1/2) exp(-xi^2 / (4 sigma^2 s) + i k0 (x - x0) - i hbar k0^2 t / 2m).
 * Source: in every text on quantum mechanics.
 */
function freePacket(x: Float64Array, center: number, sigma: number, k0: number, t: number): Float64Array {
  const b = (HBAR * t) / (2 * MASS * sigma ** 2);
  const size = 1 + b * b;
  const out = new Float64Array(2 * x.length);
  x.forEach((place, j) => {
    const xi = place - center - (HBAR * k0 * t) / MASS;
    const envelope =
      (2 * Math.PI * sigma ** 2 * size) ** -0.25 * Math.exp((-xi * xi) / (4 * sigma ** 2 * size));
    const phase =
      (xi * xi * b) / (4 * sigma ** 2 * size) -
      0.5 * Math.atan(b) +
      k0 * (place - center) -
      (HBAR * k0 ** 2 * t) / (2 * MASS);
    out[2 * j] = envelope * Math.cos(phase);
    out[2 * j + 1] = envelope * Math.sin(phase);
  });
  return out;
}

describe("a state put together from stationary waves", () => {
  it.each(["left", "right"] as const)(
    "is the free packet where nothing stands in its way, from the %s",
    async (from) => {
      const design = designOf(potentialOf("rectangular", { height: 0, width: 1 }), {
        energy: 0.15,
        width: 8,
        from,
      });
      const plan = planMatched(design);
      const grid = alignedGrid(plan.closed.stretches, COMMON_REFINEMENT);
      const { state, error } = await composedState(design, plan, grid, {});
      const { center, width, wavenumber } = plan.from.packet;
      const free = freePacket(grid.x, center, width, wavenumber, plan.end);
      const outside = {
        ...grid,
        weight: grid.weight.map((w, j) => (Math.abs(grid.x[j]) > 0.5 + 1e-9 ? w : 0)),
      };
      expect(distance(outside, state, free)).toBeLessThan(1e-9);
      expect(error).toBeLessThan(1e-9);
      // Most of it has got to the far side by then.
      expect(distance(outside, state, new Float64Array(state.length))).toBeGreaterThan(0.9);
    },
  );
});
