import type { DesignDescription } from "../design/describe.js";
import type { Choice, Explanation } from "../studies/explain.js";
import { formatQuantity } from "../units/quantity.js";
import { COLUMNS, table, wrap } from "./terminal.js";

/** A design in full as YAML, and what is chosen for it as comments. */
export function validateText(
  { yaml, sha256 }: DesignDescription,
  { choices, warnings }: Explanation,
): string {
  const chosen = table(
    choices.map(({ name, why, ...choice }) => [name, valueText(choice), why]),
    "  ",
    COLUMNS - 2,
  );
  const warned = warnings.map((warning) => wrap(`- ${warning}`, COLUMNS - 4, "  "));
  const comments = [
    `Hash (SHA-256 of the canonical form):\n  ${sha256}`,
    `How it is calculated, and why:\n${chosen}`,
    warnings.length === 0 ? "No warnings." : `Warnings:\n${indented(warned.join("\n"))}`,
  ];
  return `${yaml}\n${comments.map(comment).join("\n#\n")}\n`;
}

function valueText({ value, unit }: Pick<Choice, "value" | "unit">): string {
  if (typeof value === "string") return value;
  if (unit === "nm") return formatQuantity(value, "length", undefined, 4);
  if (unit === "fs") return formatQuantity(value, "time", undefined, 4);
  if (unit === "eV") return formatQuantity(value, "energy", undefined, 4);
  return unit === "" ? String(value) : `${Number(value.toPrecision(4))} ${unit}`;
}

const indented = (text: string): string => text.replace(/^/gm, "  ");

const comment = (text: string): string => text.replace(/^/gm, "# ");
