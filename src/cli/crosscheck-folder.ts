import { join } from "node:path";
import type { Series } from "../analysis/results.js";
import { describeDesign } from "../design/describe.js";
import { crosscheckFigure } from "../figures/crosscheck-figure.js";
import type { CrosscheckFigureOptions } from "../figures/drawn-crosscheck.js";
import { writeFolder } from "../files/atomic.js";
import { seriesToCsv } from "../files/csv.js";
import { renderPng } from "../files/render-figure.js";
import type { Crosscheck } from "../studies/crosscheck.js";
import { crosscheckDocument } from "./crosscheck-document.js";
import type { OpenedDesign } from "./design-flags.js";
import { figureTexts } from "./draw-map.js";
import { stopIfInterrupted } from "./session.js";

/**
 * Writes a crosscheck as a document, its series side by side and a figure into a folder, all or none.
 * @returns the paths of the files
 * @throws OutputError; the signal's reason when stopped, before anything is written
 */
export async function writeCrosscheck(
  folder: string,
  { design, source }: OpenedDesign,
  answer: Crosscheck,
  size: CrosscheckFigureOptions,
  signal: AbortSignal,
): Promise<string[]> {
  const document = crosscheckDocument(answer);
  const full = describeDesign(source.text, source.options).design;
  const files = {
    "crosscheck.json": `${JSON.stringify({ ...document, design: { ...document.design, full } }, undefined, 2)}\n`,
    "crosscheck.csv": seriesToCsv(sideBySide(answer)),
    "crosscheck.png": await renderPng(crosscheckFigure(answer, size), figureTexts(design)),
  };
  await stopIfInterrupted(signal);
  await writeFolder(folder, files);
  return Object.keys(files).map((name) => join(folder, name));
}

/** Columns of the series that are the same for everyone, then each method's own with its name in front. */
const SHOWN = ["transmission", "reflection", "inside", "norm_drift", "x_mean", "k_mean", "energy"];

/** One time column, then the columns of every stepper: crank_nicolson_transmission, split_operator_transmission, ... */
function sideBySide({ matched: { motions } }: Crosscheck): Series {
  const named = (name: string) => name.replaceAll("-", "_");
  const time = motions[0].series.filter(({ name }) => name === "time");
  const columns = SHOWN.flatMap((shown) =>
    motions.flatMap((motion) =>
      motion.series
        .filter(({ name }) => name === shown)
        .map((column) => ({ ...column, name: `${named(motion.name)}_${shown}` })),
    ),
  );
  return [...time, ...columns];
}
