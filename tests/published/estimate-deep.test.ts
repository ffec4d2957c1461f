import { describe, expect, it } from "vitest";
import { ELECTRON_MASS } from "../../src/units/constants.js";
import { sech2, slabs } from "../potentials/closed-forms.js";
import { estimateRow, expectTrusted, packetAverage } from "./estimate-helpers.js";

/**
 * Closed forms of Landau & Lifshitz, par. 25, problems 2 and 4 [memory]. T at the mean energy stands in check-values.md, 2.1: computed by
 * 40-50 digit arithmetic with CODATA 2022.
 */
const high = { potential: "{ shape: rectangular, height: 10 eV, width: 0.5 nm }", mass: 1 };
const thick = { potential: "{ shape: rectangular, height: 40 eV, width: 1 nm }", mass: 1 };
const soft = { potential: "{ shape: sech2, height: 0.349 eV, width: 3.95 nm }", mass: 0.455 };

const highForm = slabs([{ height: 10, width: 0.5 }]);
const thickForm = slabs([{ height: 40, width: 1 }]);
const softForm = sech2(0.349, 3.95);

const ROWS = [
  // A long packet: the mean lies near T(E0), raised by the faster half.
  { title: "vacuum gap, 10 eV and 0.5 nm", shape: high, form: highForm, energy: 2, width: 2 },
  // Of the barrier of 40 eV and 1 nm, a long packet tunnels, and of a short one (4.3 standard deviations below the top)
  // the tail passes over it and carries 1e8 times as much; between the two lies the hardest case.
  { title: "40 eV and 1 nm, tunnelling", shape: thick, form: thickForm, energy: 30, width: 2 },
  { title: "40 eV and 1 nm, between", shape: thick, form: thickForm, energy: 30, width: 1 },
  { title: "smooth sech2, 1e-11", shape: soft, form: softForm, energy: 0.084, width: 24.8 },
];

describe("deep tunnelling: the packet's mean, by closed form and the tests' own quadrature", () => {
  it.each(ROWS)("$title: $energy eV, $width nm", async ({ shape, form, energy, width }) => {
    const reference = packetAverage(form, energy, shape.mass, width);
    // Average in double precision, see estimate-closed-forms.test.ts.
    expectTrusted(await estimateRow({ ...shape, energy, width }), reference, {
      referenceError: 1e-12 * reference,
    });
  });

  it("T of a plane wave of the mean energy beside it: 1.303447128939847e-6 and 2.542248872950885e-14 (computed)", async () => {
    for (const [row, reference] of [
      [{ ...high, energy: 2, width: 2 }, 1.303447128939847e-6],
      [{ ...thick, energy: 30, width: 2 }, 2.542248872950885e-14],
    ] as const) {
      const { atMeanEnergy } = await estimateRow(row);
      expect(Math.abs(atMeanEnergy.value - reference)).toBeLessThanOrEqual(atMeanEnergy.error);
      expect(atMeanEnergy.error).toBeLessThan(1e-3 * reference);
    }
  });

  it("40 eV and 1 nm, over the top: the tail sets the mean, and the estimate says at which energy", async () => {
    const answer = await estimateRow({ ...thick, energy: 30, width: 0.5 });
    const reference = packetAverage(thickForm, 30, 1, 0.5);
    expectTrusted(answer, reference, { referenceError: 1e-12 * reference });
    expect(reference).toBeGreaterThan(1e6 * thickForm(30, ELECTRON_MASS));
    expect(answer.carryingEnergy).toBeGreaterThan(40);
  });
});
