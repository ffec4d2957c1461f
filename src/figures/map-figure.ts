import type { DensityMap } from "../analysis/results.js";
import { type Axis, bottomAxis, frame, sideAxis } from "./axis.js";
import { type AxisUnit, axisUnit } from "./axis-unit.js";
import { type ColourMapName, colourTable, DEFAULT_COLOUR_MAP, paint } from "./colour.js";
import { colourBar } from "./colour-bar.js";
import { DEFAULT_DECADES, type DensityScale, densityScale, type ScaleKind } from "./density-scale.js";
import { type Box, type Figure, figureSize } from "./figure.js";
import { layOut, type MapAxes, titleText } from "./map-layout.js";
import { cells, cropped, type MapWindow, type WindowOptions, windowOf } from "./map-window.js";
import { energyRange, massStretches, type Profile, pointsOf, sampleProfile } from "./profile.js";
import { type ProfilePanel, profilePanel } from "./profile-panel.js";
import { resample } from "./resample.js";
import { straight } from "./svg.js";
import { symbol, textWidth } from "./text.js";
import { baseSize, PAPER, TICK_TEXT } from "./theme.js";
import { fittingTicks, linearTicks, superscript } from "./ticks.js";

/** How a map is drawn; xFromNm and its like show a part of it. */
export interface MapFigureOptions extends WindowOptions {
  readonly title: string;
  /** Linear from zero (default), or logarithmic. */
  readonly scale?: ScaleKind;
  /** Decades of the logarithmic scale, at least; default DEFAULT_DECADES. */
  readonly decades?: number;
  /** Mean energy of the packet on the scale of V, eV: drawn as a dashed line. */
  readonly meanEnergyEv?: number;
  /** Print size and resolution; defaults below. */
  readonly widthMm?: number;
  readonly heightMm?: number;
  readonly dpi?: number;
  readonly colourMap?: ColourMapName;
}

/** Share of the page's width that the map keeps at least, beside long notes. */
const LEAST_MAP_SHARE = 0.6;
/** Print width of a figure: the text width of an A4 page with usual margins (common practice, no source). */
export const DEFAULT_WIDTH_MM = 160;
/** Height of a map figure over its width. */
export const DEFAULT_HEIGHT_RATIO = 0.7;
/** Resolution that printers of journals ask of figures in half-tones (common practice, no source). */
export const DEFAULT_DPI = 300;

/**
 * Draws |psi(x, t)|^2 as a figure: x to the right, time upward, with axes, a colour bar, and the potential's profile
 * above on the same x axis.
 *
 * @param map the recorded densities
 * @param profile the potential that the packet met
 * @throws RangeError for densities that are not finite, a window outside the map, a size out of range
 */
export function mapFigure(map: DensityMap, profile: Profile, options: MapFigureOptions): Figure {
  const { scale: kind = "linear", dpi = DEFAULT_DPI, widthMm = DEFAULT_WIDTH_MM } = options;
  const { colourMap = DEFAULT_COLOUR_MAP, heightMm = DEFAULT_HEIGHT_RATIO * widthMm } = options;
  const size = figureSize(widthMm, heightMm, dpi);
  const em = baseSize(widthMm, heightMm);
  const window = windowOf(map, options);
  const lengthUnit = axisUnit("length", Math.max(Math.abs(window.xFrom), Math.abs(window.xTo)));
  const shown = cropped(map, window);
  const scale = densityScale(
    shown.map((value) => value * lengthUnit.size),
    kind,
    options.decades ?? DEFAULT_DECADES,
  );
  const axes = mapAxes(window, lengthUnit, scale, size, em);
  const panel = panelOf(profile, window, lengthUnit, size.columns, options);
  const boxes = layOut(size, axes, panel, options.title, em, dpi);
  const table = colourTable(colourMap);
  const columns = Math.round((boxes.map.width * dpi) / 96);
  const rows = Math.round((boxes.map.height * dpi) / 96);
  const values = resample(map.density, map.columns, map.rows, cells(map, window), columns, rows);
  const data = paint(values, columns, rows, (value) => scale.position(value * lengthUnit.size), table);
  const content = [
    guides(boxes.map, profile, window, em),
    frame(boxes.map, em),
    bottomAxis(boxes.map, axes.x, em),
    sideAxis(boxes.map, axes.time, "left", boxes.leftRoom, em),
    colourBar(boxes.bar, table, colourMap, em),
    sideAxis(boxes.bar, axes.density, "right", boxes.barRoom, em),
    profilePanel(boxes.profile, panel, boxes.leftRoom, em),
    ...titleText(boxes, em),
  ];
  return {
    ...size,
    dpi,
    title: options.title,
    description: describe(axes, scale),
    raster: { ...boxes.map, columns, rows, data },
    content: content.join("\n"),
  };
}

