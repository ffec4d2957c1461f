import { type Label, MIDDLE, textAt, textWidth } from "./text.js";
import { INK, TICK_TEXT } from "./theme.js";

/** One entry of a legend: what is drawn, in a box of SWATCH ems by one, and what it means. */
export interface LegendEntry {
  /** Draws the sample into the box with this left edge, width and middle height. */
  readonly sample: (x: number, width: number, middle: number) => string;
  readonly label: Label;
}

/** Width of a sample, and the gaps after it and between entries, in ems. */
const SWATCH = 1.7;
const SWATCH_GAP = 0.45;
const ENTRY_GAP = 1.3;
/** Height of a line of the legend, in ems. */
export const LEGEND_LINE = 1.35;

export interface Legend {
  readonly lines: readonly (readonly LegendEntry[])[];
  /** CSS pixels. */
  readonly height: number;
}

const widthOf = ({ label }: LegendEntry, em: number): number =>
  (SWATCH + SWATCH_GAP) * em + textWidth(label.map(({ text }) => text).join(""), TICK_TEXT * em);

/** Shares entries out among lines of at most `width` CSS pixels, in their order. */
export function layOutLegend(entries: readonly LegendEntry[], width: number, em: number): Legend {
  const lines: LegendEntry[][] = [];
  let used = Number.POSITIVE_INFINITY;
  for (const entry of entries) {
    const own = widthOf(entry, em);
    if (used + ENTRY_GAP * em + own > width) {
      lines.push([]);
      used = -ENTRY_GAP * em;
    }
    lines[lines.length - 1].push(entry);
    used += ENTRY_GAP * em + own;
  }
  return { lines, height: lines.length * LEGEND_LINE * em };
}

/** Draws a legend with its upper left corner at (x, y). */
export function drawLegend({ lines }: Legend, x: number, y: number, em: number): string {
  const size = TICK_TEXT * em;
  const drawn = lines.flatMap((entries, line) => {
    const middle = y + (line + 0.5) * LEGEND_LINE * em;
    let at = x;
    return entries.map((entry) => {
      const left = at;
      at += widthOf(entry, em) + ENTRY_GAP * em;
      const place = { x: left + (SWATCH + SWATCH_GAP) * em, y: middle + MIDDLE * size, size, fill: INK };
      return entry.sample(left, SWATCH * em, middle) + textAt(entry.label, place);
    });
  });
  return drawn.join("");
}
