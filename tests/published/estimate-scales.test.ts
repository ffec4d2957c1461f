import { describe, expect, it } from "vitest";
import { ATOMIC_MASS, ELECTRON_MASS } from "../../src/units/constants.js";
import { slabs } from "../potentials/closed-forms.js";
import { estimateRow, expectTrusted, packetAverage } from "./estimate-helpers.js";

/**
 * One dimensionless problem, (energies) x (lengths)^2 x mass / hbar^2 the same throughout, written in the units of a laboratory each: lengths scaled by `length`, masses by
 * `mass`, energies by 1 / (mass length^2). The transmission is a number and must not know.
 */
const BASE = { height: 0.3, width: 5, energy: 0.15, sigma: 10, mass: 0.067 };
const REFERENCE = packetAverage(
  slabs([{ height: BASE.height, width: BASE.width }]),
  BASE.energy,
  BASE.mass,
  BASE.sigma,
);

const RUBIDIUM = (86.9091805 * ATOMIC_MASS) / (BASE.mass * ELECTRON_MASS);

const SCALES = [
  { title: "an electron in pm and keV", length: 1e-3, mass: 1, units: ["pm", 1e3, "keV", 1e-3] },
  { title: "a hydrogen-like mass in Å and meV", length: 0.02, mass: 2.5e4, units: ["Å", 10, "meV", 1e3] },
  { title: "a rubidium atom in um and peV", length: 100, mass: RUBIDIUM, units: ["um", 1e-3, "peV", 1e12] },
  { title: "an electron in mm", length: 1e6, mass: 1, units: ["mm", 1e-6, "peV", 1e12] },
  { title: "lengths 1e-9 of the natural ones", length: 1e-9, mass: 1e9, units: ["pm", 1e3, "keV", 1e-3] },
  { title: "lengths 1e9 of the natural ones", length: 1e9, mass: 1e-9, units: ["m", 1e-9, "peV", 1e12] },
] as const;

describe("the same dimensionless problem gives the same transmission at every scale", () => {
  it.each(SCALES)("$title", async ({ length, mass, units: [lengthUnit, perNm, energyUnit, perEv] }) => {
    const energyScale = 1 / (mass * length * length);
    const nm = (x: number) => `${x * length * perNm} ${lengthUnit}`;
    const ev = (x: number) => `${x * energyScale * perEv} ${energyUnit}`;
    const answer = await estimateRow({
      potential: `{ shape: rectangular, height: ${ev(BASE.height)}, width: ${nm(BASE.width)} }`,
      energy: ev(BASE.energy),
      width: nm(BASE.sigma),
      mass: BASE.mass * mass,
    });
    // The reference to double precision; scaled input is rounded, which moves T by some ten units in the last place.
    expectTrusted(answer, REFERENCE, { referenceError: 1e-12 * REFERENCE });
    // Times scale with mass length^2: the calculation is the same one.
    const base = await estimateRow({
      potential: "{ shape: rectangular, height: 0.3 eV, width: 5 nm }",
      energy: BASE.energy,
      width: BASE.sigma,
    });
    expect(answer.time.steps).toBe(base.time.steps);
    expect(Math.abs(answer.time.end_fs / (base.time.end_fs * mass * length * length) - 1)).toBeLessThan(1e-9);
  });
});
