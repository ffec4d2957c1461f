import { type Axis, bottomRoom } from "./axis.js";
import { type Box, snapBox } from "./figure.js";
import type { Legend } from "./legend.js";
import { textAt, textWidth, wrapText } from "./text.js";
import { INK, TICK_TEXT, TITLE_TEXT } from "./theme.js";

export interface SpectrumBoxes {
  readonly linear: Box;
  readonly log: Box;
  /** Upper left corner of the legend. */
  readonly legend: { readonly x: number; readonly y: number };
  readonly titleLines: readonly string[];
}

/** Space around the page, between the panels and right of them, in ems; the last one at least: half of a tick's label stands there. */
const MARGIN = 0.5;
const PANEL_GAP = 0.9;
const RIGHT_ROOM = 1.3;
const TITLE_LINE = 1.3;

/** The horizontal extent of both panels, which is known before their heights are. */
export function panelWidth(
  page: number,
  leftRoom: number,
  energies: Axis,
  em: number,
): { left: number; width: number } {
  const left = MARGIN * em + leftRoom;
  const widest = Math.max(0, ...energies.ticks.map(({ label }) => textWidth(label, TICK_TEXT * em)));
  const right = Math.max(RIGHT_ROOM * em, widest / 2 + MARGIN * em);
  return { left, width: page - left - right };
}

/** The title in lines. */
export const titleLinesOf = (title: string, page: number, em: number): string[] =>
  wrapText(title, page - (2 * MARGIN + 1) * em, TITLE_TEXT * em, 2, "bold");

/** Heights from top to bottom: title, legend, strip of the resonances' labels, linear panel, logarithmic panel, energies. */
export function layOutSpectrum(
  size: { readonly width: number; readonly height: number },
  horizontal: { readonly left: number; readonly width: number },
  titleLines: readonly string[],
  legend: Legend,
  strip: number,
  em: number,
  dpi: number,
): SpectrumBoxes {
  const { left, width } = horizontal;
  const legendTop = (MARGIN + titleLines.length * TITLE_LINE + (titleLines.length > 0 ? 0.25 : 0)) * em;
  const gapBelow = legend.lines.length > 0 ? 0.3 * em : 0;
  const top = legendTop + legend.height + gapBelow + Math.max(strip, 0.3 * em);
  const bottom = size.height - MARGIN * em - bottomRoom(em);
  const height = (bottom - top - PANEL_GAP * em) / 2;
  const linear = snapBox({ x: left, y: top, width, height }, dpi);
  const log = snapBox({ x: left, y: top + height + PANEL_GAP * em, width, height }, dpi);
  return { linear, log, legend: { x: left, y: legendTop }, titleLines };
}

/** The title, bold, at the top: flush with the panels where it fits above them, else at the left edge of the page. */
export function spectrumTitle({ titleLines, linear }: SpectrumBoxes, em: number): string {
  const size = TITLE_TEXT * em;
  const longest = Math.max(0, ...titleLines.map((line) => textWidth(line, size, "bold")));
  const x = longest <= linear.width ? linear.x : MARGIN * em;
  const lines = titleLines.map((text, n) =>
    textAt([{ text }], { x, y: (MARGIN + 0.9 + TITLE_LINE * n) * em, size, bold: true, fill: INK }),
  );
  return lines.join("");
}
