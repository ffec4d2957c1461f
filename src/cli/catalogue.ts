import { describeDesign } from "../design/describe.js";
import type { LibraryEntry, LibraryReference } from "../design/library-format.js";
import { formatPath } from "../design/path.js";
import { readDesign } from "../design/read-design.js";
import { shapeParameters } from "../design/schema.js";
import { isPotentialPath, libraryBeside, potentialNames, readPotential } from "../files/potential-library.js";
import type { Potential } from "../potentials/potential.js";
import { shapeNamed, shapes } from "../potentials/registry.js";
import type { ShapeDefinition, ShapeParameter } from "../potentials/shape.js";
import { formatQuantity } from "../units/quantity.js";

/** The list that `postern potentials` prints. */
export interface Overview {
  readonly readyMade: readonly { readonly name: string; readonly title: string; readonly summary: string }[];
  readonly shapes: readonly { readonly name: string; readonly summary: string; readonly formula: string }[];
}

/** A parameter that a design can give. */
export interface ParameterLine {
  readonly name: string;
  /** Its value in a ready-made potential, or its default in a shape; absent when it must be given or stays open. */
  readonly value?: string;
  readonly optional: boolean;
  readonly summary: string;
  readonly example?: string;
}

/** A value to check against. */
export interface ReferenceLine {
  readonly energy_eV: number;
  /** Absent for a plane wave. */
  readonly width_nm?: number;
  readonly mass?: string;
  readonly transmission: number;
  readonly error?: number;
  readonly source: string;
}

/** One entry in full. */
export interface CatalogueEntry {
  readonly kind: "ready-made" | "shape";
  readonly name: string;
  readonly title: string;
  readonly summary: string;
  readonly shape: string;
  readonly formula: string;
  readonly parameters: readonly ParameterLine[];
  readonly mass?: string;
  readonly source: string;
  readonly shapeSource?: string;
  readonly reference: readonly ReferenceLine[];
  /** How a design takes it, as YAML. */
  readonly use: string;
  /** The potential to draw; for a shape, that of its parameters' examples. */
  readonly drawing: Potential;
}

/** Every name that `postern potentials` takes. */
export function knownNames(): string[] {
  return [...potentialNames(), ...shapes.map(({ name }) => name)];
}

/** All ready-made potentials and all shapes. @throws DesignError for a broken file */
export function overview(): Overview {
  return {
    readyMade: potentialNames().map((name) => {
      const { title, summary } = readPotential(name) as LibraryEntry;
      return { name, title, summary };
    }),
    shapes: shapes.map(({ name, summary, formula }) => ({ name, summary, formula })),
  };
}

/** A ready-made potential, a shape, or a potential file by its path; undefined for an unknown name. @throws DesignError */
export function entryNamed(name: string): CatalogueEntry | undefined {
  const shape = isPotentialPath(name) ? undefined : shapeNamed(name);
  if (shape !== undefined) return shapeEntry(shape);
  const entry = readPotential(name);
  return entry && readyMade(name, entry);
}

function readyMade(name: string, entry: LibraryEntry): CatalogueEntry {
  const { design, potential } = built({ use: name });
  const shape = shapeNamed(potential.shape) as ShapeDefinition;
  const written = describeDesign(design, libraryBeside("design")).design as {
    readonly particle: { readonly mass: string };
    readonly potential: unknown;
  };
  const named = Object.entries(entry.parameters).map(([short, places]): ParameterLine => {
    const value = places[0].reduce<unknown>(
      (part, key) => (part as Record<string | number, unknown> | undefined)?.[key],
      written.potential,
    );
    const summary = places.map((place) => `potential.${formatPath(place)}`).join(" and ");
    return { name: short, value: value === undefined ? undefined : String(value), optional: true, summary };
  });
  return {
    kind: "ready-made",
    name: entry.name,
    title: entry.title,
    summary: entry.summary,
    shape: shape.name,
    formula: shape.formula,
    parameters: named,
    mass: entry.particle && written.particle.mass,
    source: entry.source,
    shapeSource: shape.source,
    reference: entry.reference.map((reference) => referenceLine(reference)),
    use: `potential: { use: ${name} }`,
    drawing: potential,
  };
}

function referenceLine({
  energy,
  width,
  mass,
  transmission,
  error,
  source,
}: LibraryReference): ReferenceLine {
  return {
    energy_eV: energy,
    ...(width !== undefined && { width_nm: width }),
    ...(mass !== undefined && { mass: formatQuantity(mass, "mass") }),
    transmission,
    ...(error !== undefined && { error }),
    source,
  };
}

function shapeEntry(shape: ShapeDefinition): CatalogueEntry {
  const parameters = Object.entries(shapeParameters(shape));
  const example = Object.fromEntries(
    parameters.flatMap(([name, parameter]) => (isOptional(parameter) ? [] : [[name, exampleOf(parameter)]])),
  );
  const given = Object.entries(example).map(([name, value]) => `, ${name}: ${flow(value)}`);
  return {
    kind: "shape",
    name: shape.name,
    title: shape.name,
    summary: shape.summary,
    shape: shape.name,
    formula: shape.formula,
    parameters: parameters.flatMap(([name, parameter]) => parameterLines(name, parameter)),
    source: shape.source,
    reference: [],
    use: `potential: { shape: ${shape.name}${given.join("")} }`,
    drawing: built({ shape: shape.name, ...example }).potential,
  };
}

function parameterLines(name: string, parameter: ShapeParameter): ParameterLine[] {
  const optional = isOptional(parameter);
  if (parameter.kind !== "list") {
    const { fallback, summary, example } = parameter;
    return [{ name, ...(fallback !== undefined && { value: fallback }), optional, summary, example }];
  }
  const inner = Object.entries(parameter.fields).flatMap(([field, part]) =>
    parameterLines(`${name}[].${field}`, part),
  );
  return [{ name, optional, summary: parameter.summary }, ...inner];
}

function isOptional(parameter: ShapeParameter): boolean {
  return parameter.optional === true || (parameter.kind !== "list" && parameter.fallback !== undefined);
}

type Example = string | readonly Readonly<Record<string, Example>>[];

function exampleOf(parameter: ShapeParameter): Example {
  if (parameter.kind !== "list") return parameter.example;
  const fields = Object.entries(parameter.fields).filter(([, field]) => !isOptional(field));
  return [Object.fromEntries(fields.map(([name, field]) => [name, field.example]))];
}

/** YAML in flow style. */
function flow(value: Example): string {
  if (typeof value === "string") return value;
  const maps = value.map(
    (map) =>
      `{ ${Object.entries(map)
        .map(([name, part]) => `${name}: ${flow(part)}`)
        .join(", ")} }`,
  );
  return `[${maps.join(", ")}]`;
}

/** A potential is built as part of a design; the packet is fast enough to be allowed anywhere, and is not used. */
function built(potential: object): { readonly design: string; readonly potential: Potential } {
  const packet = { energy: "1000 keV", width: "1 nm" };
  const design = JSON.stringify({ title: "drawing", potential, packet });
  return { design, potential: readDesign(design, libraryBeside("design")).potential };
}
