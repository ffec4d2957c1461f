import { describe, expect, it } from "vitest";
import {
  alignedGrid,
  alignedPoints,
  alignedStretches,
  BASE_PHASE,
  forcedStretches,
} from "../../src/grid/aligned.js";
import { departure } from "../../src/grid/journey.js";
import { wavenumberOf } from "../../src/packets/gaussian.js";
import { ELECTRON_MASS } from "../../src/units/constants.js";
import { designOf, MASS, potentialOf } from "./samples.js";

const HEAVY = 0.5 * ELECTRON_MASS;
const layers = [
  { width: 2.3, height: 0.3, mass: HEAVY },
  { width: 5.1, height: -0.1 },
  { width: 0.7, height: 0.3 },
];
const stack = potentialOf("layers", { layers });
const packet = { energy: 0.15, width: 10 };
const from = departure(designOf(stack, packet));
const room = { near: 211, far: 97 };
const stretches = alignedStretches(stack, from, room);

describe("interface-aligned grid", () => {
  it.each([1, 2, 3, 4, 6, 8, 32])(
    "refined %i times has every interface and both ends on nodes",
    (refinement) => {
      const { x } = alignedGrid(stretches, refinement);
      for (const place of [-room.near, ...stack.interfaces, stack.faces[1] + room.far])
        expect(x).toContain(place);
      expect(x.length).toBe(alignedPoints(stretches, refinement));
      // Every node of the coarser grid is one of the finer grid: cells are divided, not moved.
      const coarse = alignedGrid(stretches, 1).x;
      for (let j = 0; j < coarse.length; j += 7)
        expect(Math.abs(x[j * refinement] - coarse[j])).toBeLessThan(1e-12);
    },
  );

  it("gives every stretch its own spacing: the base phase at the largest wavenumber or decay constant there", () => {
    const expected = [
      [0, MASS],
      [0.3, HEAVY],
      [-0.1, MASS],
      [0.3, MASS],
      [0, MASS],
    ].map(([v, mass]) =>
      Math.max(...[from.lowest, from.highest].map((e) => wavenumberOf(Math.abs(e - v), mass))),
    );
    stretches.forEach(({ from: a, to: b, cells }, i) => {
      const phase = ((b - a) / cells) * expected[i];
      expect(phase).toBeLessThanOrEqual(BASE_PHASE * (1 + 1e-12));
      // One cell fewer would be too few, where a stretch has more than the least number.
      if (cells > 2) expect(((b - a) / (cells - 1)) * expected[i]).toBeGreaterThan(BASE_PHASE);
    });
  });

  it("resolves the scale of a smooth structure between its faces", () => {
    const bump = potentialOf("gaussian", { height: 1e-4, width: 0.2 });
    const [, inside] = alignedStretches(bump, departure(designOf(bump, packet)), room);
    expect((inside.to - inside.from) / inside.cells).toBeLessThanOrEqual(0.2);
  });

  it("is the mirror image for the mirrored design from the right", () => {
    const image = potentialOf("layers", { layers: [...layers].reverse() });
    const back = alignedStretches(image, departure(designOf(image, { ...packet, from: "right" })), room);
    expect(back.map(({ cells }) => cells)).toEqual(stretches.map(({ cells }) => cells).reverse());
    expect(back[0].from).toBeCloseTo(-room.far, 12);
  });

  it("takes a forced spacing as nearly as whole cells allow", () => {
    for (const { from: a, to: b, cells } of forcedStretches(stretches, 0.5)) {
      expect(cells).toBeGreaterThanOrEqual(1);
      expect(Math.abs(cells - (b - a) / 0.5)).toBeLessThanOrEqual(0.5);
    }
  });

  it("has a node on a point of strength, whose faces coincide", () => {
    const point = potentialOf("delta", { strength: 0.5 }, 1.25);
    const parts = alignedStretches(point, departure(designOf(point, packet)), room);
    expect(parts.length).toBe(2);
    expect(alignedGrid(parts, 1).x).toContain(1.25);
  });
});
