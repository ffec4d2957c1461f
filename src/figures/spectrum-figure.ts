import type { Spectrum } from "../studies/spectrum.js";
import type { SpectrumRow } from "../studies/spectrum-row.js";
import { bottomAxis, sideRoom } from "./axis.js";
import { type EnergyAxis, energyAxis } from "./energy-axis.js";
import { type Figure, figureSize } from "./figure.js";
import { drawLegend, layOutLegend } from "./legend.js";
import { DEFAULT_DPI, DEFAULT_WIDTH_MM } from "./map-figure.js";
import { linearProbabilityAxis, logProbabilityAxis } from "./probability-axis.js";
import { type MarkedResonance, resonanceLabels, STRIP } from "./resonance-labels.js";
import { MOST_MARKED } from "./spectrum-data.js";
import { layOutSpectrum, panelWidth, spectrumTitle, titleLinesOf } from "./spectrum-layout.js";
import { spectrumLegend } from "./spectrum-legend.js";
import {
  type EnergyMark,
  energyMarks,
  packetWeight,
  resonanceMark,
  type SpectrumDesign,
} from "./spectrum-marks.js";
import { boundsVisible, type Curve, type SpectrumPanel, spectrumPanel } from "./spectrum-panel.js";
import { baseSize, PROFILE_LINE, REFLECTION_LINE } from "./theme.js";

/** Height of a spectrum's figure over its width: two panels, and a legend above them. */
export const SPECTRUM_HEIGHT_RATIO = 0.8;

/** How a spectrum is drawn. */
export interface SpectrumFigureOptions {
  readonly title: string;
  /** Draws R as well, on the linear scale; default false. */
  readonly reflection?: boolean;
  /** Print size and resolution; defaults as for a map. */
  readonly widthMm?: number;
  readonly heightMm?: number;
  readonly dpi?: number;
}

/** What a drawing needs to know of a spectrum. */
export type DrawnSpectrum = Pick<Spectrum, "method" | "rows" | "floor" | "resonances">;

/** A level this close below the first energy, relative to the range, is shown with it. */
const NEAR_LEVEL = 0.15;
/** Margin of an axis about a single energy, relative to it. */
const LONE_MARGIN = 0.1;
/** Margin of the axis beside a mark at its end, relative to the range. */
const MARK_MARGIN = 0.025;
/** Weight of the packet, relative to its peak, that is seen as a shade. */
const SEEN_WEIGHT = 0.03;

/**
 * Draws transmission against energy as a figure: on a linear scale above, on a logarithmic one below, with the packet's energies as a shade,
 * levels, the top of the potential and the resonances marked, and the bounds where they can be seen.
 *
 * @param spectrum the rows to draw, ascending in energy, at least one
 * @param design whose packet and potential are shown beside them
 * @throws RangeError without a row, or for a size out of range
 */
export function spectrumFigure(
  spectrum: DrawnSpectrum,
  design: SpectrumDesign,
  options: SpectrumFigureOptions,
): Figure {
  const { dpi = DEFAULT_DPI, widthMm = DEFAULT_WIDTH_MM, title } = options;
  const { heightMm = SPECTRUM_HEIGHT_RATIO * widthMm } = options;
  if (spectrum.rows.length === 0)
    throw new RangeError("a spectrum with at least one energy is needed; got none");
  const size = figureSize(widthMm, heightMm, dpi);
  const em = baseSize(widthMm, heightMm);
  const [from, to] = energyRange(spectrum.rows, design);
  const content = drawn(spectrum, design, options, { size, em, from, to, dpi });
  return { ...size, dpi, title, description: describe(spectrum, from, to), content };
}

interface Page {
  readonly size: { readonly width: number; readonly height: number };
  readonly em: number;
  readonly from: number;
  readonly to: number;
  readonly dpi: number;
}

function drawn(
  spectrum: DrawnSpectrum,
  design: SpectrumDesign,
  options: SpectrumFigureOptions,
  page: Page,
): string {
  const { size, em, from, to, dpi } = page;
  const resonances = spectrum.resonances.filter(({ energy }) => energy >= from && energy <= to);
  const marks = [...resonances.map(({ energy }) => resonanceMark(energy)), ...energyMarks(design, from, to)];
  const { boxes, legend, linear, log, leftRoom } = composed(spectrum, design, options, page, marks);
  const pixel = 96 / dpi;
  return [
    spectrumPanel(boxes.linear, linear, leftRoom, em, pixel),
    spectrumPanel(boxes.log, log, leftRoom, em, pixel),
    bottomAxis(boxes.log, linear.energies.axis, em),
    resonanceLabels(boxes.linear, resonances, linear.energies, size.width, em),
    drawLegend(legend, boxes.legend.x, boxes.legend.y, em),
    spectrumTitle(boxes, em),
  ].join("\n");
}

