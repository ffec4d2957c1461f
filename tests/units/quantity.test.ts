import fc from "fast-check";
import Qty from "js-quantities";
import { describe, expect, test } from "vitest";
import {
  ATOMIC_MASS,
  BOHR_RADIUS_M,
  ELECTRON_MASS,
  ELEMENTARY_CHARGE_C,
  HARTREE_J,
  KILOGRAM,
} from "../../src/units/constants.js";
import {
  formatQuantity,
  parseQuantity,
  QuantityError,
  type QuantityKind,
  quantityPattern,
  unitsOf,
} from "../../src/units/quantity.js";
import { UNITS } from "../../src/units/unit-table.js";

const KINDS = [...new Set(UNITS.map(({ kind }) => kind))];

describe("parseQuantity", () => {
  test.each<[string, QuantityKind, number]>([
    ["0.30 eV", "energy", 0.3],
    ["0.3 meV", "energy", 0.0003],
    ["7 peV", "energy", 7e-12],
    ["0.1 neV", "energy", 1e-10],
    ["0.7 ueV", "energy", 7e-7],
    ["0.7 µeV", "energy", 7e-7],
    ["1.1 keV", "energy", 1100],
    ["2.5 nm", "length", 2.5],
    ["0.3 pm", "length", 0.0003],
    ["1.1 um", "length", 1100],
    ["1.1 mm", "length", 1.1e6],
    ["3 Å", "length", 0.3],
    ["3 \u212b", "length", 0.3],
    ["3 angstrom", "length", 0.3],
    ["2 m", "length", 2e9],
    ["1 bohr", "length", BOHR_RADIUS_M * 1e9],
    ["0.7 as", "time", 0.0007],
    ["40 fs", "time", 40],
    ["1.1 ps", "time", 1100],
    ["1.1 ns", "time", 1.1e6],
    ["1.1 us", "time", 1.1e9],
    ["1.1 ms", "time", 1.1e12],
    ["1.1 s", "time", 1.1e15],
    ["1 m_e", "mass", ELECTRON_MASS],
    ["1 u", "mass", ATOMIC_MASS],
    ["50 mV", "voltage", 0.05],
    ["0.05 V", "voltage", 0.05],
    ["0.1 V/nm", "field", 0.1],
    ["3 MV/cm", "field", 0.3],
    ["3 kV/cm", "field", 0.0003],
    ["3 V/m", "field", 3e-9],
    ["3 GHz", "frequency", 3e-6],
    ["3 THz", "frequency", 0.003],
    ["3 Hz", "frequency", 3e-15],
    ["300 K", "temperature", 300],
    ["0.5 eV nm", "strength", 0.5],
    ["0.5 eV  nm", "strength", 0.5],
    ["1 hartree", "energy", HARTREE_J / ELEMENTARY_CHARGE_C],
    ["+3e-1 nm", "length", 0.3],
    ["-1.5E+2 meV", "energy", -0.15],
    [".5   nm", "length", 0.5],
    ["5. nm", "length", 5],
    ["-0 nm", "length", 0],
  ])("%s is exactly the nearest double", (text, kind, value) => {
    expect(parseQuantity(text, kind)).toBe(value);
  });

  test("every unit of the contract is there, and no other", () => {
    const contract =
      `pm nm um mm Å angstrom m bohr|peV neV ueV meV eV keV hartree J|as fs ps ns us ms s|m_e u kg|mV V
      |V/nm MV/cm kV/cm V/m|GHz THz Hz|K|eV_nm`.split(/[\s|]+/);
    expect(UNITS.map(({ name }) => name.replace(" ", "_")).sort()).toEqual(contract.sort());
  });

  // The oracle holds u of CODATA 2010, 8.9e-8 from that of 2022; all else agrees to round-off.
  test.each([
    ["pm", "nm"],
    ["um", "nm"],
    ["mm", "nm"],
    ["angstrom", "nm"],
    ["m", "nm"],
    ["peV", "eV"],
    ["neV", "eV"],
    ["ueV", "eV"],
    ["meV", "eV"],
    ["keV", "eV"],
    ["J", "eV"],
    ["as", "fs"],
    ["ps", "fs"],
    ["ns", "fs"],
    ["us", "fs"],
    ["ms", "fs"],
    ["s", "fs"],
    ["mV", "V"],
    ["MV/cm", "V/nm"],
    ["kV/cm", "V/nm"],
    ["V/m", "V/nm"],
    ["GHz", "1/fs"],
    ["THz", "1/fs"],
    ["Hz", "1/fs"],
    ["u", "eV fs^2/nm^2"],
    ["kg", "eV fs^2/nm^2"],
  ])("one %s in %s as in js-quantities", (unit, internal) => {
    const kind = UNITS.find(({ name }) => name === unit)?.kind as QuantityKind;
    const tolerance = unit === "u" ? 1e-7 : 1e-14;
    const theirs = Qty(`1 ${unit}`).to(internal).scalar;
    expect(Math.abs(parseQuantity(`1 ${unit}`, kind) / theirs - 1)).toBeLessThan(tolerance);
  });

  const need = 'a length above zero is needed, such as "2.5 nm"';
  const units = "pm, nm, um, mm, Å, angstrom, m or bohr";
  test.each<[unknown, string]>([
    [3, `${need}; got 3 without a unit: add ${units}`],
    ["3", `${need}; got 3 without a unit: add ${units}`],
    ["5 eV", `${need}; "5 eV" is an energy`],
    ["5eV", `${need}; "5eV" is an energy`],
    ["5 eV nm", `${need}; "5 eV nm" is a strength (energy times length)`],
    ["-3 nm", `${need}; got "-3 nm"`],
    ["0 nm", `${need}; got "0 nm"`],
    ["2.5nm", `${need}; got "2.5nm": put a space between number and unit`],
    ["2,5 nm", `${need}; got "2,5 nm": write the decimal point as "."`],
    ["2.5 NM", `${need}; got "2.5 NM", whose unit "NM" is unknown: did you mean "nm"?`],
    ["2.5 mn", `${need}; got "2.5 mn", whose unit "mn" is unknown: did you mean "nm"?`],
    [
      "2 Angstroem",
      `${need}; got "2 Angstroem", whose unit "Angstroem" is unknown: did you mean "angstrom"?`,
    ],
    ["5 furlong", `${need}; got "5 furlong", whose unit "furlong" is unknown: use ${units}`],
    ["1 2 nm", `${need}; got "1 2 nm", whose unit "2 nm" is unknown: did you mean "nm"?`],
    ["0x10 nm", `${need}; got "0x10 nm", whose unit "x10 nm" is unknown: use ${units}`],
    ["nm", `${need}; got "nm": the number is missing`],
    ["wide", `${need}; got "wide"`],
    ["", `${need}; got an empty text`],
    ["\u22123 nm", `${need}; got "\u22123 nm": write the minus sign as "-"`],
    [Number.NaN, `${need}; got NaN, which is not a finite number`],
    [Number.POSITIVE_INFINITY, `${need}; got Infinity, which is not a finite number`],
    ["nan nm", `${need}; got "nan nm", which is not a finite number`],
    ["-.inf nm", `${need}; got "-.inf nm", which is not a finite number`],
    ["1e999 nm", `${need}; got "1e999 nm", which is too large`],
    ["1e300 m", `${need}; got "1e300 m", which is too large`],
    ["1e-999 nm", `${need}; got "1e-999 nm", which is too small to tell from zero`],
    [null, `${need}; got nothing`],
    [true, `${need}; got true`],
    [[], `${need}; got an empty list`],
    [[1], `${need}; got a list`],
    [{}, `${need}; got a map of keys`],
  ])("%j is refused in words", (input, message) => {
    const read = () => parseQuantity(input, "length", { range: "positive" });
    expect(read).toThrow(QuantityError);
    expect(read).toThrow(new QuantityError(message, "length"));
  });

  test("zero and negative values pass where the range has them", () => {
    expect(parseQuantity("0 nm", "length", { range: "not negative" })).toBe(0);
    expect(parseQuantity("-3 nm", "length")).toBe(-3);
    expect(() => parseQuantity("-3 nm", "length", { range: "not negative" })).toThrow(
      'a length of zero or more is needed, such as "2.5 nm"; got "-3 nm"',
    );
  });
});