/** The axes of map and colour bar, in units that fit. */
function mapAxes(
  window: MapWindow,
  lengthUnit: AxisUnit,
  scale: DensityScale,
  size: { width: number; height: number },
  em: number,
): MapAxes {
  const { size: length, name } = lengthUnit;
  const time = axisUnit("time", Math.max(Math.abs(window.tFrom), Math.abs(window.tTo)));
  const [xFrom, xTo] = [window.xFrom / length, window.xTo / length];
  const [tFrom, tTo] = [window.tFrom / time.size, window.tTo / time.size];
  const factor = scale.exponent === 0 ? "" : `10${superscript(scale.exponent)} `;
  return {
    x: {
      from: xFrom,
      to: xTo,
      ticks: fittingTicks(
        xFrom,
        xTo,
        Math.max(3, Math.round(size.width / (5.5 * em))),
        LEAST_MAP_SHARE * size.width,
        em,
        (label) => textWidth(label, TICK_TEXT * em),
      ),
      label: [{ text: "position " }, symbol("x"), { text: ` (${name})` }],
    },
    time: {
      from: tFrom,
      to: tTo,
      ticks: linearTicks(tFrom, tTo, Math.max(3, Math.round(size.height / (4.5 * em)))),
      label: [{ text: "time " }, symbol("t"), { text: ` (${time.name})` }],
    },
    density: {
      from: scale.low,
      to: scale.high,
      ticks: scale.ticks,
      minor: scale.minor,
      position: (value) => scale.position(value),
      label: [{ text: "density |" }, symbol("ψ"), { text: `|² (${factor}${name}⁻¹)` }],
    },
  };
}

/** All that the panel above the map shows. */
function panelOf(
  profile: Profile,
  window: MapWindow,
  lengthUnit: AxisUnit,
  columns: number,
  options: MapFigureOptions,
): ProfilePanel {
  const { xFrom, xTo } = window;
  const line = sampleProfile(profile, xFrom, xTo, columns);
  const points = pointsOf(profile, xFrom, xTo);
  const [from, to] = energyRange(profile, line, points, options.meanEnergyEv);
  const energyUnit = axisUnit("energy", Math.max(Math.abs(from), Math.abs(to)));
  const [low, high] = [from / energyUnit.size, to / energyUnit.size];
  const axis: Axis = {
    from: low,
    to: high,
    ticks: linearTicks(low, high, 4),
    label: [symbol("V"), { text: ` (${energyUnit.name})` }],
  };
  const stretches = massStretches(profile, xFrom, xTo);
  return {
    line,
    points,
    stretches,
    meanEnergy: options.meanEnergyEv,
    xFrom,
    xTo,
    axis,
    energyUnit,
    lengthUnit,
  };
}

/** Thin lines through the map where the structure begins and ends; none for a smooth potential. */
function guides(box: Box, profile: Profile, window: MapWindow, em: number): string {
  const { interfaces } = profile;
  if (interfaces.length === 0) return "";
  const place = (x: number) => box.x + ((x - window.xFrom) / (window.xTo - window.xFrom)) * box.width;
  const inside = [...new Set([interfaces[0], interfaces[interfaces.length - 1]])].filter(
    (x) => x > window.xFrom && x < window.xTo,
  );
  const dashes = `${(0.12 * em).toFixed(2)} ${(0.24 * em).toFixed(2)}`;
  const stroke = {
    stroke: PAPER,
    "stroke-opacity": 0.75,
    "stroke-width": 0.05 * em,
    "stroke-dasharray": dashes,
  };
  return inside.map((x) => straight(place(x), box.y, place(x), box.y + box.height, stroke)).join("");
}

/** The figure in words. */
function describe({ x, time }: MapAxes, scale: DensityScale): string {
  const words = (axis: Axis) => axis.label.map(({ text }) => text).join("");
  return (
    `Space-time density map: ${words(x)} to the right from ${x.from} to ${x.to}, ${words(time)} upward from ` +
    `${time.from} to ${time.to}, density in colour on a ${scale.kind === "log" ? "logarithmic" : "linear"} scale; ` +
    "above it the potential on the same x axis."
  );
}
