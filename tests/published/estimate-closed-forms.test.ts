import { describe, expect, it } from "vitest";
import { ELECTRON_MASS } from "../../src/units/constants.js";
import { delta, eckart, sech2, slabs, smoothStep, type Transmission } from "../potentials/closed-forms.js";
import {
  estimateRow,
  expectTrusted,
  flatLayers,
  fromTheRight,
  packetAverage,
  type Row,
  sharpStep,
} from "./estimate-helpers.js";

/** Relative error of an average in double precision: of the closed form (phases up to a hundred) and of the quadrature. */
const AVERAGE_ERROR = 1e-12;

type Case = Row & { readonly title: string; readonly closed: Transmission; readonly right?: number };

/** Level on the right under which nothing passes, from either side's own kinetic energy. */
function average({ closed, right = 0, from, energy, width, mass = 0.067 }: Case): number {
  const [form, threshold] =
    from === "right" ? [fromTheRight(closed, right), Math.max(0, -right)] : [closed, Math.max(0, right)];
  return packetAverage(form, Number(energy), Number(mass), Number(width), threshold);
}

const eckartShape = (height: number, drop: number, width: number) => ({
  potential: `{ shape: eckart, height: ${height} eV, drop: ${drop} eV, width: ${width} nm }`,
  closed: eckart(height, drop, width),
  right: drop,
});
// Eckart's own letters are A (drop), B and l = 2 pi width; the top lies at (A + B)^2 / (4 B). check-values.md, 2.6.
const downhill = eckartShape(0.81 / 4, -0.1, 6 / (2 * Math.PI));
const uphill = eckartShape(1.69 / 4.8, 0.1, 6 / (2 * Math.PI));

const stepShape = (height: number, thickness: number) => ({
  potential: `{ shape: step, height: ${height} eV, thickness: ${thickness} nm }`,
  closed: thickness === 0 ? sharpStep(height) : smoothStep(height, thickness),
  right: height,
});

const walled = (outside: number, inside: number, height: number, width: number) => ({
  mass: outside,
  potential: `{ shape: rectangular, height: ${height} eV, width: ${width} nm, mass: ${inside} m_e }`,
  closed: slabs([{ width, height, mass: inside * ELECTRON_MASS }]),
});

const LOPSIDED = [
  { width: 2, height: 0.3 },
  { width: 5, height: 0 },
  { width: 3, height: 0.3 },
];
const lopsided = { potential: flatLayers(LOPSIDED), closed: slabs(LOPSIDED) };
const squareWell = {
  potential: "{ shape: rectangular, height: -0.2 eV, width: 10 nm }",
  closed: slabs([{ width: 10, height: -0.2 }]),
};
const smoothWell = {
  potential: "{ shape: sech2, height: -0.2 eV, width: 2 nm }",
  closed: sech2(-0.2, 2),
};

const ECKART = "C. Eckart, Phys. Rev. 35, 1303 (1930), eq. (15)";
const LANDAU = "Landau & Lifshitz par. 25";
const BENDANIEL = "closed form with psi'/m continuous, BenDaniel & Duke, Phys. Rev. 152, 683 (1966)";