describe("formatQuantity", () => {
  test.each<[number, QuantityKind, string | undefined, string]>([
    [0.3, "energy", undefined, "0.3 eV"],
    [0.0003, "energy", undefined, "300 ueV"],
    [0.005, "energy", undefined, "5 meV"],
    [2e-12, "energy", undefined, "2 peV"],
    [2e-16, "energy", undefined, "0.0002 peV"],
    [1500, "energy", undefined, "1.5 keV"],
    [-0.15, "energy", undefined, "-0.15 eV"],
    [0, "energy", undefined, "0 eV"],
    [-0, "length", undefined, "0 nm"],
    [0.078125, "length", undefined, "0.078125 nm"],
    [1500, "length", undefined, "1.5 um"],
    [0.001, "length", undefined, "1 pm"],
    [268, "time", undefined, "268 fs"],
    [1.2e9, "time", undefined, "1.2 us"],
    [0.05, "voltage", undefined, "50 mV"],
    [0.067 * ELECTRON_MASS, "mass", undefined, "0.067 m_e"],
    [86.909 * ATOMIC_MASS, "mass", undefined, "86.909 u"],
    [0.5 * ATOMIC_MASS + 1, "mass", undefined, "0.5000964853320219 u"],
    [1.67e-27 * KILOGRAM, "mass", undefined, "1.67e-27 kg"],
    [1822.888 * ELECTRON_MASS, "mass", undefined, "1822.888 m_e"],
    [0.1 * ATOMIC_MASS, "mass", undefined, "0.1 u"],
    [ATOMIC_MASS, "mass", "m_e", "1822.8884862827601 m_e"],
    [0.3, "energy", "meV", "300 meV"],
    [0.1 + 0.2, "energy", undefined, "0.30000000000000004 eV"],
    [1e-3, "frequency", undefined, "1 THz"],
    [1e30, "length", undefined, "1e21 m"],
    [1e-30, "length", "m", "1e-39 m"],
    [Number.POSITIVE_INFINITY, "energy", undefined, "Infinity eV"],
  ])("%d (%s, %s)", (value, kind, unit, text) => {
    expect(formatQuantity(value, kind, unit)).toBe(text);
  });

  test("rounds to the digits asked for", () => {
    expect(formatQuantity(2 / 3, "length", undefined, 4)).toBe("0.6667 nm");
    expect(formatQuantity(200, "length", undefined, 6)).toBe("200 nm");
    expect(formatQuantity(ELECTRON_MASS / 3, "mass", "m_e", 3)).toBe("0.333 m_e");
  });

  test("refuses a unit of another kind", () => {
    expect(() => formatQuantity(1, "length", "eV")).toThrow(RangeError);
    expect(() => formatQuantity(1, "length", "furlong")).toThrow(RangeError);
  });
});

