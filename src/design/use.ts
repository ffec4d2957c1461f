import { shapeNamed } from "../potentials/registry.js";
import { nearest } from "../units/nearest.js";
import { describeValue } from "../units/quantity.js";
import type { DesignError } from "./design-error.js";
import { readDocument, type SourceDocument, type SourceText } from "./document.js";
import { type LibraryEntry, librarySchema } from "./library-format.js";
import type { ReadDesignOptions } from "./options.js";
import { type Path, putAt } from "./path.js";
import { type Problem, Provenance } from "./provenance.js";
import { splitFault, unknownKey } from "./quantity-schema.js";
import { shapeParameters } from "./schema.js";

/** Reads the file of a ready-made potential. @throws DesignError when it is not of the format of library-format.ts */
export function readLibraryEntry(source: SourceText): LibraryEntry {
  return readEntry(readDocument(source));
}

function readEntry(document: SourceDocument): LibraryEntry {
  const result = librarySchema().safeParse(document.data, { jitless: true });
  if (result.success) return result.data;
  const issue =
    result.error.issues.find(({ code }) => code === "unrecognized_keys") ?? result.error.issues[0];
  const path = issue.path as Path;
  const unknown = issue.code === "unrecognized_keys";
  throw new Provenance(document).error({
    path: unknown ? [...path, issue.keys[0]] : path,
    target: unknown ? "key" : "value",
    ...splitFault(issue.message),
  });
}

/**
 * Replaces `potential: { use, with }` of a design, in place, by the ready-made potential with its changes made, and takes
 * over the particle's mass that it is meant for when the design gives none.
 * @returns the entry used, or undefined when the design uses none
 */
export function takeFromLibrary(
  design: Record<string, unknown>,
  options: ReadDesignOptions,
  provenance: Provenance,
): LibraryEntry | undefined {
  const potential = design.potential;
  if (typeof potential !== "object" || potential === null || !Object.hasOwn(potential, "use"))
    return undefined;
  const { use, with: changes, ...rest } = potential as Record<string, unknown>;
  const refuse = (problem: Omit<Problem, "path">, ...path: Path): never => {
    throw provenance.error({ path: ["potential", ...path], ...problem });
  };
  const stray = Object.keys(rest)[0];
  if (stray !== undefined) refuse(strayKey(stray), stray);
  if (typeof use !== "string" || use.trim() === "") {
    const problem = `the name of a ready-made potential, or the path of a file, is needed; got ${describeValue(use)}`;
    refuse({ problem, help: LIST_HELP, target: "value" }, "use");
  }
  const source = options.library?.(use as string);
  if (source === undefined) return refuse(unknownName(use as string, options.libraryNames ?? []), "use");
  const document = readDocument(source);
  const entry = readEntry(document);
  const changeMap = checkedChanges(changes, refuse);
  const changesMade = Object.entries(changeMap).flatMap(([key, value]) =>
    // Origins are looked up before the ready-made potential covers them.
    places(key, entry, refuse).map((place) => ({
      key,
      value,
      place,
      origin: provenance.originOf(["potential", "with", key]),
    })),
  );
  design.potential = structuredClone(entry.potential);
  provenance.record(["potential"], { source: document, path: ["potential"] });
  for (const { key, value, place, origin } of changesMade) {
    provenance.record(["potential", ...place], origin);
    const obstacle = putAt(design, ["potential", ...place], value);
    if (obstacle !== undefined) throw misplaced(document, key, obstacle);
  }
  takeMass(design, document, provenance);
  return entry;
}

const LIST_HELP = "`postern potentials` lists the ready-made ones.";

function strayKey(key: string): Omit<Problem, "path"> {
  const meant = nearest(key, ["use", "with"]);
  const problem =
    meant === undefined
      ? 'not together with use: changes of a ready-made potential stand under "with"'
      : unknownKey(key, ["use", "with"]);
  return { problem, help: "Keys that can stand here: use, with.", target: "key" };
}

function unknownName(name: string, names: readonly string[]): Omit<Problem, "path"> {
  const meant = nearest(name, names);
  const hint = meant === undefined ? "" : `; did you mean "${meant}"?`;
  return {
    problem: `no ready-made potential of that name: got "${name}"${hint}`,
    help: LIST_HELP,
    target: "value",
  };
}

type Refuse = (problem: Omit<Problem, "path">, ...path: Path) => never;

function checkedChanges(changes: unknown, refuse: Refuse): Record<string, unknown> {
  if (changes === undefined) return {};
  if (typeof changes === "object" && changes !== null && !Array.isArray(changes))
    return changes as Record<string, unknown>;
  const problem = `a map of parameters is needed; got ${describeValue(changes)}`;
  return refuse({ problem, help: 'Write with: { height: "0.25 eV" }.', target: "value" }, "with");
}

/** The places inside the potential that a name under `with` sets. */
function places(key: string, entry: LibraryEntry, refuse: Refuse): readonly Path[] {
  if (Object.hasOwn(entry.parameters, key)) return entry.parameters[key];
  const shape = shapeNamed(String(entry.potential.shape));
  const own = shape === undefined ? Object.keys(entry.potential) : Object.keys(shapeParameters(shape));
  if (own.includes(key)) return [[key]];
  const known = [...Object.keys(entry.parameters), ...own];
  const help = `Parameters of ${entry.name}: ${known.join(", ")}.`;
  return refuse({ problem: unknownKey(key, known), help, target: "key" }, "with", key);
}

function misplaced(document: SourceDocument, key: string, problem: string): DesignError {
  const help = "A place under parameters is a path below potential, such as layers[0].width.";
  return new Provenance(document).error({ path: ["parameters", key], problem, help, target: "value" });
}

/** A mass is taken over only where the design says nothing about it. */
function takeMass(design: Record<string, unknown>, document: SourceDocument, provenance: Provenance): void {
  const particle = design.particle ?? {};
  const meant = document.data.particle as { readonly mass: unknown } | undefined;
  if (meant === undefined || typeof particle !== "object" || Object.hasOwn(particle, "mass")) return;
  design.particle = { ...particle, mass: meant.mass };
  provenance.record(["particle", "mass"], { source: document, path: ["particle", "mass"] });
}
