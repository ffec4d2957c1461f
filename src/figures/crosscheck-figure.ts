import { type Axis, bottomAxis, bottomRoom, sideRoom } from "./axis.js";
import { axisUnit } from "./axis-unit.js";
import {
  type ComparedRow,
  comparedRows,
  differenceAxis,
  differenceLegend,
  differencePanel,
} from "./difference-panel.js";
import {
  CROSSCHECK_HEIGHT_RATIO,
  type CrosscheckFigureOptions,
  type DrawnCrosscheck,
} from "./drawn-crosscheck.js";
import { type Box, type Figure, figureSize, snapBox } from "./figure.js";
import { drawLegend, layOutLegend } from "./legend.js";
import { DEFAULT_DPI, DEFAULT_WIDTH_MM } from "./map-figure.js";
import { linearProbabilityAxis } from "./probability-axis.js";
import { sharePanel, sharesLegend } from "./share-panel.js";
import { spectrumTitle, titleLinesOf } from "./spectrum-layout.js";
import { type Label, symbol, textWidth } from "./text.js";
import { baseSize, TICK_TEXT } from "./theme.js";
import { fittingTicks } from "./ticks.js";

const MARGIN = 0.5;
const PANEL_GAP = 0.5;
/** Height of one mark's row in the lower panel, in ems. */
const ROW = 0.92;

/**
 * Draws a crosscheck as a figure: above what has got through over time by every stepper on matched settings, with the witness's value; below every
 * difference between two methods on a logarithmic scale, with the bound that it has to stay below.
 * @throws RangeError for a size out of range
 */
export function crosscheckFigure(answer: DrawnCrosscheck, options: CrosscheckFigureOptions = {}): Figure {
  const { dpi = DEFAULT_DPI, widthMm = DEFAULT_WIDTH_MM } = options;
  const { heightMm = CROSSCHECK_HEIGHT_RATIO * widthMm } = options;
  const size = figureSize(widthMm, heightMm, dpi);
  const em = baseSize(widthMm, heightMm);
  const rows = comparedRows(answer);
  return {
    ...size,
    dpi,
    title: answer.design.title,
    description: describe(answer, rows),
    content: drawn(answer, rows, size, em, dpi),
  };
}

function drawn(
  answer: DrawnCrosscheck,
  rows: readonly ComparedRow[],
  size: { readonly width: number; readonly height: number },
  em: number,
  dpi: number,
): string {
  const titleLines = titleLinesOf(answer.design.title, size.width, em);
  const names = Math.max(...rows.map(({ label }) => textWidth(inWords(label), TICK_TEXT * em)));
  const shares = shareAxis(answer, 0.3 * size.height, em);
  const left = MARGIN * em + Math.max(sideRoom([shares], em), names + 0.6 * em);
  const width = size.width - left - 1.3 * em;
  const above = layOutLegend(sharesLegend(answer, em), width, em);
  const below = layOutLegend(differenceLegend(rows, em), width, em);
  const marks = rows.reduce((sum, row) => sum + row.marks.length, 0);
  const lowerHeight = (ROW * marks + 0.7 * rows.length) * em;
  const top = (MARGIN + titleLines.length * 1.3 + 0.25) * em + above.height + 0.3 * em;
  const lowerTop = size.height - MARGIN * em - bottomRoom(em) - lowerHeight;
  const legendTop = lowerTop - 0.3 * em - below.height;
  const upperHeight = legendTop - PANEL_GAP * em - bottomRoom(em) - top;
  const upper = snapBox({ x: left, y: top, width, height: upperHeight }, dpi);
  const lower = snapBox({ x: left, y: lowerTop, width, height: lowerHeight }, dpi);
  const time = timeAxis(answer, upper, em);
  const differences = differenceAxis(rows, width, em);
  return [
    sharePanel(upper, answer, shareAxis(answer, upperHeight, em), left - MARGIN * em, em),
    bottomAxis(upper, time, em),
    drawLegend(above, left, top - above.height - 0.3 * em, em),
    differencePanel(lower, rows, differences, em),
    bottomAxis(lower, differences, em),
    drawLegend(below, left, legendTop, em),
    spectrumTitle({ titleLines, linear: upper, log: lower, legend: { x: left, y: top } }, em),
  ].join("\n");
}

/** The share that has got through, from nothing to the most that any method has. */
function shareAxis({ matched, witness }: DrawnCrosscheck, height: number, em: number): Axis {
  const most = Math.max(
    witness.transmission.value,
    ...matched.motions.flatMap(({ series }) =>
      series.filter(({ name }) => name === "transmission").map(({ values }) => Math.max(...values)),
    ),
  );
  return linearProbabilityAxis(most, height, em);
}

function timeAxis({ matched }: DrawnCrosscheck, box: Box, em: number): Axis {
  const unit = axisUnit("time", matched.end_fs);
  const to = matched.end_fs / unit.size;
  const widthOf = (label: string) => textWidth(label, TICK_TEXT * em);
  return {
    from: 0,
    to,
    ticks: fittingTicks(0, to, Math.max(3, Math.round(box.width / (4.5 * em))), box.width, em, widthOf),
    label: [{ text: "time " }, symbol("t"), { text: ` (${unit.name})` }],
  };
}

const inWords = (label: Label): string => label.map(({ text }) => text).join("");

/** The figure in words. */
function describe({ agree, matched }: DrawnCrosscheck, rows: readonly ComparedRow[]): string {
  const what = rows.map(({ label }) => inWords(label)).join(", ");
  return (
    `Transmission over time by ${matched.motions.map(({ name }) => name).join(" and ")}, with the stationary witness's value; below, the ` +
    `differences in ${what} against the bounds that they have to stay below. The methods ${agree ? "agree" : "do not agree"}.`
  );
}
