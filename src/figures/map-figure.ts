import type { DensityMap } from "../analysis/results.js";
import { type Axis, bottomAxis, bottomRoom, frame, sideAxis, sideRoom } from "./axis.js";
import { type AxisUnit, axisUnit } from "./axis-unit.js";
import { type ColourMapName, colourTable, DEFAULT_COLOUR_MAP, paint } from "./colour.js";
import { colourBar } from "./colour-bar.js";
import { DEFAULT_DECADES, type DensityScale, densityScale, type ScaleKind } from "./density-scale.js";
import { type Box, type Figure, figureSize, snapBox } from "./figure.js";
import { energyRange, massStretches, type Profile, pointsOf, sampleProfile } from "./profile.js";
import { massText, meanEnergyText, type ProfilePanel, profilePanel } from "./profile-panel.js";
import { resample } from "./resample.js";
import { straight } from "./svg.js";
import { symbol, textAt, textWidth, wrapText } from "./text.js";
import { baseSize, INK, PAPER, TICK_TEXT, TITLE_TEXT } from "./theme.js";
import { linearTicks, superscript } from "./ticks.js";

export interface MapFigureOptions {
  readonly title: string;
  /** Linear from zero (default), or logarithmic. */
  readonly scale?: ScaleKind;
  /** Decades of the logarithmic scale, at least; default DEFAULT_DECADES. */
  readonly decades?: number;
  /** Mean energy of the packet on the scale of V, eV: drawn as a dashed line. */
  readonly meanEnergyEv?: number;
  /** Part of the map to show; default all of it. */
  readonly xFromNm?: number;
  readonly xToNm?: number;
  readonly tFromFs?: number;
  readonly tToFs?: number;
  /** Print size and resolution; defaults below. */
  readonly widthMm?: number;
  readonly heightMm?: number;
  readonly dpi?: number;
  readonly colourMap?: ColourMapName;
}

/** Print width of a figure: the text width of an A4 page with usual margins (common practice, no source). */
export const DEFAULT_WIDTH_MM = 160;
/** Height of a map figure over its width. */
export const DEFAULT_HEIGHT_RATIO = 0.7;
/** Resolution that printers of journals ask of figures in half-tones (common practice, no source). */
export const DEFAULT_DPI = 300;

/** The window of the map that is drawn, in nm and fs. */
interface Window {
  readonly xFrom: number;
  readonly xTo: number;
  readonly tFrom: number;
  readonly tTo: number;
}

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

/** The window asked for, which has to lie within the map. */
function windowOf(map: DensityMap, options: MapFigureOptions): Window {
  const { xFromNm = map.xFrom, xToNm = map.xTo, tFromFs = map.tFrom, tToFs = map.tTo } = options;
  const inside = xFromNm >= map.xFrom && xToNm <= map.xTo && tFromFs >= map.tFrom && tToFs <= map.tTo;
  if (!inside || !(xToNm > xFromNm) || !(tToFs > tFromFs))
    throw new RangeError(
      `the part of the map to draw must lie within x = ${map.xFrom} to ${map.xTo} nm and t = ${map.tFrom} to ${map.tTo} fs; ` +
        `got x = ${xFromNm} to ${xToNm} nm, t = ${tFromFs} to ${tToFs} fs`,
    );
  return { xFrom: xFromNm, xTo: xToNm, tFrom: tFromFs, tTo: tToFs };
}

/** The window in cells of the map. */
function cells(map: DensityMap, window: Window) {
  const column = (x: number) => ((x - map.xFrom) / (map.xTo - map.xFrom)) * map.columns;
  const row = (t: number) => ((t - map.tFrom) / (map.tTo - map.tFrom)) * map.rows;
  return {
    columnFrom: column(window.xFrom),
    columnTo: column(window.xTo),
    rowFrom: row(window.tFrom),
    rowTo: row(window.tTo),
  };
}

