/**
 * The format of a ready-made potential: one YAML (or JSON) file in potentials/, or a user's own, taken into a design by
 * `potential: { use: NAME, with: {...} }`. Keys, all at the top level:
 *
 *   name: oxide-barrier                # lower case, digits and hyphens; equals the file's name without .yaml
 *   title: Thin silicon oxide          # a few words
 *   summary: One or two sentences on what it stands for and when to use it.
 *   source: Author, year, equation or table of the numbers; or "common practice, no source"
 *   particle: { mass: 0.067 m_e }      # optional: the mass it is meant for; used when the design gives none itself
 *   parameters:                        # optional: short name -> place inside `potential` that it sets
 *     barrier: layers[0].width         #   the place is a path below `potential`: keys joined by ".", list items as [0]
 *     barriers: ["layers[0].width", "layers[2].width"]  # or several places, which then all get the same value
 *   potential: { shape: layers, layers: [...] }      # as in a design file, with `shape` and never with `use`
 *   reference:                         # optional: values to check against
 *     - energy: 0.15 eV                #   mean energy of the packet, or the energy of the plane wave
 *       width: 12 nm                   #   width of the packet; left out: a plane wave (stationary value)
 *       mass: 0.067 m_e                #   optional: the mass it holds for; left out: the particle's
 *       transmission: 0.0266           #   a probability, 0 to 1
 *       error: 1.0e-6                  #   optional: how far the value itself can be trusted, absolute
 *       source: closed form, Author year, equation
 *
 * Inside a flow list a path with brackets has to be quoted, as above.
 * `with` takes the names under `parameters`, and besides them any top-level key of the potential (`height`, `center`).
 */

import * as z from "zod";
import { describeValue } from "../units/quantity.js";
import { type Path, parsePath } from "./path.js";
import { faultText, mapSchema, quantitySchema } from "./quantity-schema.js";

/** A ready-made potential as its file says it; quantities of `reference` in internal units. */
export interface LibraryEntry {
  readonly name: string;
  readonly title: string;
  readonly summary: string;
  readonly source: string;
  readonly particle?: { readonly mass: number };
  /** Short name -> places inside the potential. */
  readonly parameters: Readonly<Record<string, readonly Path[]>>;
  /** As written: it is checked as part of the design that uses it. */
  readonly potential: Readonly<Record<string, unknown>>;
  readonly reference: readonly LibraryReference[];
}

/** A value that a ready-made potential can be checked against. */
export interface LibraryReference {
  /** eV */
  readonly energy: number;
  /** Width of the packet, nm; absent for a plane wave. */
  readonly width?: number;
  /** eV fs^2/nm^2; absent: that of the entry's particle. */
  readonly mass?: number;
  readonly transmission: number;
  readonly error?: number;
  readonly source: string;
}

const HELP = "The head of src/design/library-format.ts describes the format of a ready-made potential.";

/** Schema of the file; built on first use, because a design without `use` never needs it. */
export function librarySchema(): z.ZodType<LibraryEntry> {
  schema ??= build() as unknown as z.ZodType<LibraryEntry>;
  return schema;
}

let schema: z.ZodType<LibraryEntry> | undefined;

const fault = (need: string) => (issue: { readonly input?: unknown }) =>
  faultText(`${need} is needed; got ${describeValue(issue.input)}`, HELP);

function build(): z.ZodObject {
  const text = (need: string) =>
    z
      .string({ error: fault(need) })
      .trim()
      .min(1, { error: fault(need) });
  const needsName = fault("a name of lower-case letters, digits and hyphens");
  return mapSchema(
    {
      name: z.string({ error: needsName }).regex(/^[a-z0-9]+(?:-[a-z0-9]+)*$/, { error: needsName }),
      title: text("a title"),
      summary: text("a summary"),
      source: text("a source"),
      particle: mapSchema(
        { mass: massSchema("mass that the potential is meant for") },
        "the particle",
      ).optional(),
      parameters: z
        .record(z.string(), placesSchema(), {
          error: fault("a map from short names to places in the potential"),
        })
        .default({}),
      potential: z.record(z.string(), z.unknown(), { error: fault("a map with the key shape") }),
      reference: z
        .array(referenceSchema(), { error: fault("a list of values to check against") })
        .default([]),
    },
    "a ready-made potential",
  );
}

function massSchema(summary: string, optional = false): z.ZodType<number | undefined> {
  return quantitySchema({ kind: "mass", range: "positive", optional, summary, example: "0.067 m_e" });
}

/** One place or a list of them, each a path below `potential`. */
function placesSchema(): z.ZodType<readonly Path[]> {
  const need = fault('a place in the potential, such as "layers[0].width", or a list of places,');
  const place = z.string({ error: need }).transform((text, context): Path => {
    const path = parsePath(text);
    if (path !== undefined) return path;
    context.issues.push({ code: "custom", message: need({ input: text }), input: text });
    return z.NEVER;
  });
  return z.union([place.transform((path) => [path]), z.array(place).min(1)], { error: need });
}

function referenceSchema(): z.ZodObject {
  const probability = fault("a probability from 0 to 1");
  const bound = fault("a bound of zero or more");
  return mapSchema(
    {
      energy: quantitySchema({ kind: "energy", range: "positive", summary: "energy", example: "0.15 eV" }),
      width: quantitySchema({
        kind: "length",
        range: "positive",
        optional: true,
        summary: "width of the packet",
        example: "12 nm",
      }),
      mass: massSchema("mass that the value holds for", true),
      transmission: z
        .number({ error: probability })
        .min(0, { error: probability })
        .max(1, { error: probability }),
      error: z.number({ error: bound }).min(0, { error: bound }).optional(),
      source: z.string({ error: fault("a source") }).min(1, { error: fault("a source") }),
    },
    "a value to check against",
  );
}
