import type { QuantityKind } from "../units/quantity.js";
import type { Potential } from "./potential.js";

export type { QuantityKind };

/** One parameter of a shape, as the design file, the JSON Schema and `postern potentials` show it. */
export interface QuantityParameter {
  readonly kind: QuantityKind;
  /** Allowed range of the value. */
  readonly range: "positive" | "not negative" | "any";
  /** May be left out. */
  readonly optional?: boolean;
  /** Quantity text used when it is left out. */
  readonly fallback?: string;
  /** One line for help, docs and schema. */
  readonly summary: string;
  /** A value as a user would write it. */
  readonly example: string;
}

/** A list of records, each with parameters of its own (layers). */
export interface ListParameter {
  readonly kind: "list";
  readonly optional?: boolean;
  readonly summary: string;
  readonly fields: Readonly<Record<string, QuantityParameter>>;
}

export type ShapeParameter = QuantityParameter | ListParameter;

/** Parameter values in internal units (nm, eV, fs, eV fs^2/nm^2): numbers, and lists of records of numbers. */
export type ParameterValue = number | undefined | readonly Readonly<Record<string, number | undefined>>[];
export type ParameterValues = Readonly<Record<string, ParameterValue>>;

/** Thrown by a shape's `build` for values that contradict each other; `path` names the parameter. */
export class ParameterError extends RangeError {
  constructor(
    readonly path: string,
    message: string,
  ) {
    super(message);
    this.name = "ParameterError";
  }
}

/** What a file in this folder exports, and the registry lists. */
export interface ShapeDefinition {
  readonly name: string;
  readonly summary: string;
  /** V(x) in plain text, as the docs and `postern potentials` print it. */
  readonly formula: string;
  /** Author, year and equation of the formula or of its closed-form transmission. */
  readonly source: string;
  readonly parameters: Readonly<Record<string, ShapeParameter>>;
  /** Makes the potential. `particleMass` is the mass outside the structure, eV fs^2/nm^2. */
  build(values: ParameterValues, particleMass: number): Potential;
}
