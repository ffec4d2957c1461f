import { area, line } from "d3-shape";
import type { SpectrumRow } from "../studies/spectrum-row.js";
import type { Bounded } from "../units/bounded.js";
import { type Axis, frame, sideAxis } from "./axis.js";
import type { EnergyAxis } from "./energy-axis.js";
import type { Box } from "./figure.js";
import { type CurvePoint, curvePoints, MOST_MARKED } from "./spectrum-data.js";
import type { EnergyMark } from "./spectrum-marks.js";
import { element, straight } from "./svg.js";
import { HIDDEN_FILL, INK, MINOR_TICK_LENGTH, PROFILE_FILL, THICK, THIN } from "./theme.js";

/** One curve of a panel. */
export interface Curve {
  readonly pick: (row: SpectrumRow) => Bounded;
  readonly colour: string;
  /** Lengths of dashes and gaps, in ems; a whole line when left out. */
  readonly dashes?: readonly number[];
}

/** All that one of the two panels shows. */
export interface SpectrumPanel {
  readonly rows: readonly SpectrumRow[];
  readonly curves: readonly Curve[];
  readonly energies: EnergyAxis;
  readonly axis: Axis;
  /** The packet's probability per energy relative to its peak, by energy (eV above the left level). */
  readonly weight?: (energy: number) => number;
  readonly marks: readonly EnergyMark[];
  /** Probabilities below this are hidden by round-off. */
  readonly floor?: number;
}

/** A bound is drawn where it reaches this far from the line, in ems: a quarter of the line's width is not seen. */
const VISIBLE_BOUND = 0.06;
/** Height of the peak of the packet's energies, relative to the panel. */
const WEIGHT_HEIGHT = 0.9;
/** Points of the outline of the packet's energies. */
const WEIGHT_POINTS = 240;
const DOT = 0.17;

/** Draws a panel into a box. `pixel` is the width of a pixel of the output, CSS pixels. */
export function spectrumPanel(
  box: Box,
  panel: SpectrumPanel,
  labelOffset: number,
  em: number,
  pixel: number,
): string {
  const place = placesIn(box, panel);
  const curves = panel.curves.map((curve) => ({
    curve,
    points: curvePoints(panel.rows, curve.pick, place, pixel),
  }));
  const clip = `spectrum-${[box.x, box.y, box.width, box.height].map((side) => Math.round(side * 1000)).join("-")}`;
  const inside = [
    weightShade(box, panel, place.x),
    hiddenShade(box, panel, place.y),
    ...panel.marks.map((mark) => verticalMark(box, mark, place.x(mark.energy), em)),
    ...curves.map(({ curve, points }) => bounds(points, curve, panel.rows.length, em)),
    ...curves.map(({ curve, points }) => curveLine(points, curve, panel.rows.length, em)),
  ];
  return [
    element("defs", {}, element("clipPath", { id: clip }, element("rect", { ...box }))),
    element("g", { "clip-path": `url(#${clip})` }, ...inside),
    energyTicks(box, panel, em),
    frame(box, em),
    sideAxis(box, panel.axis, "left", labelOffset, em),
  ].join("");
}

/** Whether any bound of these rows is wide enough on this panel to be seen. */
export function boundsVisible(box: Box, panel: SpectrumPanel, em: number): boolean {
  const place = placesIn(box, panel);
  return panel.curves.some(({ pick }) => curvePoints(panel.rows, pick, place, 1).some((p) => visible(p, em)));
}

function placesIn(box: Box, { energies, axis }: SpectrumPanel) {
  const { from, to } = energies.axis;
  const share = axis.position ?? ((value: number) => (value - axis.from) / (axis.to - axis.from));
  return {
    x: (energy: number) => box.x + ((energies.on(energy) - from) / (to - from)) * box.width,
    y: (probability: number) => box.y + (1 - share(probability)) * box.height,
  };
}

const visible = ({ y, low, high }: CurvePoint, em: number): boolean =>
  Math.max(low - y, y - high) > VISIBLE_BOUND * em;

