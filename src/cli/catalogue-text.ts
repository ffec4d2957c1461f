import { sketch } from "../potentials/sketch.js";
import { concise } from "../units/concise.js";
import { formatQuantity } from "../units/quantity.js";
import type { CatalogueEntry, Overview, ParameterLine, ReferenceLine } from "./catalogue.js";
import { bold, COLUMNS, table, wrap } from "./terminal.js";

/** The list as text. */
export function overviewText({ readyMade, shapes }: Overview): string {
  return [
    `${bold("Ready-made potentials")}, for a design's "potential: { use: NAME }":`,
    table(
      readyMade.map(({ name, title }) => [name, title]),
      "  ",
    ),
    `${bold("Shapes")}, for "potential: { shape: NAME, ... }"; x is measured from center:`,
    table(
      shapes.map(({ name, formula }) => [name, formula]),
      "  ",
    ),
    '"postern potentials NAME" shows one of them in full.',
  ].join("\n\n");
}

/** One entry as text. */
export function entryText(entry: CatalogueEntry): string {
  const { kind, name, title, summary, parameters, reference } = entry;
  const parts = [
    kind === "shape" ? bold(`Shape ${name}`) : `${bold(title)}\n${name}`,
    wrap(summary),
    facts(entry),
    kind === "shape"
      ? `parameters\n${parameterTable(parameters)}`
      : `parameters, to be changed by "with"\n${parameterTable(parameters)}`,
    drawing(entry),
  ];
  if (reference.length > 0) parts.push(`transmission to check against\n${referenceTable(reference)}`);
  parts.push(`in a design\n  ${entry.use}`);
  return parts.join("\n\n");
}

function facts({ kind, shape, formula, mass, source, shapeSource }: CatalogueEntry): string {
  const rows: [string, string][] = [];
  if (kind === "ready-made") rows.push(["shape", shape]);
  rows.push(["formula", formula]);
  if (mass !== undefined) rows.push(["mass", `${mass}, unless the design gives another`]);
  rows.push(["source", source]);
  if (shapeSource !== undefined) rows.push(["of the shape", shapeSource]);
  return table(rows);
}

function parameterTable(parameters: readonly ParameterLine[]): string {
  const rows = parameters.map(({ name, value, optional, summary, example }) => {
    if (example === undefined) return [name, value ?? (optional ? "optional" : "needed"), summary];
    const state =
      value !== undefined ? `default ${value}` : `${optional ? "optional" : "needed"}, as ${example}`;
    return [name, state, summary];
  });
  return table(rows, "  ");
}

function referenceTable(reference: readonly ReferenceLine[]): string {
  const rows = reference.map(({ energy_eV, width_nm, mass, transmission, error }) => [
    formatQuantity(energy_eV, "energy", undefined, 6),
    (width_nm === undefined ? "plane wave" : `packet of width ${formatQuantity(width_nm, "length")}`) +
      (mass === undefined ? "" : `, mass ${mass}`),
    error === undefined ? String(transmission) : concise(transmission, error),
  ]);
  const sources = [...new Set(reference.map(({ source }) => source))];
  return [table(rows, "  "), ...sources.map((source) => wrap(`  from: ${source}`, COLUMNS, "    "))].join(
    "\n",
  );
}

function drawing({ kind, drawing: potential }: CatalogueEntry): string {
  const ascii = process.env.TERM === "dumb" || isPlainLocale();
  const caption = kind === "shape" ? "profile, with the parameters' examples" : "profile";
  return `${caption}\n${sketch(potential, { ascii })
    .map((line) => `  ${line}`)
    .join("\n")}`;
}

/** True where the user's settings name a character set other than UTF-8. */
function isPlainLocale(): boolean {
  const locale = process.env.LC_ALL || process.env.LC_CTYPE || process.env.LANG || "UTF-8";
  return !/utf-?8/i.test(locale);
}
