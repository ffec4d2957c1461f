import { describe, expect, it } from "vitest";
import { ELECTRON_MASS } from "../../src/units/constants.js";
import { delta, sech2, slabs, type Transmission } from "../potentials/closed-forms.js";
import { estimateRow, expectTrusted, flatLayers, packetAverage, type Row } from "./estimate-helpers.js";

/**
 * Means over packets, integral |phi(k)|^2 T(k) dk over k > 0: computed by 40-50 digit quadrature of the closed forms with CODATA 2022, in two
 * ways that agree to 16 digits. Rows at 0.1 eV and 5 nm hold 1.4e-5 of the packet at k < 0, which is neither in the mean nor ever transmitted.
 */
const FROM_QUADRATURE = 1e-15;
const QUADRATURE = "computed by 40-50 digit quadrature of the closed form";

const RECTANGULAR: Record<number, readonly number[]> = {
  0.1: [0.01545760314690436, 0.01056301929471765, 9.680192934963149e-3],
  0.2: [0.09440383102980433, 0.06128365620732662, 0.05448736781504236],
  0.3: [0.3252527321778053, 0.2652504703677842, 0.2414831986409152],
  0.4: [0.6474370503601031, 0.6847131102052317, 0.6986330536850845],
};
const SECH2: Record<number, readonly number[]> = {
  0.1: [0.06401092854852414, 0.04183399810024046, 0.0368019430507085],
  0.2: [0.2970788922808962, 0.2628402087185223, 0.2507552557543744],
  0.3: [0.6049176860585594, 0.6251302136158984, 0.6328030526186523],
  0.4: [0.823559652414174, 0.8620710118520116, 0.873558769454206],
};
const WIDTHS = [5, 10, 20];

type Published = Row & { readonly reference: number; readonly transmission: Transmission };

function block(potential: string, table: Record<number, readonly number[]>, transmission: Transmission) {
  return Object.entries(table).flatMap(([energy, values]) =>
    values.map(
      (reference, i): Published => ({
        potential,
        energy: Number(energy),
        width: WIDTHS[i],
        reference,
        transmission,
      }),
    ),
  );
}

const WALL = { width: 3, height: 0.2591, mass: 0.0919 };
const WELL = { width: 5, height: 0 };
const wall = { ...WALL, mass: WALL.mass * ELECTRON_MASS };
const doubleBarrier = {
  potential: flatLayers([WALL, WELL, WALL]),
  transmission: slabs([wall, WELL, wall]),
};
const thin = {
  potential: "{ shape: rectangular, height: 0.3 eV, width: 2 nm }",
  transmission: slabs([{ height: 0.3, width: 2 }]),
};
const point = { potential: "{ shape: delta, strength: 0.5 eV nm }", transmission: delta(0.5) };

const GROUPS: readonly (readonly [title: string, rows: readonly Published[]])[] = [
  [
    `rectangular barrier, 0.3 eV and 5 nm (${QUADRATURE}; Landau & Lifshitz par. 25, problem 2 [memory])`,
    block(
      "{ shape: rectangular, height: 0.3 eV, width: 5 nm }",
      RECTANGULAR,
      slabs([{ height: 0.3, width: 5 }]),
    ),
  ],
  [
    `sech2 barrier, 0.3 eV and 2 nm (${QUADRATURE}; Landau & Lifshitz par. 25, problem 4 [memory])`,
    block("{ shape: sech2, height: 0.3 eV, width: 2 nm }", SECH2, sech2(0.3, 2)),
  ],
  [
    `rectangular barrier, 0.3 eV and 2 nm (${QUADRATURE}; Landau & Lifshitz par. 25, problem 2 [memory])`,
    [{ ...thin, energy: 0.15, width: 10, reference: 0.402951085606882 }],
  ],
  [
    `delta of 0.5 eV nm (${QUADRATURE}; Griffiths, Introduction to Quantum Mechanics, sec. 2.5 [memory])`,
    [
      { ...point, energy: 0.1, width: 10, reference: 0.4732663577105698 },
      { ...point, energy: 0.05, width: 10, reference: 0.3113352067202093 },
    ],
  ],
  [
    `GaAs/AlGaAs double barrier 3/5/3 nm at and off its resonance (${QUADRATURE}; transfer matrix with the conditions of BenDaniel & Duke, Phys. Rev. 152, 683 (1966))`,
    [
      { ...doubleBarrier, energy: 0.0765418395533605, width: 10, reference: 0.09584932829324724 },
      { ...doubleBarrier, energy: 0.0765418395533605, width: 30, reference: 0.2523227921353453 },
      { ...doubleBarrier, energy: 0.1, width: 20, reference: 0.03539381285747311 },
    ],
  ],
];

describe.each(GROUPS)("transmission of a packet: %s", (_title, rows) => {
  it.each(rows)("mean energy $energy eV, width $width nm: $reference", async (row) => {
    expectTrusted(await estimateRow(row), row.reference, { referenceError: FROM_QUADRATURE });
  });

  it.each(rows)("the tests' own average agrees at $energy eV, $width nm", (row) => {
    // Double precision: some dozen operations on phases and exponents of up to a hundred.
    const mean = packetAverage(row.transmission, Number(row.energy), 0.067, Number(row.width));
    expect(Math.abs(mean - row.reference)).toBeLessThanOrEqual(1e-12 * row.reference);
  });
});
