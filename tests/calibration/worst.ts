import { mkdirSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { type Comparison, comparisons, hasEscaped, type Row } from "./row.js";

/** Designs that are written out. */
const WORST = 10;

/** A design and why it is among the worst. */
export interface Worst {
  readonly row: Row;
  readonly why: string;
}

/** The worst designs: those that crashed or whose bound was escaped, then by turns those of the widest bounds and the slowest. */
export function worstOf(rows: readonly Row[], most = WORST): Worst[] {
  const faults = rows
    .filter((row) => row.outcome === "crashed" || row.outcome === "stopped" || hasEscaped(row))
    .sort((a, b) => excess(b) - excess(a))
    .map((row) => ({ row, why: faultOf(row) }));
  const rest = rows.filter((row) => row.estimate !== undefined && !hasEscaped(row));
  const wide = [...rest].sort((a, b) => ratioOf(b) - ratioOf(a));
  const slow = [...rest].sort((a, b) => secondsOf(b) - secondsOf(a));
  const worst: Worst[] = faults.slice(0, most);
  for (let i = 0; worst.length < Math.min(most, faults.length + rest.length); i++) {
    for (const [row, why] of [
      [wide[i], "widest bound beside its actual error"],
      [slow[i], "slowest"],
    ] as const)
      if (worst.length < most && !worst.some((other) => other.row === row)) worst.push({ row, why });
  }
  return worst;
}

/** Writes each as a design file whose first lines, comments, say what was found; those of an earlier run go. @returns the paths */
export function writeWorst(worst: readonly Worst[], folder: string): string[] {
  mkdirSync(folder, { recursive: true });
  for (const name of readdirSync(folder))
    if (/^worst-\d+-design-\d+\.yaml$/.test(name)) rmSync(join(folder, name));
  return worst.map(({ row, why }, i) => {
    const path = join(folder, `worst-${String(i + 1).padStart(2, "0")}-design-${row.index}.yaml`);
    writeFileSync(path, `${[`${why}; ${finding(row)}`].map((line) => `# ${line}\n`).join("")}${row.text}`);
    return path;
  });
}

const ratioOf = (row: Row) => row.estimate?.transmission.ratio ?? 0;
const secondsOf = (row: Row) => row.estimate?.seconds ?? 0;

/** By how much the worst of a design's bounds was missed, as a multiple of that bound; a crash is worse than any. */
function excess(row: Row): number {
  if (row.outcome !== "answered") return Number.POSITIVE_INFINITY;
  const missed = (c: Comparison) => (c.escaped ? c.difference / (c.error + c.referenceError) : 0);
  return Math.max(0, ...comparisons(row).map(missed));
}

function faultOf(row: Row): string {
  if (row.outcome !== "answered") return row.outcome;
  const { estimate, arbiter, reference } = row;
  if (!arbiter || !reference || !estimate) return "a bound was escaped";
  const off = Math.abs(reference.transmission.value - arbiter.transmission.value);
  const agrees = off <= reference.transmission.error + arbiter.transmission.error;
  return `a bound was escaped; the closed form ${agrees ? "sides with the witness" : `says ${arbiter.transmission.value}, not what the witness says`}`;
}

function finding({ outcome, message, reference, estimate }: Row): string {
  if (outcome !== "answered" || !estimate || !reference) return `${message ?? "no estimate"}`;
  const { transmission: t, reflection: r, verdict, seconds, dominant, failed } = estimate;
  const pair = (c: Comparison) =>
    `${c.value} +- ${c.error.toExponential(1)} against ${c.reference} +- ${c.referenceError.toExponential(1)}, bound/actual ${c.ratio.toPrecision(3)}`;
  const why =
    failed.length > 0 ? ` (${failed.map((f) => `${f.name} ${f.value.toExponential(1)}`).join(", ")})` : "";
  return `T ${pair(t)}, R ${pair(r)}; ${verdict}${why}; largest part ${dominant}; ${seconds.toFixed(2)} s`;
}
