import fc from "fast-check";
import { describe, it } from "vitest";
import { ELECTRON_MASS } from "../../src/units/constants.js";
import { slabs } from "../potentials/closed-forms.js";
import { estimateRow, expectBoundsHold, flatLayers, packetAverage } from "./estimate-helpers.js";

/** A number of so many decimals, so that a failing design can be read and typed. */
const decimal = (min: number, max: number, digits: number) =>
  fc
    .integer({ min: Math.round(min * 10 ** digits), max: Math.round(max * 10 ** digits) })
    .map((n) => Number((n / 10 ** digits).toFixed(digits)));

const mass = decimal(0.03, 0.5, 3);
const layer = fc.record({
  width: decimal(1, 6, 2),
  height: decimal(-0.3, 0.6, 3),
  mass: fc.option(mass, { nil: undefined }),
});

const design = fc.record({
  mass,
  layers: fc.array(layer, { minLength: 1, maxLength: 3 }),
  energy: decimal(0.05, 0.5, 3),
  width: decimal(6, 25, 1),
  from: fc.constantFrom("left" as const, "right" as const),
});

/** Ten minutes of wall time on a busy machine; some seconds on an idle one. */
const PATIENCE = 600_000;

describe("the bound holds for barriers and wells at random", () => {
  it(
    "25 stacks of one to three layers with masses, against a transfer matrix averaged over the packet",
    async () => {
      await fc.assert(
        fc.asyncProperty(design, async ({ layers, ...row }) => {
          const stack = layers.map((slab) =>
            slab.mass === undefined
              ? { ...slab, mass: undefined }
              : { ...slab, mass: slab.mass * ELECTRON_MASS },
          );
          const reference = packetAverage(slabs(stack), row.energy, row.mass, row.width);
          const answer = await estimateRow({ ...row, potential: flatLayers(layers) });
          // The reference in double precision, see AGREEMENT in estimate-helpers.ts.
          expectBoundsHold(answer, reference, 1e-12 * reference);
        }),
        { numRuns: 25, seed: 20_261_201, endOnFailure: true },
      );
    },
    PATIENCE,
  );
});