/** The packet's energies as a shade from the bottom; the height of its peak is that of the whole distribution's. */
function weightShade(box: Box, { weight, energies }: SpectrumPanel, x: (energy: number) => number): string {
  if (weight === undefined) return "";
  const { from, to } = energies.axis;
  const bottom = box.y + box.height;
  const points = Array.from({ length: WEIGHT_POINTS + 1 }, (_, n): [number, number] => {
    const value = from + (n / WEIGHT_POINTS) * (to - from);
    const energy = energies.origin + value * energies.unit.size;
    return [x(energy), bottom - WEIGHT_HEIGHT * box.height * weight(energy)];
  });
  const shape = area<[number, number]>()
    .digits(3)
    .x((point) => point[0])
    .y1((point) => point[1])
    .y0(bottom);
  return element("path", { d: shape(points) ?? "", fill: PROFILE_FILL });
}

function hiddenShade(box: Box, { floor }: SpectrumPanel, y: (probability: number) => number): string {
  if (floor === undefined) return "";
  const top = Math.max(box.y, y(floor));
  const height = box.y + box.height - top;
  return height > 0 ? element("rect", { x: box.x, y: top, width: box.width, height, fill: HIDDEN_FILL }) : "";
}

function verticalMark(box: Box, mark: EnergyMark, x: number, em: number): string {
  return straight(x, box.y, x, box.y + box.height, markStroke(mark, em));
}

/** How the line of a mark is drawn, in the panels and in the legend. */
export function markStroke({ colour, dashes, opacity }: EnergyMark, em: number) {
  return {
    stroke: colour,
    "stroke-opacity": opacity,
    "stroke-width": 0.08 * em,
    "stroke-dasharray": dashText(dashes, em),
  };
}

/** How a curve is drawn, likewise. */
export function curveStroke({ colour, dashes }: Curve, em: number) {
  return {
    stroke: colour,
    "stroke-width": THICK * em,
    "stroke-linejoin": "round",
    "stroke-dasharray": dashText(dashes, em),
  };
}

const dashText = (dashes: readonly number[] | undefined, em: number): string | undefined =>
  dashes?.map((length) => (length * em).toFixed(2)).join(" ");

/** Bounds where they can be seen: bars at marked points, else a band along the line. */
function bounds(points: readonly CurvePoint[], { colour }: Curve, rows: number, em: number): string {
  if (rows > MOST_MARKED) {
    if (!points.some((point) => visible(point, em))) return "";
    const band = area<CurvePoint>()
      .digits(3)
      .x((point) => point.x)
      .y0((point) => point.low)
      .y1((point) => point.high);
    return element("path", { d: band(points) ?? "", fill: colour, "fill-opacity": 0.28 });
  }
  const cap = 0.22 * em;
  const stroke = { stroke: colour, "stroke-width": 0.08 * em };
  const bar = ({ x, low, high }: CurvePoint) =>
    straight(x, low, x, high, stroke) +
    straight(x - cap, low, x + cap, low, stroke) +
    straight(x - cap, high, x + cap, high, stroke);
  return points
    .filter((point) => visible(point, em))
    .map(bar)
    .join("");
}

function curveLine(points: readonly CurvePoint[], curve: Curve, rows: number, em: number): string {
  const path = line<CurvePoint>()
    .digits(3)
    .x((point) => point.x)
    .y((point) => point.y);
  const drawn = element("path", { d: path(points) ?? "", fill: "none", ...curveStroke(curve, em) });
  if (rows > MOST_MARKED) return drawn;
  const dots = points.map(({ x, y }) => element("circle", { cx: x, cy: y, r: DOT * em, fill: curve.colour }));
  return drawn + dots.join("");
}

/** Ticks of the energy axis on the inner edge of the bottom, so that the upper panel needs no labels. */
function energyTicks(box: Box, { energies: { axis } }: SpectrumPanel, em: number): string {
  const bottom = box.y + box.height;
  const ticks = axis.ticks.map(({ value }) => {
    const x = box.x + ((value - axis.from) / (axis.to - axis.from)) * box.width;
    return straight(x, bottom - MINOR_TICK_LENGTH * em, x, bottom, {
      stroke: INK,
      "stroke-width": THIN * em,
    });
  });
  return ticks.join("");
}
