import { join } from "node:path";
import { describeDesign } from "../design/describe.js";
import { type SpectrumFigureOptions, spectrumFigure } from "../figures/spectrum-figure.js";
import { writeFolder } from "../files/atomic.js";
import { rowsToCsv } from "../files/csv.js";
import { renderPng } from "../files/render-figure.js";
import type { Spectrum } from "../studies/spectrum.js";
import type { OpenedDesign } from "./design-flags.js";
import { figureTexts } from "./draw-map.js";
import { stopIfInterrupted } from "./session.js";
import { spectrumDocument } from "./spectrum-document.js";

/**
 * Writes a spectrum as a table, a document and a figure into a folder, all or none.
 * @returns the paths of the files
 * @throws OutputError; the signal's reason when stopped, before anything is written
 */
export async function writeSpectrum(
  folder: string,
  { design, source }: OpenedDesign,
  answer: Spectrum,
  options: Omit<SpectrumFigureOptions, "title">,
  signal: AbortSignal,
): Promise<string[]> {
  const figure = spectrumFigure(answer, design, { title: design.title, ...options });
  const document = spectrumDocument(answer);
  const full = describeDesign(source.text, source.options).design;
  const files = {
    "spectrum.csv": spectrumToCsv(answer),
    "spectrum.json": `${JSON.stringify({ ...document, design: { ...document.design, full } }, undefined, 2)}\n`,
    "spectrum.png": await renderPng(figure, figureTexts(design)),
  };
  await stopIfInterrupted(signal);
  await writeFolder(folder, files);
  return Object.keys(files).map((name) => join(folder, name));
}

const COLUMNS = ["energy_eV", "transmission", "transmission_error", "reflection", "reflection_error"];

/** The rows as CSV, every number to all its digits. */
function spectrumToCsv({ rows }: Spectrum): string {
  return rowsToCsv(
    COLUMNS,
    rows.map(({ energy, transmission, reflection }) => [
      energy,
      transmission.value,
      transmission.error,
      reflection.value,
      reflection.error,
    ]),
  );
}
