import type { QuantityParameter, ShapeDefinition } from "../potentials/shape.js";
import { nearest } from "../units/nearest.js";
import { formatQuantity, parseQuantity, type QuantityKind } from "../units/quantity.js";
import { DesignError } from "./design-error.js";
import { NUMERICS_FIELDS, PACKET_FIELDS, PARTICLE_FIELDS } from "./fields.js";
import type { ReadDesignOptions } from "./options.js";
import { formatPath, type Path, parsePath, valueAt } from "./path.js";
import { type ResolvedDesign, resolveDesign } from "./resolve.js";
import { shapeParameters } from "./schema.js";

/** A value of a design that a study can vary. */
export interface DesignPathValue {
  readonly path: string;
  /** Kind of quantity; "number" for values without a unit. */
  readonly kind: QuantityKind | "number";
  /** In internal units. */
  readonly value: number;
  /** As the design writes it, or its default. */
  readonly text: string;
  /** Unit of that text; "" for a number. */
  readonly unit: string;
}

const NUMBERS = ["order", "points", "accuracy"];

/**
 * The value at a path such as `potential.layers[1].width`, which names a value of the design as written: `with` of a
 * ready-made potential included. What is left out and has a default has that value.
 *
 * @throws DesignError when the design is wrong, or the path names no quantity or number of it
 */
export function designPathValue(
  text: string,
  path: string,
  options: ReadDesignOptions = {},
): DesignPathValue {
  const resolved = resolveDesign(text, options);
  const refuse = (problem: string): never => {
    const help = `Paths of this design: ${knownPaths(resolved).join(", ")}.`;
    throw new DesignError({ file: options.file ?? "design", key: path, problem, help });
  };
  const parsed = parsePath(path);
  if (parsed === undefined) return refuse("this is no path of a value, such as potential.layers[1].width");
  const place = placeOf(parsed, resolved);
  const value = valueAt(resolved.data, place);
  if (NUMBERS.includes(String(place[1])) && place[0] === "numerics" && place.length === 2) {
    if (typeof value !== "number")
      return refuse("the design leaves this value open; give it one in the file or by --set");
    return { path, kind: "number", value, text: String(value), unit: "" };
  }
  const field = fieldAt(place, resolved.shape);
  if (field === undefined) {
    const meant = nearest(path, knownPaths(resolved));
    return refuse(
      `no quantity of the design has this path${meant === undefined ? "" : `; did you mean "${meant}"?`}`,
    );
  }
  if (typeof value !== "number")
    return refuse("the design leaves this value open; give it one in the file or by --set");
  const written = valueAt(resolved.written, place) ?? field.fallback;
  const known = typeof written === "string" && parseQuantity(written, field.kind) === value;
  const quantity = known ? written.trim() : formatQuantity(value, field.kind);
  return { path, kind: field.kind, value, text: quantity, unit: quantity.replace(/^\S+\s+/, "") };
}

/** The place in the resolved design that a path of the design as written means. */
function placeOf(path: Path, { entry }: ResolvedDesign): Path {
  if (entry === undefined || path[0] !== "potential") return path;
  const inside = path[1] === "with" ? path.slice(2) : path.slice(1);
  const named = inside.length === 1 && Object.hasOwn(entry.parameters, inside[0]);
  return ["potential", ...(named ? entry.parameters[inside[0]][0] : inside)];
}

/** The quantity that stands at a path, whether or not the design gives it. */
function fieldAt(path: Path, shape: ShapeDefinition): QuantityParameter | undefined {
  const [section, name, index, inner] = path;
  const fields = { particle: PARTICLE_FIELDS, packet: PACKET_FIELDS, numerics: NUMERICS_FIELDS }[
    String(section)
  ];
  if (fields !== undefined)
    return path.length === 2 && Object.hasOwn(fields, name) ? fields[name] : undefined;
  const parameters = shapeParameters(shape);
  if (section !== "potential" || !Object.hasOwn(parameters, name ?? "")) return undefined;
  const parameter = parameters[name];
  if (parameter.kind !== "list") return path.length === 2 ? parameter : undefined;
  if (path.length !== 4 || typeof index !== "number" || !Object.hasOwn(parameter.fields, inner))
    return undefined;
  return parameter.fields[inner];
}

/** Paths of all quantities that have a value, as the user would name them. */
function knownPaths({ data, shape, entry }: ResolvedDesign): string[] {
  const paths: string[] = Object.keys(entry?.parameters ?? {}).map((name) => `potential.with.${name}`);
  const walk = (value: unknown, path: Path): void => {
    if (typeof value === "object" && value !== null) {
      for (const [key, part] of Object.entries(value))
        walk(part, [...path, Array.isArray(value) ? Number(key) : key]);
    } else if (fieldAt(path, shape) !== undefined && typeof value === "number") paths.push(formatPath(path));
  };
  walk(data, []);
  return paths.slice(0, 40);
}
