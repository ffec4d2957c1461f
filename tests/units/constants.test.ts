import {
  atomicMass,
  bohrRadius,
  boltzmann,
  electronMass,
  elementaryCharge,
  planckConstant,
  type Unit,
} from "mathjs";
import { describe, expect, test } from "vitest";
import * as constants from "../../src/units/constants.js";

const { ATOMIC_MASS, BOHR_RADIUS_M, ELECTRON_MASS, HARTREE_J, HBAR } = constants;
const relative = (a: number, b: number): number => Math.abs(a / b - 1);

describe("derived constants: CODATA 2022 (Mohr, Newell, Taylor, Tiesinga, Rev. Mod. Phys. 97, 025002 (2025))", () => {
  // As text, because they have more digits than a double. Computed with 40 digits from the published 2022 values, independently of this code; double rounding is 1e-15.
  test.each([
    ["hbar in eV fs", HBAR, "0.6582119569509065698"],
    ["m_e in eV fs^2/nm^2", ELECTRON_MASS, "5.68563011130519333"],
    ["u in eV fs^2/nm^2", ATOMIC_MASS, "10364.2696671608"],
    ["hbar^2/(2 m_e) in eV nm^2", (HBAR * HBAR) / (2 * ELECTRON_MASS), "0.0380998211096858373"],
    ["hbar^2/m_e in eV nm^2", (HBAR * HBAR) / ELECTRON_MASS, "0.0761996422193716746"],
    ["hbar/m_e in nm^2/fs", HBAR / ELECTRON_MASS, "0.11576763596388922"],
    ["sqrt(2 m_e)/hbar in eV^-1/2 nm^-1", Math.sqrt(2 * ELECTRON_MASS) / HBAR, "5.1231672231618445"],
    ["hbar^2/(2 u) in eV nm^2", (HBAR * HBAR) / (2 * ATOMIC_MASS), "2.0900796398895e-5"],
    ["u/m_e", ATOMIC_MASS / ELECTRON_MASS, "1822.88848628276028"],
    [
      "atomic unit of time in fs",
      (HBAR * constants.ELEMENTARY_CHARGE_C) / HARTREE_J,
      "0.0241888432658632937",
    ],
    ["hartree in eV", HARTREE_J / constants.ELEMENTARY_CHARGE_C, "27.211386245981"],
  ])("%s", (_, value, published) => {
    // The two last digits of hartree and of u are not in the published figures.
    expect(relative(value, Number(published))).toBeLessThan(2e-14);
  });

  test("m_e c^2 is 510998.95069(16) eV", () => {
    const speedOfLight = 299.792458; // nm/fs, exact
    expect(Math.abs(ELECTRON_MASS * speedOfLight ** 2 - 510998.95069)).toBeLessThan(5e-5);
  });

  test("one year throughout: E_h a_0^2 / 2 equals hbar^2 / 2 m_e to 4.5e-13", () => {
    const bohr = BOHR_RADIUS_M * 1e9;
    const hartree = HARTREE_J / constants.ELEMENTARY_CHARGE_C;
    // A mixture of the sets of 2018 and 2022 would show at 1e-9.
    expect(relative((hartree * bohr * bohr) / 2, (HBAR * HBAR) / (2 * ELECTRON_MASS))).toBeLessThan(1e-12);
  });
});

describe("against the constants of a general-purpose library (mathjs, CODATA 2018)", () => {
  const si = (unit: Unit, name: string): number => unit.toNumber(name);
  // The sets of 2018 and 2022 differ by at most 1.4e-9.
  test.each([
    ["electron mass", constants.ELECTRON_MASS_KG, si(electronMass, "kg")],
    ["atomic mass", constants.ATOMIC_MASS_KG, si(atomicMass, "kg")],
    ["Bohr radius", BOHR_RADIUS_M, si(bohrRadius, "m")],
    ["Planck constant", constants.PLANCK_J_S, si(planckConstant, "J s")],
    ["elementary charge", constants.ELEMENTARY_CHARGE_C, si(elementaryCharge, "C")],
    ["Boltzmann constant", constants.BOLTZMANN_J_K, si(boltzmann, "J/K")],
  ])("%s agrees to 1e-8", (_, ours, theirs) => {
    expect(relative(ours, theirs)).toBeLessThan(1e-8);
  });
});
