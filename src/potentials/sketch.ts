import { formatQuantity } from "../units/quantity.js";
import type { Potential } from "./potential.js";
import { profile, type StrengthPoint, strengthPoints } from "./profile.js";

export interface SketchOptions {
  /** Columns of the drawing itself, without its labels. */
  readonly width?: number;
  /** Rows of the drawing itself. */
  readonly height?: number;
  /** Only characters that every terminal has. */
  readonly ascii?: boolean;
  /** Window in nm; around what there is to see when left out. */
  readonly from?: number;
  readonly to?: number;
}

export const SKETCH_WIDTH = 60;
export const SKETCH_HEIGHT = 10;

/** Characters of one drawing; `fill[n]` covers n of `fill.length - 1` parts of a cell from below. */
interface Strokes {
  readonly fill: string;
  readonly up: string;
  readonly down: string;
  readonly stem: string;
  readonly axis: string;
  readonly tick: string;
  readonly corner: string;
  readonly line: string;
  readonly foot: string;
}

const UNICODE: Strokes = {
  fill: " ▁▂▃▄▅▆▇█",
  up: "▲",
  down: "▼",
  stem: "│",
  axis: "│",
  tick: "┤",
  corner: "└",
  line: "─",
  foot: "┴",
};

const ASCII: Strokes = {
  fill: " .:#",
  up: "^",
  down: "v",
  stem: "|",
  axis: "|",
  tick: "+",
  corner: "+",
  line: "-",
  foot: "+",
};

/** Part of the range of V by which it has to leave its levels to count as something to see. */
const VISIBLE = 0.02;
/** Flat stretch on either side, as part of what there is to see. */
const MARGIN = 0.3;
/** Samples to find the window with. */
const SAMPLES = 2000;

/** What is drawn: a window in x and the range of V in it. */
interface View {
  readonly from: number;
  readonly to: number;
  readonly low: number;
  readonly high: number;
}

/**
 * Draws the profile of a potential in characters: the ground is filled up to V(x), energy labels stand on the left,
 * the window's ends below. A layer thinner than a column still takes a column. A point of strength is an arrow.
 * @returns lines without trailing blanks.
 */
export function sketch(potential: Potential, options: SketchOptions = {}): string[] {
  const { width = SKETCH_WIDTH, height = SKETCH_HEIGHT, ascii = false } = options;
  const strokes = ascii ? ASCII : UNICODE;
  const points = strengthPoints(potential);
  const view = viewOf(potential, points, options);
  const rows = ground(potential, view, width, height, strokes);
  for (const point of points) drawArrow(rows, point, potential, view, strokes);
  const labels = energyLabels(view, height, points.length > 0);
  const margin = Math.max(...labels.map((label) => label.length));
  const lines = rows.map((row, i) => {
    const label = labels[i].padStart(margin);
    return `${label} ${labels[i] === "" ? strokes.axis : strokes.tick}${row.join("")}`.trimEnd();
  });
  return [
    ...lines,
    ...lengthAxis(view, width, margin, strokes),
    ...points.map((point) => caption(point, margin)),
  ];
}

function viewOf(potential: Potential, points: readonly StrengthPoint[], options: SketchOptions): View {
  const automatic = windowOf(potential);
  const from = options.from ?? automatic[0];
  const to = options.to ?? automatic[1];
  // The true extremes replace sampled ones that come within what can be seen of them.
  const energies = profile(potential, from, to, SAMPLES).map((point) => point.energy);
  const least = Math.min(...energies);
  const most = Math.max(...energies);
  const unseen = VISIBLE * (most - least);
  let low = Math.abs(potential.lowest - least) <= unseen ? potential.lowest : least;
  let high = Math.abs(potential.highest - most) <= unseen ? potential.highest : most;
  const range = high - low || Math.max(Math.abs(high), 1);
  // A flat V is drawn in the middle; an arrow needs room on the side that it points to.
  const flat = high === low && points.length === 0;
  if (flat || points.some((point) => point.strength < 0)) low -= range;
  if (flat || points.some((point) => point.strength > 0)) high += range;
  return { from, to, low, high };
}

/** The stretch over which V visibly differs from its levels, with a margin on either side. */
function windowOf(potential: Potential): [from: number, to: number] {
  const [left, right] = potential.faces;
  if (!Number.isFinite(right - left)) {
    const centre = Number.isFinite(left) ? left : Number.isFinite(right) ? right : 0;
    return [centre - 4 * potential.scale, centre + 4 * potential.scale];
  }
  // A sharp step or a lone point has no length of its own; one nanometre is as good as any.
  if (right === left) return [left - 1, right + 1];
  const [seenLeft, seenRight] = Number.isFinite(potential.scale) ? visible(potential) : [left, right];
  const margin = MARGIN * (seenRight - seenLeft);
  return [seenLeft - margin, seenRight + margin];
}

