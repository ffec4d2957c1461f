import { join } from "node:path";
import { describeDesign } from "../design/describe.js";
import { writeFolder } from "../files/atomic.js";
import { seriesToCsv } from "../files/csv.js";
import { renderPng } from "../files/render-figure.js";
import type { StudyOptions } from "../studies/calculation.js";
import type { Estimate } from "../studies/estimate.js";
import { history } from "../studies/history.js";
import { type OpenedDesign, placingLimits } from "./design-flags.js";
import { drawMap, figureTexts, historyDocument } from "./draw-map.js";
import { estimateDocument } from "./estimate-document.js";
import { stopIfInterrupted } from "./session.js";

/**
 * Follows the packet of an answered design through time and writes answer, series and map into a folder, all or none.
 * @returns the paths of the files
 * @throws OutputError, DesignError; the signal's reason when stopped, before anything is written
 */
export async function writeResults(
  folder: string,
  opened: OpenedDesign,
  answer: Estimate,
  options: StudyOptions,
): Promise<string[]> {
  const { design, source } = opened;
  const seen = await placingLimits(opened, () => history(design, options));
  const figure = await renderPng(drawMap(design, seen), figureTexts(design));
  const document = estimateDocument(answer);
  const summary = {
    ...document,
    design: { ...document.design, full: describeDesign(source.text, source.options).design },
    history: historyDocument(seen),
  };
  const files = {
    "summary.json": `${JSON.stringify(summary, undefined, 2)}\n`,
    "series.csv": seriesToCsv(seen.series),
    "map.png": figure,
  };
  await stopIfInterrupted(options.signal);
  await writeFolder(folder, files);
  return Object.keys(files).map((name) => join(folder, name));
}