const finite = fc
  .double({ noNaN: true, noDefaultInfinity: true })
  .filter((x) => Math.abs(x) < 1e280 && (x === 0 || Math.abs(x) > 1e-280));

describe("round trips", () => {
  test("what is printed in any decimal unit reads back as the same double", () => {
    const decimalUnits = UNITS.filter(({ factor }) => factor === 1);
    fc.assert(
      fc.property(finite, fc.constantFrom(...decimalUnits), (value, { kind, name }) => {
        expect(parseQuantity(formatQuantity(value, kind, name), kind)).toBe(value === 0 ? 0 : value);
      }),
      { numRuns: 2000 },
    );
  });

  test("what is printed in the chosen unit reads back to round-off, whatever the kind", () => {
    fc.assert(
      fc.property(finite, fc.constantFrom(...KINDS), (value, kind) => {
        const back = parseQuantity(formatQuantity(value, kind), kind);
        // Masses pass a division and a multiplication: 2 roundings of 1.1e-16.
        expect(Math.abs(back - value)).toBeLessThanOrEqual(2.3e-16 * Math.abs(value));
      }),
      { numRuns: 2000 },
    );
  });

  test("a short number in any unit is printed as it was written", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 99999 }),
        fc.integer({ min: 0, max: 4 }),
        fc.constantFrom(...UNITS),
        (n, p, u) => {
          const text = `${n / 10 ** p} ${u.name}`;
          expect(formatQuantity(parseQuantity(text, u.kind), u.kind, u.name)).toBe(text);
        },
      ),
      { numRuns: 2000 },
    );
  });

  test("the pattern of the JSON Schema takes exactly what is read", () => {
    const pieces = fc.constantFrom(
      "1",
      "2.5",
      "-3",
      "+.5",
      "1e3",
      "x",
      " ",
      "  ",
      "nm",
      "µm",
      "um",
      "Å",
      "eV",
      "V/nm",
      "eV nm",
      "",
    );
    fc.assert(
      fc.property(fc.array(pieces, { maxLength: 4 }), fc.constantFrom(...KINDS), (parts, kind) => {
        const text = parts.join("").trim();
        let read = true;
        try {
          parseQuantity(text, kind);
        } catch {
          read = false;
        }
        expect(new RegExp(quantityPattern(kind), "u").test(text)).toBe(read);
      }),
      { numRuns: 5000 },
    );
    for (const { name, kind } of UNITS) expect(`-2 ${name}`).toMatch(new RegExp(quantityPattern(kind), "u"));
    expect("-2 nm").not.toMatch(new RegExp(quantityPattern("length", "positive"), "u"));
    expect(unitsOf("strength")).toHaveLength(1);
  });
});
