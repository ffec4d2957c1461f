import { nearest } from "./nearest.js";
import {
  KIND_EXAMPLES,
  KIND_WORDS,
  type QuantityKind,
  UNITS,
  type Unit,
  unitList,
  unitNamed,
  unitsOf,
} from "./unit-table.js";

export { formatQuantity } from "./format-quantity.js";
export { type QuantityKind, unitList, unitsOf } from "./unit-table.js";

/** Allowed range of a quantity's value. */
export type QuantityRange = "positive" | "not negative" | "any";

/** What a place asks for, beyond the kind of quantity. */
export interface QuantityNeed {
  /** Default "any". */
  readonly range?: QuantityRange;
  /** A value as a user would write it; by default the kind's own. */
  readonly example?: string;
}

/** Thrown for text that is no quantity of the kind and range asked for; the message says what is needed and what was got. */
export class QuantityError extends RangeError {
  constructor(
    message: string,
    readonly kind: QuantityKind,
  ) {
    super(message);
    this.name = "QuantityError";
  }
}

const NUMBER = String.raw`(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?`;
const SHAPE = new RegExp(String.raw`^([+-]?${NUMBER})(\s*)(.*)$`, "s");
const RANGE_WORDS: Readonly<Record<QuantityRange, string>> = {
  positive: " above zero",
  "not negative": " of zero or more",
  any: "",
};

/** `a length above zero is needed, such as "2.5 nm"`. */
export function quantityNeed(kind: QuantityKind, need: QuantityNeed = {}): string {
  return `${KIND_WORDS[kind]}${RANGE_WORDS[need.range ?? "any"]} is needed, such as "${need.example ?? KIND_EXAMPLES[kind]}"`;
}

/**
 * Reads a quantity: a number, a space, a unit.
 *
 * @param input the text; anything else is refused with a message that says what it is
 * @param kind what it has to be
 * @param need its range, and an example for the message
 * @returns the value in internal units: nm, eV, fs, eV fs^2/nm^2, V, V/nm, 1/fs, K, eV nm. Units that differ from these
 *   by a power of ten lose nothing: "0.3 meV" is the double nearest to 0.0003.
 * @throws QuantityError for a bare number, a wrong kind, an unknown unit, a value out of range, not finite or too large
 */
export function parseQuantity(input: unknown, kind: QuantityKind, need: QuantityNeed = {}): number {
  const refuse = (got: string): never => {
    throw new QuantityError(`${quantityNeed(kind, need)}; ${got}`, kind);
  };
  if (typeof input !== "string") return refuse(describeOther(input, kind));
  const text = input.trim();
  const match = SHAPE.exec(text);
  if (match === null) return refuse(describeUnreadable(text));
  const [, digits, space, unitText] = match;
  if (unitText === "") return refuse(`got ${digits} without a unit: add ${unitList(kind)}`);
  const unit = unitNamed(unitText);
  if (unit === undefined) return refuse(describeUnknownUnit(text, unitText, kind));
  if (unit.kind !== kind) return refuse(`"${short(text)}" is ${KIND_WORDS[unit.kind]}`);
  if (space === "") return refuse(`got "${short(text)}": put a space between number and unit`);
  const value = scaled(digits, unit);
  if (!Number.isFinite(value)) return refuse(`got "${short(text)}", which is too large`);
  if (value === 0 && /[1-9]/.test(digits.replace(/[eE].*$/, ""))) {
    return refuse(`got "${short(text)}", which is too small to tell from zero`);
  }
  const range = need.range ?? "any";
  if (value < 0 && range !== "any") return refuse(`got "${short(text)}"`);
  if (value === 0 && range === "positive") return refuse(`got "${short(text)}"`);
  return value === 0 ? 0 : value;
}

/** The regular expression, as text for a JSON Schema, that quantities of a kind and range match. */
export function quantityPattern(kind: QuantityKind, range: QuantityRange = "any"): string {
  const sign = range === "any" ? "[+-]?" : "\\+?";
  const names = unitsOf(kind).flatMap(({ name }) =>
    /^u./.test(name) ? [name, `µ${name.slice(1)}`] : [name],
  );
  return `^${sign}${NUMBER}\\s+(?:${names.join("|")})$`;
}

/** number * 10^exponent * factor, with the power of ten moved into the text so that it costs no rounding. */
function scaled(digits: string, unit: Unit): number {
  const [mantissa, exponent = "0"] = digits.toLowerCase().split("e");
  const number = Number(`${mantissa}e${Number(exponent) + unit.exponent}`);
  return unit.factor === 1 ? number : number * unit.factor;
}

function short(text: string): string {
  const line = text.replace(/\s+/g, " ");
  return line.length > 60 ? `${line.slice(0, 57)}...` : line;
}

/** "got ..." for a value that is no text. */
function describeOther(input: unknown, kind: QuantityKind): string {
  if (typeof input === "number") {
    if (!Number.isFinite(input)) return `got ${input}, which is not a finite number`;
    return `got ${input} without a unit: add ${unitList(kind)}`;
  }
  return `got ${describeValue(input)}`;
}

/** A value of a design file in words: nothing, a list, a map, true, "text". */
export function describeValue(input: unknown): string {
  if (input === undefined || input === null) return "nothing";
  if (Array.isArray(input)) return input.length === 0 ? "an empty list" : "a list";
  if (typeof input === "object") return "a map of keys";
  return typeof input === "string" ? `"${short(input)}"` : String(input);
}

/** "got ..." for a text that does not begin with a number. */
function describeUnreadable(text: string): string {
  if (text === "") return "got an empty text";
  if (/^[+-]?\.?(nan|inf|infinity|∞)\b/i.test(text) || text.includes("∞")) {
    return `got "${short(text)}", which is not a finite number`;
  }
  if (/^[\u2212\u2013]/u.test(text)) return `got "${short(text)}": write the minus sign as "-"`;
  if (unitNamed(text) !== undefined) return `got "${short(text)}": the number is missing`;
  return `got "${short(text)}"`;
}

/** "got ..." for a number that is followed by no known unit. */
function describeUnknownUnit(text: string, unitText: string, kind: QuantityKind): string {
  if (/^,\d/.test(unitText)) return `got "${short(text)}": write the decimal point as "."`;
  const fitting = unitsOf(kind).map(({ name }) => name);
  const others = UNITS.map(({ name }) => name);
  // Two letters that differ in case alone are the commonest slip, in this kind or, failing that, in any.
  const sameLetters = [...fitting, ...others].find((name) => name.toLowerCase() === unitText.toLowerCase());
  const meant = sameLetters ?? nearest(unitText, fitting) ?? nearest(unitText, others);
  const hint = meant === undefined ? `use ${unitList(kind)}` : `did you mean "${meant}"?`;
  return `got "${short(text)}", whose unit "${short(unitText)}" is unknown: ${hint}`;
}
