import * as z from "zod";
import { shapeNamed, shapes } from "../potentials/registry.js";
import type { ShapeDefinition } from "../potentials/shape.js";
import { nearest } from "../units/nearest.js";
import { describeValue } from "../units/quantity.js";
import { readDocument } from "./document.js";
import type { LibraryEntry } from "./library-format.js";
import { type Override, overrides, type ReadDesignOptions } from "./options.js";
import { type Path, putAt, valueAt } from "./path.js";
import { type Problem, Provenance } from "./provenance.js";
import { splitFault, unknownKey } from "./quantity-schema.js";
import { type DesignData, designSchema, shapeSchema } from "./schema.js";
import { takeFromLibrary } from "./use.js";

/** A design with `use`, options and defaults resolved and every value checked by itself. */
export interface ResolvedDesign {
  readonly data: DesignData;
  /** The same with values as written: quantities as text, no defaults. */
  readonly written: Readonly<Record<string, unknown>>;
  readonly shape: ShapeDefinition;
  /** The ready-made potential that it uses. */
  readonly entry?: LibraryEntry;
  readonly provenance: Provenance;
}

/** Reads the text and resolves it. @throws DesignError with the most helpful of all that is wrong */
export function resolveDesign(text: string, options: ReadDesignOptions = {}): ResolvedDesign {
  const document = readDocument({ text, file: options.file ?? "design" });
  const provenance = new Provenance(document);
  // "$schema" tells an editor of a JSON file how to complete it; it says nothing about the design.
  const { $schema: _, ...written } = document.data;
  const all = overrides(options);
  const late = all.filter(({ path }) => isInsidePotential(path));
  for (const override of all.filter((each) => !late.includes(each))) apply(override, written, provenance);
  const entry = takeFromLibrary(written, options, provenance);
  for (const override of late) {
    for (const target of targets(override.path, entry)) apply({ ...override, target }, written, provenance);
  }
  const choice = chooseShape(written.potential);
  const schema = envelope("shape" in choice ? choice.shape : undefined);
  // jitless: no code is made from text, so that a page with a content security policy can use it too.
  const result = schema.safeParse(written, { jitless: true });
  const problems = result.success ? [] : result.error.issues.flatMap((issue) => toProblem(issue, written));
  if ("problem" in choice) problems.push(choice);
  if (problems.length > 0) throw mostHelpful(problems, provenance);
  if (!result.success || !("shape" in choice)) throw new Error("a design without problems must parse");
  return { data: result.data, written, shape: choice.shape, entry, provenance };
}

/** Paths below `potential`, other than those of `use` and `with`, mean the potential after `use` is resolved. */
function isInsidePotential(path: Path): boolean {
  return path[0] === "potential" && path.length > 1 && path[1] !== "use" && path[1] !== "with";
}

function targets(path: Path, entry: LibraryEntry | undefined): readonly Path[] {
  const name = path[1];
  if (entry === undefined || path.length !== 2 || !Object.hasOwn(entry.parameters, name)) return [path];
  return entry.parameters[name].map((place) => ["potential", ...place]);
}

function apply(
  { path, value, option, target = path }: Override & { readonly target?: Path },
  data: Record<string, unknown>,
  provenance: Provenance,
): void {
  // A map or list that the option makes on the way is the option's too: it stands in no file.
  const made =
    target === path ? path.findIndex((_, i) => valueAt(data, path.slice(0, i + 1)) === undefined) : -1;
  const origin = made < 0 ? path : path.slice(0, made + 1);
  provenance.record(made < 0 ? target : origin, { source: option, path: origin });
  const obstacle = putAt(data, target, structuredClone(value));
  if (obstacle === undefined) return;
  const help = "A path names a value of the design, such as packet.energy or potential.layers[1].width.";
  throw provenance.error({ path: target, problem: obstacle, help, target: "value" });
}

const envelopes = new Map<ShapeDefinition | undefined, z.ZodType<DesignData>>();

/** Schema of a design with a potential of that shape, or with any potential while the shape is not known. */
function envelope(shape: ShapeDefinition | undefined): z.ZodType<DesignData> {
  let schema = envelopes.get(shape);
  if (schema === undefined) {
    schema = designSchema(shape === undefined ? z.unknown().optional() : shapeSchema(shape));
    envelopes.set(shape, schema);
  }
  return schema;
}

function chooseShape(potential: unknown): { readonly shape: ShapeDefinition } | Problem {
  const help = `Shapes: ${shapes.map(({ name }) => name).join(", ")}. \`postern potentials\` lists the ready-made ones.`;
  const wrong = (path: Path, problem: string, target: Problem["target"]): Problem => ({
    path,
    problem,
    help,
    target,
  });
  const need =
    'a map with the key shape (or use) is needed, such as { shape: rectangular, height: "0.3 eV", width: "5 nm" }';
  if (potential === undefined) return wrong(["potential"], `missing; ${need}`, "parent");
  if (typeof potential !== "object" || potential === null || Array.isArray(potential)) {
    return wrong(["potential"], `${need}; got ${describeValue(potential)}`, "value");
  }
  const name = (potential as Record<string, unknown>).shape;
  if (name === undefined) {
    const slip = Object.keys(potential).find((key) => nearest(key, ["shape", "use"]) !== undefined);
    if (slip !== undefined) return wrong(["potential", slip], unknownKey(slip, ["shape", "use"]), "key");
    return wrong(
      ["potential", "shape"],
      "missing; the name of a shape is needed, or use with that of a ready-made potential",
      "parent",
    );
  }
  const shape = typeof name === "string" ? shapeNamed(name) : undefined;
  if (shape !== undefined) return { shape };
  const meant =
    typeof name === "string"
      ? nearest(
          name,
          shapes.map((each) => each.name),
        )
      : undefined;
  const hint = meant === undefined ? "" : `; did you mean "${meant}"?`;
  return wrong(["potential", "shape"], `no shape of that name: got ${describeValue(name)}${hint}`, "value");
}

/** What zod found, as a problem of the design. */
export function toProblem(issue: z.core.$ZodIssue, data: unknown): Problem[] {
  const path = issue.path as Path;
  const fault = splitFault(issue.message);
  if (issue.code === "unrecognized_keys") {
    return issue.keys.slice(0, 1).map((key) => ({ path: [...path, key], ...fault, target: "key" }));
  }
  return [
    { path, ...fault, target: path.length > 0 && valueAt(data, path) === undefined ? "parent" : "value" },
  ];
}

/**
 * An unknown key explains what is missing, so it comes first; then values, in the order of the file; what is missing
 * comes last. Options are named before the file, because they were typed just now.
 */
export function mostHelpful(problems: readonly Problem[], provenance: Provenance): Error {
  const rank = { key: 0, value: 1, parent: 2 };
  const ranked = problems.map((problem) => ({
    error: provenance.error(problem),
    rank: rank[problem.target],
  }));
  ranked.sort(
    (a, b) =>
      a.rank - b.rank ||
      (a.error.line ?? 0) - (b.error.line ?? 0) ||
      (a.error.column ?? 0) - (b.error.column ?? 0),
  );
  return ranked[0].error;
}