/** Panels, legend and where they stand. Axes and legend need each other's size, so they are made for a guessed one first. */
function composed(
  spectrum: DrawnSpectrum,
  design: SpectrumDesign,
  options: SpectrumFigureOptions,
  { size, em, from, to, dpi }: Page,
  marks: readonly EnergyMark[],
) {
  const wide = energyAxis(from, to, 0.85 * size.width, em);
  const guess = panelsOf(spectrum, options, wide, 0.25 * size.height, em);
  const leftRoom = sideRoom([guess.linear.axis, guess.log.axis], em);
  const horizontal = panelWidth(size.width, leftRoom, wide.axis, em);
  const energies = energyAxis(from, to, horizontal.width, em);
  const weight = seenWeight(packetWeight(design), from, to);
  const resonances = marks.some(({ name }) => name === undefined);
  const strip = resonances ? STRIP * em : 0;
  const titleLines = titleLinesOf(options.title, size.width, em);
  const { curves } = guess.linear;
  const hidden = guess.log.floor !== undefined;
  const parts = {
    method: spectrum.method,
    curves,
    weight: weight !== undefined,
    marks,
    energies,
    resonances,
    hidden,
  };
  const laidOut = (bounds: boolean) => {
    const legend = layOutLegend(spectrumLegend({ ...parts, bounds }, em), horizontal.width, em);
    const boxes = layOutSpectrum(size, horizontal, titleLines, legend, strip, em, dpi);
    const panels = panelsOf(spectrum, options, energies, boxes.linear.height, em);
    return {
      legend,
      boxes,
      linear: { ...panels.linear, marks, weight },
      log: { ...panels.log, marks },
      leftRoom,
    };
  };
  // Whether a bound is seen depends on the height that the legend leaves, and the legend on whether it is seen.
  const first = laidOut(false);
  const seen = [first.linear, first.log].some((panel) => boundsVisible(first.boxes.linear, panel, em));
  return seen ? laidOut(true) : first;
}

/** Both panels without marks, for a height. */
function panelsOf(
  { rows, floor }: DrawnSpectrum,
  { reflection = false }: SpectrumFigureOptions,
  energies: EnergyAxis,
  height: number,
  em: number,
): { linear: SpectrumPanel; log: SpectrumPanel } {
  const transmission: Curve = { pick: (row) => row.transmission, colour: PROFILE_LINE };
  const reflected: Curve = { pick: (row) => row.reflection, colour: REFLECTION_LINE, dashes: [0.7, 0.3] };
  const greatest = Math.max(...rows.map((row) => row.transmission.value));
  const all = reflection ? Math.max(greatest, ...rows.map((row) => row.reflection.value)) : greatest;
  const [least, most] = logRange(rows, floor);
  const shared = { rows, energies, marks: [] };
  const log = logProbabilityAxis(least, most, height, em);
  return {
    linear: {
      ...shared,
      curves: reflection ? [transmission, reflected] : [transmission],
      axis: linearProbabilityAxis(all, height, em),
    },
    log: { ...shared, curves: [transmission], axis: log, floor: floor > log.from ? floor : undefined },
  };
}

/** Least and greatest T that the logarithmic scale has to show: those that are known to lie above zero, and the floor where others are hidden. */
function logRange(rows: readonly SpectrumRow[], floor: number): readonly [number, number] {
  const known = rows
    .filter(({ transmission: { value, error } }) => value > error)
    .map((row) => row.transmission.value);
  const hidden = known.length < rows.length && floor > 0 ? [floor / 10, floor] : [];
  const shown = [...known, ...hidden];
  return shown.length > 0 ? [Math.min(...shown), Math.max(...shown)] : [1e-3, 1];
}

/** The energies to show: those of the rows, a level that lies just below the first, and room for whole marks at the ends. */
function energyRange(rows: readonly SpectrumRow[], { potential }: SpectrumDesign): readonly [number, number] {
  const [first, last] = [rows[0].energy, rows[rows.length - 1].energy];
  const span = last - first;
  if (!(span > 0)) return [first * (1 - LONE_MARGIN), first * (1 + LONE_MARGIN)];
  const threshold = Math.max(0, potential.levelRight - potential.levelLeft);
  const margin = rows.length > MOST_MARKED ? 0 : MARK_MARGIN * span;
  const near = first > threshold && first - threshold < NEAR_LEVEL * span;
  return [near ? threshold - MARK_MARGIN * span : first - margin, last + margin];
}

const SHADE_SAMPLES = 200;

/** The packet's weight where some of it within the range would be seen. */
function seenWeight(
  weight: (energy: number) => number,
  from: number,
  to: number,
): ((energy: number) => number) | undefined {
  for (let n = 0; n <= SHADE_SAMPLES; n++)
    if (weight(from + (n / SHADE_SAMPLES) * (to - from)) > SEEN_WEIGHT) return weight;
  return undefined;
}

/** The figure in words. */
function describe({ rows, resonances }: DrawnSpectrum, from: number, to: number): string {
  const values = rows.map((row) => row.transmission.value);
  const found = resonances.filter(({ energy }: MarkedResonance) => energy >= from && energy <= to).length;
  const marked = found === 0 ? "" : `; ${found} resonance${found === 1 ? "" : "s"} marked`;
  return (
    `Transmission against energy from ${from} to ${to} eV above the left level, on a linear scale above and a ` +
    `logarithmic one below: between ${Math.min(...values)} and ${Math.max(...values)} at ${rows.length} energies${marked}.`
  );
}
