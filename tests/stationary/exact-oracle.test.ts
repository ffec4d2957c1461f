import { describe, expect, it } from "vitest";
import { scatter } from "../../src/stationary/scattering.js";
import { ELECTRON_MASS } from "../../src/units/constants.js";
import { pieces } from "./helpers.js";
import { double, exactTransmission, fixed } from "./multiprecision.js";

/** A fixed sequence of numbers in [0, 1): the mixed congruential generator of any text, so that a failure can be repeated. */
function numbers(start: number): () => number {
  let state = start;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

interface Drawn {
  readonly widths: readonly number[];
  readonly heights: readonly number[];
  readonly masses: readonly number[];
  readonly levelRight: number;
}

/** One to six layers, masses from 0.02 to 1 m_e, heights from -0.3 to 1.2 eV; every other one with a level of its own on the right. */
function draw(next: () => number): Drawn {
  const count = 1 + Math.floor(next() * 6);
  const each = <T>(make: () => T) => Array.from({ length: count }, make);
  return {
    widths: each(() => 0.3 + 6 * next() ** 2),
    heights: each(() => -0.3 + 1.5 * next()),
    masses: each(() => 0.02 * 50 ** next()),
    levelRight: next() < 0.5 ? 0 : -0.3 + 0.4 * next(),
  };
}

function build({ widths, heights, masses, levelRight }: Drawn, leadMass: number) {
  const edges = [0];
  for (const width of widths) edges.push(edges[edges.length - 1] + width);
  return pieces(edges, [0, ...heights, levelRight], [leadMass, ...masses, leadMass]);
}

const LEAD = 0.067;

function exact({ widths, heights, masses, levelRight }: Drawn, energy: number): bigint {
  const slabs = widths.map((width, i) => ({
    width,
    height: heights[i],
    mass: masses[i] * ELECTRON_MASS,
  }));
  const lead = LEAD * ELECTRON_MASS;
  return exactTransmission(slabs, energy, { left: 0, right: levelRight, massLeft: lead, massRight: lead });
}

describe("random stacks against arithmetic with 512 binary places", () => {
  it("never lets T or R out of its bound, from either side, and keeps the bound near what rounding does", () => {
    const next = numbers(20_250_611);
    const ratios: number[] = [];
    const sizes: number[] = [];
    for (let trial = 0; trial < 700; trial++) {
      const drawn = draw(next);
      const potential = build(drawn, LEAD);
      const top = Math.max(0, drawn.levelRight);
      // Every fifth energy is exactly that of a layer, where the layer's waves turn from running to decaying.
      const layer = drawn.heights.find((height) => height > top);
      const energy = trial % 5 === 0 && layer !== undefined ? layer : top + 1.3 * next() ** 2 + 1e-4;
      const reference = exact(drawn, energy);
      for (const from of ["left", "right"] as const) {
        const { transmission, reflection } = scatter(potential, LEAD * ELECTRON_MASS, energy, from);
        const miss = Math.abs(double(fixed(transmission.value) - reference));
        const missed = Math.abs(double(fixed(reflection.value) - ((1n << 512n) - reference)));
        const context = JSON.stringify({
          trial,
          from,
          energy,
          drawn,
          transmission,
          reflection,
          miss,
          missed,
        });
        // Values far below 2^-512 would be lost in the reference; none is drawn.
        expect(miss, context).toBeLessThanOrEqual(transmission.error);
        expect(missed, context).toBeLessThanOrEqual(reflection.error);
        if (miss > 0) ratios.push(transmission.error / miss);
        sizes.push(transmission.error / transmission.value);
      }
    }
    const median = (values: number[]) => values.sort((a, b) => a - b)[values.length >> 1];
    expect(median(sizes)).toBeLessThan(1e-12);
    // A bound that adds up a hundred roundings of random sign is some tens of times too wide; much more would be useless.
    expect(median(ratios)).toBeLessThan(150);
  });

  it.each([
    [30, 1, 0.1],
    [60, 0.8, 0.3],
    [200, 0.3, 0.05],
  ])("a wall of %f nm and %f eV at %f eV, T far below 1e-30", (width, height, energy) => {
    const wall: Drawn = { widths: [width], heights: [height], masses: [LEAD], levelRight: 0 };
    const reference = exact(wall, energy);
    const { transmission, reflection } = scatter(build(wall, LEAD), LEAD * ELECTRON_MASS, energy);
    expect(double(reference)).toBeLessThan(1e-30);
    expect(Math.abs(double(fixed(transmission.value) - reference))).toBeLessThanOrEqual(transmission.error);
    expect(transmission.error).toBeLessThan(1e-12 * transmission.value);
    expect(reflection).toEqual({ value: 1, error: expect.closeTo(0, 15) });
  });

  it("holds on a resonance of 2e-9 eV, where rounding of the energy alone is 1e-7", () => {
    const double11: Drawn = {
      widths: [11, 5, 11],
      heights: [0.5, 0, 0.5],
      masses: [LEAD, LEAD, LEAD],
      levelRight: 0,
    };
    // Its energy and width were found by the program; here only T at energies about it is compared.
    const [centre, width] = [0.10772368028785531, 2.0960708901e-9];
    for (let i = -20; i <= 20; i++) {
      const energy = centre + (i / 5) * width;
      const { transmission } = scatter(build(double11, LEAD), LEAD * ELECTRON_MASS, energy);
      const reference = exact(double11, energy);
      expect(Math.abs(double(fixed(transmission.value) - reference))).toBeLessThanOrEqual(transmission.error);
      expect(transmission.error).toBeLessThan(2e-5);
    }
    expect(double(exact(double11, centre))).toBeGreaterThan(0.99);
  });

  it("underflows to zero with a bound when T is below every double", () => {
    const wall: Drawn = { widths: [3000], heights: [1], masses: [LEAD], levelRight: 0 };
    const { transmission, reflection } = scatter(build(wall, LEAD), LEAD * ELECTRON_MASS, 0.1);
    expect(transmission).toEqual({ value: 0, error: Number.MIN_VALUE });
    expect(reflection.value).toBe(1);
  });
});