function visible(potential: Potential): [from: number, to: number] {
  const { faces, levelLeft, levelRight, highest, lowest } = potential;
  const least = VISIBLE * (highest - lowest);
  const points = profile(potential, faces[0], faces[1], SAMPLES);
  const first = points.find((point) => Math.abs(point.energy - levelLeft) > least);
  const last = points.findLast((point) => Math.abs(point.energy - levelRight) > least);
  return first !== undefined && last !== undefined && last.x > first.x
    ? [first.x, last.x]
    : [faces[0], faces[1]];
}

/** Rows from the top down, filled from below up to V. The lowest V is one part high, so that it shows. */
function ground(
  potential: Potential,
  view: View,
  width: number,
  height: number,
  { fill }: Strokes,
): string[][] {
  const parts = fill.length - 1;
  const rows = Array.from({ length: height }, () => new Array<string>(width).fill(fill[0]));
  for (let column = 0; column < width; column++) {
    const energy = columnEnergy(potential, view, column, width);
    const filled = 1 + Math.round(((energy - view.low) / (view.high - view.low)) * (height * parts - 1));
    for (let row = 0; row < height; row++) {
      const inCell = filled - (height - 1 - row) * parts;
      rows[row][column] = fill[Math.min(Math.max(inCell, 0), parts)];
    }
  }
  return rows;
}

/** V in the middle of a column, or that of a piece thinner than a column, with its middle here, that stands out more. */
function columnEnergy(potential: Potential, view: View, column: number, width: number): number {
  const step = (view.to - view.from) / width;
  const { interfaces, levelLeft } = potential;
  let energy = potential.value(view.from + (column + 0.5) * step);
  for (let i = 0; i + 1 < interfaces.length; i++) {
    const middle = (interfaces[i] + interfaces[i + 1]) / 2;
    if (interfaces[i + 1] - interfaces[i] > step || Math.floor((middle - view.from) / step) !== column)
      continue;
    const between = potential.value(middle);
    if (Math.abs(between - levelLeft) > Math.abs(energy - levelLeft)) energy = between;
  }
  return Math.min(Math.max(energy, view.low), view.high);
}

function drawArrow(
  rows: string[][],
  point: StrengthPoint,
  potential: Potential,
  view: View,
  strokes: Strokes,
): void {
  const height = rows.length;
  const column = Math.floor(((point.x - view.from) / (view.to - view.from)) * rows[0].length);
  if (column < 0 || column >= rows[0].length) return;
  const level = (potential.value(point.x) - view.low) / (view.high - view.low);
  const base = Math.min(Math.floor((1 - level) * height), height - 1);
  if (point.strength > 0) {
    for (let row = base - 1; row > 0; row--) rows[row][column] = strokes.stem;
    rows[0][column] = strokes.up;
    return;
  }
  // Downwards the arrow runs through the filled ground, in a slit of its own.
  for (let row = base; row < height; row++) {
    for (const beside of [column - 1, column + 1])
      if (beside in rows[row]) rows[row][beside] = strokes.fill[0];
    rows[row][column] = row === height - 1 ? strokes.down : strokes.stem;
  }
}

/** The top, the bottom and, where there is room, zero; all in one unit. With an arrow only zero is to scale. */
function energyLabels(view: View, height: number, arrows: boolean): string[] {
  const labels = new Array<string>(height).fill("");
  const largest = Math.max(Math.abs(view.low), Math.abs(view.high));
  const unit = formatQuantity(largest, "energy").split(" ").slice(1).join(" ");
  const put = (energy: number) => {
    const row = Math.round(((view.high - energy) / (view.high - view.low)) * (height - 1));
    if (labels[row] === "" && row >= 0) labels[row] = formatQuantity(energy, "energy", unit, 3);
  };
  if (view.low <= 0 && view.high >= 0) put(0);
  if (!arrows) {
    put(view.high);
    put(view.low);
  }
  return labels;
}

function lengthAxis(view: View, width: number, margin: number, strokes: Strokes): string[] {
  const size = Math.max(Math.abs(view.from), Math.abs(view.to));
  const unit = formatQuantity(size, "length").split(" ").slice(1).join(" ");
  const left = formatQuantity(view.from, "length", unit, 3);
  const right = formatQuantity(view.to, "length", unit, 3);
  const indent = " ".repeat(margin + 1);
  const line = new Array<string>(width).fill(strokes.line);
  const text = new Array<string>(width).fill(" ");
  const write = (label: string, at: number) => {
    for (let i = 0; i < label.length; i++) text[at + i] = label[i];
  };
  write(left, 0);
  write(right, width - right.length);
  const zero = Math.floor((-view.from / (view.to - view.from)) * width);
  // Zero gets its mark when it lies in the window and clear of the labels at the ends.
  if (zero > left.length && zero < width - right.length - 1) {
    line[zero] = strokes.foot;
    text[zero] = "0";
  }
  return [`${indent}${strokes.corner}${line.join("")}`, `${indent} ${text.join("")}`.trimEnd()];
}

function caption(point: StrengthPoint, margin: number): string {
  const strength = formatQuantity(point.strength, "strength", undefined, 3);
  return `${" ".repeat(margin + 2)}arrow: strength ${strength} at x = ${formatQuantity(point.x, "length", undefined, 3)}`;
}