const CASES: readonly Case[] = [
  { title: `Eckart path downhill (${ECKART})`, ...downhill, energy: 0.2, width: 10 },
  {
    title: `Eckart path downhill, from the right (${ECKART})`,
    ...downhill,
    energy: 0.3,
    width: 10,
    from: "right",
  },
  { title: `Eckart path uphill (${ECKART})`, ...uphill, energy: 0.25, width: 12 },
  {
    title: `Eckart path uphill, from the right (${ECKART})`,
    ...uphill,
    energy: 0.15,
    width: 15,
    from: "right",
  },
  { title: `smooth step up (${LANDAU}, problem 3 [memory])`, ...stepShape(0.2, 1), energy: 0.3, width: 10 },
  {
    title: `smooth step up, slow behind it (${LANDAU}, problem 3 [memory])`,
    ...stepShape(0.2, 1),
    energy: 0.25,
    width: 40,
  },
  {
    title: `smooth step down (${LANDAU}, problem 3 [memory])`,
    ...stepShape(-0.2, 1),
    energy: 0.1,
    width: 15,
  },
  {
    title: `smooth step, from the right (${LANDAU}, problem 3 [memory])`,
    ...stepShape(-0.2, 1),
    energy: 0.35,
    width: 12,
    from: "right",
  },
  { title: `sharp step up (${LANDAU}, problem 1 [memory])`, ...stepShape(0.2, 0), energy: 0.4, width: 10 },
  { title: `sharp step down (${LANDAU}, problem 1 [memory])`, ...stepShape(-0.2, 0), energy: 0.1, width: 15 },
  {
    title: `sharp step, from the right (${LANDAU}, problem 1 [memory])`,
    ...stepShape(0.2, 0),
    energy: 0.1,
    width: 15,
    from: "right",
  },
  {
    title: `GaAs/AlGaAs barrier with masses (${BENDANIEL})`,
    ...walled(0.067, 0.0919, 0.2591, 5),
    energy: 0.1,
    width: 10,
  },
  {
    title: `GaAs/AlGaAs barrier with masses, at its top (${BENDANIEL})`,
    ...walled(0.067, 0.0919, 0.2591, 5),
    energy: 0.26,
    width: 15,
  },
  {
    title: `InGaAs/InAlAs barrier with masses (${BENDANIEL})`,
    ...walled(0.043, 0.075, 0.52, 3),
    energy: 0.2,
    width: 12,
  },
  {
    title: `Si/SiO2 barrier with masses (${BENDANIEL})`,
    ...walled(0.19, 0.5, 3.15, 1.5),
    energy: 0.1,
    width: 10,
  },
  {
    title: `InAs/AlSb barrier with masses (${BENDANIEL})`,
    ...walled(0.026, 0.14, 1.35, 3),
    energy: 0.1,
    width: 20,
  },
  {
    title: "asymmetric double barrier 2/5/3 nm (transfer matrix)",
    ...lopsided,
    energy: 0.0874540748731011,
    width: 20,
  },
  {
    title: "the same from the right (transfer matrix)",
    ...lopsided,
    energy: 0.0874540748731011,
    width: 20,
    from: "right",
  },
  { title: `square well (${LANDAU}, problem 2 [memory])`, ...squareWell, energy: 0.1, width: 12 },
  {
    title: `square well, from the right (${LANDAU}, problem 2 [memory])`,
    ...squareWell,
    energy: 0.05,
    width: 20,
    from: "right",
  },
  {
    title: `sech2 far above its top, whose reflection is all that can be wrong (${LANDAU}, problem 4 [memory])`,
    mass: 0.418,
    potential: "{ shape: sech2, height: 0.271 eV, width: 2.53 nm }",
    closed: sech2(0.271, 2.53),
    energy: 0.463,
    width: 20.6,
  },
  {
    title: `sech2 far above its top, flatter and lighter (${LANDAU}, problem 4 [memory])`,
    mass: 0.294,
    potential: "{ shape: sech2, height: 0.163 eV, width: 2.02 nm }",
    closed: sech2(0.163, 2.02),
    energy: 0.4691,
    width: 20.77,
  },
  { title: `sech2 well (${LANDAU}, problem 4 [memory])`, ...smoothWell, energy: 0.05, width: 15 },
  {
    title: "attracting delta (Griffiths, sec. 2.5 [memory])",
    potential: "{ shape: delta, strength: -0.3 eV nm }",
    closed: delta(-0.3),
    energy: 0.1,
    width: 12,
  },
];

describe("transmission of a packet, closed form averaged over its momenta by the tests' own quadrature", () => {
  it.each(CASES)("$title: $energy eV, $width nm", async (row) => {
    const reference = average(row);
    expectTrusted(await estimateRow(row), reference, { referenceError: AVERAGE_ERROR * reference });
  });
});

describe("reciprocity: at equal total energy as much passes from the right as from the left", () => {
  const PAIRS = [
    { title: `Eckart path (${ECKART})`, shape: downhill, energy: 0.2, width: 20 },
    {
      title: `smooth step (${LANDAU}, problem 3 [memory])`,
      shape: stepShape(-0.2, 1),
      energy: 0.2,
      width: 20,
    },
    {
      title: "asymmetric double barrier (transfer matrix)",
      shape: { ...lopsided, right: 0 },
      energy: 0.12,
      width: 12,
    },
  ];
  it.each(PAIRS)("$title at $energy eV", async ({ shape, energy, width }) => {
    const { potential, closed, right } = shape;
    const expected = closed(energy, 0.067 * ELECTRON_MASS);
    const [left, back] = await Promise.all([
      estimateRow({ potential, energy, width }),
      estimateRow({ potential, energy: energy - right, width, from: "right" }),
    ]);
    for (const { atMeanEnergy } of [left, back]) {
      expect(Math.abs(atMeanEnergy.value - expected)).toBeLessThanOrEqual(atMeanEnergy.error);
      // The bound is worth having: it is dominated by what the packet has at that energy inside the structure.
      expect(atMeanEnergy.error).toBeLessThan(1e-4 * expected);
    }
  });
});
