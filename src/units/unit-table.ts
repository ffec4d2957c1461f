import {
  ATOMIC_MASS,
  BOHR_RADIUS_M,
  ELECTRON_MASS,
  ELEMENTARY_CHARGE_C,
  HARTREE_J,
  KILOGRAM,
} from "./constants.js";

/** Kinds of quantity that a value with a unit can be. */
export type QuantityKind =
  | "length"
  | "energy"
  | "time"
  | "mass"
  | "voltage"
  | "field"
  | "frequency"
  | "temperature"
  | "strength";

/** One unit: value in internal units = number * 10^exponent * factor. */
export interface Unit {
  readonly name: string;
  readonly kind: QuantityKind;
  /** Power of ten, applied to the digits of the text, so that nothing is lost in it. */
  readonly exponent: number;
  /** 1 for every unit that differs from the internal one by a power of ten alone. */
  readonly factor: number;
}

const unit = (kind: QuantityKind, name: string, exponent: number, factor = 1): Unit => ({
  name,
  kind,
  exponent,
  factor,
});

/**
 * Every unit that the design file knows, in the order in which messages list them. Internal units: length nm, energy eV,
 * time fs, mass eV fs^2/nm^2, voltage V, field V/nm, frequency 1/fs, temperature K, strength eV nm. Powers of ten follow
 * from the SI prefixes; the rest from src/units/constants.ts (CODATA 2022).
 */
export const UNITS: readonly Unit[] = [
  unit("length", "pm", -3),
  unit("length", "nm", 0),
  unit("length", "um", 3),
  unit("length", "mm", 6),
  unit("length", "Å", -1),
  unit("length", "angstrom", -1),
  unit("length", "m", 9),
  unit("length", "bohr", 0, BOHR_RADIUS_M * 1e9),
  unit("energy", "peV", -12),
  unit("energy", "neV", -9),
  unit("energy", "ueV", -6),
  unit("energy", "meV", -3),
  unit("energy", "eV", 0),
  unit("energy", "keV", 3),
  unit("energy", "hartree", 0, HARTREE_J / ELEMENTARY_CHARGE_C),
  unit("energy", "J", 0, 1 / ELEMENTARY_CHARGE_C),
  unit("time", "as", -3),
  unit("time", "fs", 0),
  unit("time", "ps", 3),
  unit("time", "ns", 6),
  unit("time", "us", 9),
  unit("time", "ms", 12),
  unit("time", "s", 15),
  unit("mass", "m_e", 0, ELECTRON_MASS),
  unit("mass", "u", 0, ATOMIC_MASS),
  unit("mass", "kg", 0, KILOGRAM),
  unit("voltage", "mV", -3),
  unit("voltage", "V", 0),
  unit("field", "V/nm", 0),
  unit("field", "MV/cm", -1),
  unit("field", "kV/cm", -4),
  unit("field", "V/m", -9),
  unit("frequency", "GHz", -6),
  unit("frequency", "THz", -3),
  unit("frequency", "Hz", -15),
  unit("temperature", "K", 0),
  unit("strength", "eV nm", 0),
];

/** How a message names a value of each kind. */
export const KIND_WORDS: Readonly<Record<QuantityKind, string>> = {
  length: "a length",
  energy: "an energy",
  time: "a time",
  mass: "a mass",
  voltage: "a voltage",
  field: "an electric field",
  frequency: "a frequency",
  temperature: "a temperature",
  strength: "a strength (energy times length)",
};

/** A value of each kind as a user would write it. */
export const KIND_EXAMPLES: Readonly<Record<QuantityKind, string>> = {
  length: "2.5 nm",
  energy: "0.3 eV",
  time: "40 fs",
  mass: "0.067 m_e",
  voltage: "50 mV",
  field: "0.1 V/nm",
  frequency: "1 THz",
  temperature: "300 K",
  strength: "0.5 eV nm",
};

/** Signs that stand for a unit or a prefix of the table: the micro sign, the Greek mu, the angstrom sign (by NFC). */
function plainName(text: string): string {
  return text
    .normalize("NFC")
    .replace(/[\u00b5\u03bc]/gu, "u")
    .replace(/\s+/g, " ");
}

const byName = new Map(UNITS.map((entry) => [entry.name, entry]));

/** The unit of that name, however its micro or angstrom sign is coded; undefined when there is none. */
export function unitNamed(text: string): Unit | undefined {
  return byName.get(plainName(text));
}

/** The units of a kind, in the order of the table. */
export function unitsOf(kind: QuantityKind): readonly Unit[] {
  return UNITS.filter((entry) => entry.kind === kind);
}

/** "pm, nm, um, mm, Å, angstrom, m or bohr": the units of a kind, for messages. */
export function unitList(kind: QuantityKind): string {
  const names = unitsOf(kind).map((entry) => entry.name);
  const last = names.pop() as string;
  return names.length === 0 ? last : `${names.join(", ")} or ${last}`;
}
