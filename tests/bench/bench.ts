/**
 * `npm run bench`: what the built package costs, in one table, against NumPy and SciPy where they are installed.
 * Speeds depend on the machine, ratios much less: they are measured in turns in one run. Exits 1 when a target is missed.
 */
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { cpus, release, tmpdir, totalmem, type } from "node:os";
import { join } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import type * as Library from "../../src/index.js";
import { drawDesign } from "../calibration/draw-design.js";
import { ROUNDS, type Spread, spread } from "./rounds.js";
import { compareSteps, POINTS } from "./steps.js";
import { peakMemory, wallTime } from "./whole-process.js";

/** Targets, from the project's own requirements. */
const TARGET = {
  cnTimesFaster: 5,
  fftTimesAsLong: 2.2,
  wallSeconds: 0.6,
  peakMegabytes: 150,
  drawnWallSeconds: 0.4,
  drawnSeconds: 0.06,
};
const PROCESS_RUNS = 7;
/** Designs of the calibration that are estimated once each, by the program and in this process. */
const DRAWN_DESIGNS = 40;
const DRAWN_SEED = 5;

const root = fileURLToPath(new URL("../../", import.meta.url));
const example = `${root}examples/blocking-barrier.yaml`;

interface Row {
  readonly what: string;
  readonly ours: string;
  readonly reference: string;
  readonly result: string;
  readonly target: string;
  /** Absent where there is no target, or nothing could be measured. */
  readonly met?: boolean;
}

const span = ({ median, min, max }: Spread, digits: number): string =>
  `${median.toFixed(digits)} (${min.toFixed(digits)}-${max.toFixed(digits)})`;

async function stepRows(): Promise<{ rows: Row[]; python: string }> {
  const measured = await compareSteps();
  const cnTarget = `>= ${TARGET.cnTimesFaster} times faster`;
  const fftTarget = `<= ${TARGET.fftTimesAsLong} times as long`;
  const what = { cn: `Crank-Nicolson step, ${POINTS} points`, fft: `split-operator step, ${POINTS} points` };
  if (measured === undefined) {
    const absent = { ours: "-", reference: "NumPy or SciPy absent", result: "not measured" };
    return {
      rows: [
        { what: what.cn, ...absent, target: cnTarget },
        { what: what.fft, ...absent, target: fftTarget },
      ],
      python: "no Python with NumPy and SciPy found",
    };
  }
  const rows = measured.rows.map(({ kind, comparison: { first, second, ratio } }): Row => {
    const sides = { what: what[kind], ours: `${span(first, 1)} us` };
    const reference = `${span(second, 1)} us`;
    if (kind === "cn")
      return {
        ...sides,
        reference: `${reference} solve_banded`,
        result: `${span(ratio, 2)} times faster`,
        target: cnTarget,
        met: ratio.median >= TARGET.cnTimesFaster,
      };
    const inverse = { median: 1 / ratio.median, min: 1 / ratio.max, max: 1 / ratio.min };
    return {
      ...sides,
      reference: `${reference} numpy.fft`,
      result: `${span(inverse, 2)} times as long`,
      target: fftTarget,
      met: inverse.median <= TARGET.fftTimesAsLong,
    };
  });
  const { python, numpy, scipy } = measured.python;
  return { rows, python: `Python ${python}, NumPy ${numpy}, SciPy ${scipy}` };
}

async function processRows(): Promise<Row[]> {
  const args = [`${root}dist/bin/postern.js`, "estimate", example];
  const bare = wallTime(process.execPath, ["-e", "0"], PROCESS_RUNS);
  const wall = wallTime(process.execPath, args, PROCESS_RUNS);
  const memory = await peakMemory(process.execPath, args);
  const peak = `${memory.megabytes.toFixed(0)} MB`;
  return [
    {
      what: "postern estimate, whole process",
      ours: `${span(wall, 3)} s`,
      reference: `${span(bare, 3)} s node -e 0`,
      result: `${wall.median.toFixed(3)} s`,
      target: `< ${TARGET.wallSeconds} s`,
      met: wall.median < TARGET.wallSeconds,
    },
    {
      what: `the same, peak memory (${memory.how})`,
      ours: peak,
      reference: "-",
      result: peak,
      target: `< ${TARGET.peakMegabytes} MB`,
      met: memory.megabytes < TARGET.peakMegabytes,
    },
  ];
}

