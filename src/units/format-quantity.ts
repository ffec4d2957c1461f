import { ATOMIC_MASS } from "./constants.js";
import { type QuantityKind, type Unit, unitNamed, unitsOf } from "./unit-table.js";

/** Units that a value is shown in when none is asked for: the usual one first, then the ladder, small to large. */
const LADDERS: Readonly<Record<QuantityKind, { usual: string; from: number; ladder: readonly string[] }>> = {
  length: { usual: "nm", from: 0.01, ladder: ["pm", "nm", "um", "mm", "m"] },
  energy: { usual: "eV", from: 0.01, ladder: ["peV", "neV", "ueV", "meV", "eV", "keV"] },
  time: { usual: "fs", from: 0.01, ladder: ["as", "fs", "ps", "ns", "us", "ms", "s"] },
  mass: { usual: "m_e", from: 0, ladder: [] },
  voltage: { usual: "V", from: 1, ladder: ["mV", "V"] },
  field: { usual: "V/nm", from: 0.001, ladder: ["V/m", "kV/cm", "V/nm"] },
  frequency: { usual: "THz", from: 0.01, ladder: ["Hz", "GHz", "THz"] },
  temperature: { usual: "K", from: 0, ladder: [] },
  strength: { usual: "eV nm", from: 0, ladder: [] },
};

/** The usual unit of a kind, whatever the value: the one for canonical forms and for column headers. */
export function usualUnit(kind: QuantityKind): string {
  return LADDERS[kind].usual;
}

/**
 * Prints a value of internal units as text that `parseQuantity` reads back.
 *
 * @param value in internal units
 * @param kind what it is
 * @param unit name of the unit to print it in; chosen by size when left out
 * @param digits significant digits; when left out, the fewest that read back to the same double
 * @throws RangeError for a unit that is unknown or of another kind
 */
export function formatQuantity(value: number, kind: QuantityKind, unit?: string, digits?: number): string {
  const chosen = unit === undefined ? suitableUnit(value, kind) : unitNamed(unit);
  if (chosen === undefined || chosen.kind !== kind) throw new RangeError(`"${unit}" is no unit of ${kind}`);
  return `${numberIn(chosen, value, digits)} ${chosen.name}`;
}

/** A length of 0.01 to 1000 nm is shown in nm, a larger or smaller one in the unit that gives 1 to 1000; so for all kinds. */
function suitableUnit(value: number, kind: QuantityKind): Unit {
  const { usual, from, ladder } = LADDERS[kind];
  const size = Math.abs(value);
  if (kind === "mass") return suitableMassUnit(value);
  const units = unitsOf(kind);
  const base = units.find((entry) => entry.name === usual) as Unit;
  const inBase = size / 10 ** base.exponent;
  if (size === 0 || !Number.isFinite(size) || ladder.length === 0 || (inBase >= from && inBase < 1000))
    return base;
  let best = units.find((entry) => entry.name === ladder[0]) as Unit;
  for (const name of ladder) {
    const candidate = units.find((entry) => entry.name === name) as Unit;
    if (size >= 10 ** candidate.exponent) best = candidate;
  }
  return best;
}

/** A mass of more digits was computed; the best known ones, of atoms, have eleven. */
const MOST_WRITTEN_DIGITS = 12;

/**
 * The unit in which a mass is a short number: the one that it was written in. What was computed is shown in m_e, and from
 * half an atomic mass unit on, which parts electrons and their effective masses from atoms, in u.
 */
function suitableMassUnit(value: number): Unit {
  const names = Math.abs(value) >= 0.5 * ATOMIC_MASS ? ["u", "m_e", "kg"] : ["m_e", "u", "kg"];
  const units = names.map((name) => unitNamed(name) as Unit);
  const digits = units.map((unit) => fewestDigits(value, unit));
  const written = digits.findIndex((count) => count !== undefined && count <= MOST_WRITTEN_DIGITS);
  const exact = digits.findIndex((count) => count !== undefined);
  return units[written >= 0 ? written : Math.max(0, exact)];
}

/** The least number of significant digits that reads back as the same double; some doubles have none in a unit. */
function fewestDigits(value: number, { factor }: Unit): number | undefined {
  const ratio = value / factor;
  for (let count = 1; count <= 17; count++) {
    if (Number(ratio.toExponential(count - 1)) * factor === value) return count;
  }
  return undefined;
}

function numberIn(unit: Unit, value: number, digits: number | undefined): string {
  if (!Number.isFinite(value) || value === 0) return String(value === 0 ? 0 : value);
  if (unit.factor === 1) return decimal(scientific(value, digits), -unit.exponent);
  const count = digits ?? fewestDigits(value, unit) ?? 17;
  return decimal((value / unit.factor).toExponential(count - 1), 0);
}

const scientific = (value: number, digits: number | undefined): string =>
  digits === undefined ? value.toExponential() : value.toExponential(digits - 1);

/** Decimal text of a number in exponential form times 10^shift, moved in the text: no digit changes. */
function decimal(text: string, shift: number): string {
  const [mantissa, power] = text.split("e");
  const sign = mantissa.startsWith("-") ? "-" : "";
  const digits = mantissa.replace(/[-.]/g, "").replace(/(?<=.)0+$/, "");
  const exponent = Number(power) + shift;
  // The bounds are those of JavaScript's own number printing, a little narrower on the large side.
  if (exponent < -6 || exponent > 15) {
    const fraction = digits.length > 1 ? `.${digits.slice(1)}` : "";
    return `${sign}${digits[0]}${fraction}e${exponent}`;
  }
  if (exponent < 0) return `${sign}0.${"0".repeat(-exponent - 1)}${digits}`;
  if (digits.length <= exponent + 1) return sign + digits.padEnd(exponent + 1, "0");
  return `${sign}${digits.slice(0, exponent + 1)}.${digits.slice(exponent + 1)}`;
}
