import type { Box } from "./figure.js";
import { element, straight } from "./svg.js";
import { type Label, MIDDLE, textAt, textWidth } from "./text.js";
import { INK, MINOR_TICK_LENGTH, THIN, TICK_LENGTH, TICK_TEXT } from "./theme.js";
import type { Tick } from "./ticks.js";

/** An axis along one edge of a box; values run from `from` to `to`, left to right or bottom to top. */
export interface Axis {
  readonly from: number;
  readonly to: number;
  readonly ticks: readonly Tick[];
  readonly minor?: readonly number[];
  /** Text beside the axis, with the unit. */
  readonly label: Label;
  /** Place of a value along the axis, 0 to 1; linear when left out. */
  readonly position?: (value: number) => number;
}

const along = (axis: Axis, value: number): number =>
  axis.position ? axis.position(value) : (value - axis.from) / (axis.to - axis.from);

/** Space between an edge and its tick labels, and between those and the label of the axis, in ems. */
const LABEL_GAP = 0.28;
const TITLE_GAP = 0.45;
/** Height of a line of letters with its descenders, in ems. */
const LINE_HEIGHT = 1.0;

const widest = (axis: Axis, em: number): number =>
  Math.max(0, ...axis.ticks.map(({ label }) => textWidth(label, TICK_TEXT * em)));

/** Room that a vertical axis with its labels takes beside its box, in CSS pixels. */
export function sideRoom(axes: readonly Axis[], em: number): number {
  const labels = Math.max(...axes.map((axis) => widest(axis, em)));
  return labels + (TICK_LENGTH + LABEL_GAP + TITLE_GAP + LINE_HEIGHT) * em;
}

/** Room that a horizontal axis takes below its box. */
export const bottomRoom = (em: number): number =>
  (TICK_LENGTH + LABEL_GAP + TICK_TEXT + TITLE_GAP + LINE_HEIGHT) * em;

/** A thin frame around a box. */
export function frame(box: Box, em: number): string {
  return element("rect", { ...box, fill: "none", stroke: INK, "stroke-width": THIN * em });
}

/** The axis below a box. */
export function bottomAxis(box: Box, axis: Axis, em: number): string {
  const edge = box.y + box.height;
  const size = TICK_TEXT * em;
  const baseline = edge + (TICK_LENGTH + LABEL_GAP) * em + 0.73 * size;
  const line = { stroke: INK, "stroke-width": THIN * em };
  const marks = axis.ticks.map(({ value, label }) => {
    const x = box.x + along(axis, value) * box.width;
    const text = textAt([{ text: label }], { x, y: baseline, size, anchor: "middle", fill: INK });
    return straight(x, edge, x, edge + TICK_LENGTH * em, line) + text;
  });
  const place = { x: box.x + box.width / 2, y: baseline + (TITLE_GAP + 0.85) * em };
  return marks.join("") + textAt(axis.label, { ...place, size: em, anchor: "middle", fill: INK });
}

/**
 * The axis left or right of a box.
 *
 * @param labelOffset distance of the outer edge of the axis label from the box, in CSS pixels, so that the labels of
 *   several boxes line up
 */
export function sideAxis(
  box: Box,
  axis: Axis,
  side: "left" | "right",
  labelOffset: number,
  em: number,
): string {
  const direction = side === "left" ? -1 : 1;
  const edge = side === "left" ? box.x : box.x + box.width;
  const size = TICK_TEXT * em;
  const line = { stroke: INK, "stroke-width": THIN * em };
  const height = (value: number) => box.y + (1 - along(axis, value)) * box.height;
  const minor = (axis.minor ?? []).map((value) =>
    straight(edge, height(value), edge + direction * MINOR_TICK_LENGTH * em, height(value), line),
  );
  const marks = axis.ticks.map(({ value, label }) => {
    const y = height(value);
    const x = edge + direction * (TICK_LENGTH + LABEL_GAP) * em;
    const anchor = side === "left" ? "end" : "start";
    const text = textAt([{ text: label }], { x, y: y + MIDDLE * size, size, anchor, fill: INK });
    return straight(edge, y, edge + direction * TICK_LENGTH * em, y, line) + text;
  });
  // Read upwards, the letters rise to the left of their baseline and descend to its right.
  const x = side === "left" ? edge - labelOffset + 0.78 * em : edge + labelOffset - 0.22 * em;
  const place = {
    x,
    y: box.y + box.height / 2,
    size: em,
    anchor: "middle",
    fill: INK,
    upward: true,
  } as const;
  return minor.join("") + marks.join("") + textAt(axis.label, place);
}