async function libraryRow(): Promise<Row> {
  const library = (await import(pathToFileURL(`${root}dist/index.js`).href)) as typeof Library;
  const text = readFileSync(example, "utf8");
  const seconds: number[] = [];
  for (let i = 0; i < PROCESS_RUNS; i++) {
    const begin = performance.now();
    await library.estimate(library.readDesign(text));
    seconds.push((performance.now() - begin) / 1000);
  }
  const [first, ...later] = seconds;
  return {
    what: "readDesign and estimate, in process",
    ours: `${span(spread(later), 3)} s`,
    reference: `${first.toFixed(3)} s the first time`,
    result: `${spread(later).median.toFixed(3)} s`,
    target: "-",
  };
}

/** Random designs as `npm run calibrate` draws them: medians over designs, each estimated once, long-lived resonances included. */
async function drawnRows(): Promise<Row[]> {
  const library = (await import(pathToFileURL(`${root}dist/index.js`).href)) as typeof Library;
  const folder = mkdtempSync(join(tmpdir(), "postern-bench-"));
  const wall: number[] = [];
  const inside: number[] = [];
  for (let index = 0; index < DRAWN_DESIGNS; index++) {
    const { text } = drawDesign(DRAWN_SEED, index);
    const file = join(folder, `${index}.yaml`);
    writeFileSync(file, text);
    wall.push(wallTime(process.execPath, [`${root}dist/bin/postern.js`, "estimate", file], 1, [0, 3]).median);
    const begin = performance.now();
    await library.estimate(library.readDesign(text));
    inside.push((performance.now() - begin) / 1000);
  }
  rmSync(folder, { recursive: true });
  const row = (what: string, seconds: number[], target: number): Row => {
    const { median } = spread(seconds);
    return {
      what,
      ours: `${span(spread(seconds), 3)} s`,
      reference: "-",
      result: `${median.toFixed(3)} s`,
      target: `< ${target} s`,
      met: median < target,
    };
  };
  return [
    row(`estimate of ${DRAWN_DESIGNS} random designs, whole process`, wall, TARGET.drawnWallSeconds),
    row("the same, in process", inside, TARGET.drawnSeconds),
  ];
}

/** The rows as aligned columns with a heading. */
function table(rows: readonly Row[]): string {
  const cells = rows.map((row) => [
    row.what,
    row.ours,
    row.reference,
    row.result,
    row.target,
    row.met === undefined ? "-" : row.met ? "yes" : "MISSED",
  ]);
  const lines = [["", "postern", "beside it", "result", "target", "met"], ...cells];
  const widths = lines[0].map((_, column) => Math.max(...lines.map((line) => line[column].length)));
  return lines
    .map((line) =>
      line
        .map((cell, i) => cell.padEnd(widths[i]))
        .join("  ")
        .trimEnd(),
    )
    .join("\n");
}

const dependencies = (
  JSON.parse(readFileSync(`${root}package.json`, "utf8")) as { dependencies: Record<string, string> }
).dependencies;
const { rows: steps, python } = await stepRows();
const rows = [...steps, ...(await processRows()), await libraryRow(), ...(await drawnRows())];
console.log(
  `machine    ${cpus()[0]?.model.trim()}, ${cpus().length} cores, ${(totalmem() / 1e9).toFixed(0)} GB, ${type()} ${release()}`,
);
console.log(`versions   Node ${process.versions.node}, fft.js ${dependencies["fft.js"]}, ${python}`);
console.log(
  `figures    median (least-greatest); steps over ${ROUNDS} rounds in turns, processes over ${PROCESS_RUNS} runs\n`,
);
console.log(table(rows));
process.exitCode = rows.some((row) => row.met === false) ? 1 : 0;
