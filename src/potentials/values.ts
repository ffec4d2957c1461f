import { ParameterError, type ParameterValue, type ParameterValues } from "./shape.js";

type Entry = Readonly<Record<string, number | undefined>>;

/**
 * A parameter that must be there, in internal units.
 * @throws {ParameterError} when it is missing, no number, or not finite.
 */
export function required(values: ParameterValues | Entry, name: string, path = name): number {
  return finite(values[name], path);
}

/** The same for a parameter that may be left out: `fallback` then, in internal units. */
export function optional(
  values: ParameterValues | Entry,
  name: string,
  fallback: number,
  path = name,
): number {
  const value = values[name];
  return value === undefined ? fallback : finite(value, path);
}

/** As `required`, and above zero. */
export function requiredPositive(values: ParameterValues | Entry, name: string, path = name): number {
  return positive(required(values, name, path), path);
}

/** As `optional`, and above zero. */
export function optionalPositive(
  values: ParameterValues | Entry,
  name: string,
  fallback: number,
  path = name,
): number {
  return positive(optional(values, name, fallback, path), path);
}

/** The entries of a list parameter; an absent list has none. */
export function entries(values: ParameterValues, name: string): readonly Entry[] {
  const value = values[name];
  if (value === undefined) return [];
  if (typeof value === "number") throw new ParameterError(name, "a list is needed");
  return value;
}

function finite(value: ParameterValue, path: string): number {
  if (typeof value !== "number" || !Number.isFinite(value)) {
    throw new ParameterError(path, `a finite value is needed; got ${value}`);
  }
  return value;
}

function positive(value: number, path: string): number {
  if (!(value > 0)) throw new ParameterError(path, `a value above zero is needed; got ${value}`);
  return value;
}