/** The densities of all cells that the window touches: the colours are made for these. */
function cropped(map: DensityMap, window: Window): Float64Array {
  const { columnFrom, columnTo, rowFrom, rowTo } = cells(map, window);
  const [left, right] = [Math.floor(columnFrom), Math.min(Math.ceil(columnTo), map.columns)];
  const [first, last] = [Math.floor(rowFrom), Math.min(Math.ceil(rowTo), map.rows)];
  const shown = new Float64Array((right - left) * (last - first));
  for (let row = first; row < last; row++)
    shown.set(
      map.density.subarray(row * map.columns + left, row * map.columns + right),
      (row - first) * (right - left),
    );
  return shown;
}

interface MapAxes {
  readonly x: Axis;
  readonly time: Axis;
  readonly density: Axis;
}

function mapAxes(
  window: Window,
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
      ticks: linearTicks(xFrom, xTo, Math.max(3, Math.round(size.width / (5.5 * em)))),
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

function panelOf(
  profile: Profile,
  window: Window,
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

interface Boxes {
  readonly map: Box;
  readonly profile: Box;
  readonly bar: Box;
  readonly leftRoom: number;
  readonly barRoom: number;
  readonly titleLines: readonly string[];
}

/** Shares the page out: title, profile and map from top to bottom, the colour bar at the right of the map. */
function layOut(
  size: { width: number; height: number },
  axes: MapAxes,
  panel: ProfilePanel,
  title: string,
  em: number,
  dpi: number,
): Boxes {
  const margin = 0.5 * em;
  const leftRoom = sideRoom([panel.axis, axes.time], em);
  const barRoom = sideRoom([axes.density], em);
  const mass = massText(panel.stretches);
  const noteWidths = meanEnergyText(panel).map((text) => textWidth(text, TICK_TEXT * em));
  if (mass !== undefined) noteWidths.push(textWidth(mass, TICK_TEXT * em) + 1.1 * em);
  const barWidth = 1.1 * em;
  const barGap = 0.7 * em;
  const rightRoom = Math.max(barGap + barWidth + barRoom, 0.4 * em + Math.max(0, ...noteWidths));
  const left = margin + leftRoom;
  const width = size.width - left - rightRoom - margin;
  const titleLines = wrapText(title, size.width - 2 * margin - em, TITLE_TEXT * em, 2, "bold");
  const top = margin + (titleLines.length * 1.3 + (titleLines.length > 0 ? 0.35 : 0.3)) * em;
  const bottom = size.height - margin - bottomRoom(em);
  const gap = 0.75 * em;
  // A quarter of the height, but enough for the notes beside the panel.
  const profileHeight = Math.max(0.27 * (bottom - top - gap), 4.5 * em);
  const profile = snapBox({ x: left, y: top, width, height: profileHeight }, dpi);
  const mapTop = profile.y + profile.height + gap;
  const map = snapBox({ x: left, y: mapTop, width, height: bottom - mapTop }, dpi);
  const bar = snapBox({ x: left + width + barGap, y: map.y, width: barWidth, height: map.height }, dpi);
  return { map, profile, bar, leftRoom, barRoom, titleLines };
}

function titleText({ map, titleLines }: Boxes, em: number): string[] {
  // Flush with the axes where the title fits above the map; a longer one starts at the left edge of the page.
  const size = TITLE_TEXT * em;
  const longest = Math.max(0, ...titleLines.map((line) => textWidth(line, size, "bold")));
  const x = longest <= map.width ? map.x : 0.5 * em;
  return titleLines.map((text, i) =>
    textAt([{ text }], { x, y: (1.4 + 1.3 * i) * em, size, bold: true, fill: INK }),
  );
}

/** Thin lines through the map where the structure begins and ends; none for a smooth potential. */
function guides(box: Box, profile: Profile, window: Window, em: number): string {
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

function describe({ x, time }: MapAxes, scale: DensityScale): string {
  const words = (axis: Axis) => axis.label.map(({ text }) => text).join("");
  return (
    `Space-time density map: ${words(x)} to the right from ${x.from} to ${x.to}, ${words(time)} upward from ` +
    `${time.from} to ${time.to}, density in colour on a ${scale.kind === "log" ? "logarithmic" : "linear"} scale; ` +
    "above it the potential on the same x axis."
  );
}
