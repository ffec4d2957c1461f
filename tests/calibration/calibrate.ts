/**
 * `npm run calibrate -- --designs N --seed S`: random designs through estimate and spectrum, held against the stationary
 * witness. Measures the bounds: how often the truth lies within, how much wider than the actual error they are, and what they cost.
 * The same seed draws the same designs, whatever their number and the number of workers. Exits 1 when a bound was escaped or a design crashed, 130 when
 * it was interrupted, with the figures of what was measured.
 */
import { appendFileSync, mkdirSync, writeFileSync } from "node:fs";
import { availableParallelism } from "node:os";
import { dirname, join } from "node:path";
import { Command, InvalidArgumentError, Option } from "commander";
import { drawDesign } from "./draw-design.js";
import type { Family } from "./drawn-design.js";
import { figuresText } from "./figures-text.js";
import { measure, type Study } from "./measure.js";
import type { Row } from "./row.js";
import { figuresOf } from "./statistics.js";
import { measureInWorkers } from "./workers.js";
import { worstOf, writeWorst } from "./worst.js";

/** Every row of a run as a line of JSON, beside the worst designs. */
const ROWS_FILE = "rows.jsonl";

interface Options {
  readonly designs: number;
  readonly seed: number;
  readonly first: number;
  readonly only?: Family;
  readonly study: Study;
  readonly patience: number;
  readonly workers: number;
  readonly out?: string;
  readonly json?: boolean;
}

function whole(least: number) {
  return (text: string): number => {
    const n = Number(text);
    if (!Number.isInteger(n) || n < least || n >= 2 ** 32)
      throw new InvalidArgumentError(`a whole number from ${least} on is needed`);
    return n;
  };
}

const program = new Command("calibrate")
  .description("hold the bounds of random designs against the stationary witness")
  .option("--designs <n>", "designs to draw", whole(1), 100)
  .option("--seed <n>", "of the random designs", whole(0), 1)
  .option("--first <n>", "index of the first design", whole(0), 0)
  .addOption(new Option("--only <family>", "draw one family alone").choices(["layered", "smooth"]))
  .addOption(
    new Option("--study <name>", "what to hold against the witness")
      .choices(["estimate", "spectrum", "both"])
      .default("both"),
  )
  .option("--patience <seconds>", "stop a calculation after this long", whole(1), 120)
  .option("--workers <n>", `processes, up to ${availableParallelism()} here`, whole(1), 1)
  .option("--out <dir>", "write every row and the ten worst designs there as files")
  .option("--json", "print one JSON document with every row");

const options = program.parse().opts<Options>();
const { seed, out, only } = options;
const indices = Array.from({ length: options.designs }, (_, i) => options.first + i);
const rows: Row[] = [];
const file = out === undefined ? undefined : join(out, ROWS_FILE);
if (file !== undefined) {
  mkdirSync(dirname(file), { recursive: true });
  writeFileSync(file, "");
}

/** Rows are on disk as soon as they are measured: hours of work outlive whatever ends the process. */
function take(row: Row): void {
  rows.push(row);
  if (file !== undefined) appendFileSync(file, `${JSON.stringify(row)}\n`);
  if (process.stderr.isTTY) process.stderr.write(`\r${rows.length} of ${indices.length} designs`);
}

// The first signal ends the run with what was measured, the second one at once.
const ending = new AbortController();
for (const signal of ["SIGINT", "SIGTERM"] as const) process.once(signal, () => ending.abort());

if (options.workers > 1) await measureInWorkers(indices, options, take, ending.signal);
else
  for (const index of indices) {
    if (ending.signal.aborted) break;
    take(await measure(drawDesign(seed, index, only), options));
  }
rows.sort((a, b) => a.index - b.index);
if (process.stderr.isTTY) process.stderr.write("\n");
const figures = figuresOf(rows);
if (options.json) process.stdout.write(`${JSON.stringify({ seed, figures, rows })}\n`);
else process.stdout.write(figuresText(figures, seed));
if (out !== undefined)
  for (const path of writeWorst(worstOf(rows), out)) process.stderr.write(`wrote ${path}\n`);
if (figures.escapes.length > 0 || figures.outcomes.crashed > 0) process.exitCode = 1;
if (ending.signal.aborted) process.exitCode = 130;
