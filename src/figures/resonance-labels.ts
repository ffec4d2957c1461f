import { axisUnit } from "./axis-unit.js";
import type { EnergyAxis } from "./energy-axis.js";
import type { Box } from "./figure.js";
import { element } from "./svg.js";
import { plain, textAt, textWidth } from "./text.js";
import { RESONANCE_LINE, TICK_TEXT } from "./theme.js";
import { labelNumber } from "./ticks.js";

/** A resonance: energy above the left level and full width at half maximum, eV. */
export interface MarkedResonance {
  readonly energy: number;
  readonly width: number;
}

/** Height of the strip above the upper panel that holds triangles and two lines of text, in ems. */
export const STRIP = 3;
/** Least distance of two labels, in ems. */
const GAP = 0.6;
const LINE = 1.08;

/** Triangles above a box at the resonances, with energy and width above them as far as there is room: sharp ones first. */
export function resonanceLabels(
  box: Box,
  resonances: readonly MarkedResonance[],
  energies: EnergyAxis,
  page: number,
  em: number,
): string {
  const { axis } = energies;
  const size = TICK_TEXT * em;
  const taken: [left: number, right: number][] = [];
  const texts: string[] = [];
  const sharpFirst = [...resonances].sort((a, b) => a.width - b.width);
  for (const { energy, width } of sharpFirst) {
    const x = placeOf(box, energies, energy);
    const lines = [energies.label(energy, width / 20), widthText(width)];
    const half = Math.max(...lines.map((line) => textWidth(line, size))) / 2;
    // Near an end of the axis the label moves inward rather than over the edge of the page.
    const middle = Math.min(Math.max(x, half + 0.3 * em), page - half - 0.3 * em);
    const [left, right] = [middle - half, middle + half];
    if (Math.abs(middle - x) > half || taken.some(([a, b]) => left < b + GAP * em && right > a - GAP * em))
      continue;
    taken.push([left, right]);
    lines.forEach((line, n) => {
      const y = box.y - (0.82 + (1 - n) * LINE) * em;
      texts.push(textAt(plain(line), { x: middle, y, size, anchor: "middle", fill: RESONANCE_LINE }));
    });
  }
  const triangles = resonances.map(({ energy }) =>
    triangle(placeOf(box, energies, energy), box.y - 0.08 * em, em),
  );
  if (!(axis.to > axis.from)) return "";
  return triangles.join("") + texts.join("");
}

const placeOf = (box: Box, { axis, on }: EnergyAxis, energy: number): number =>
  box.x + ((on(energy) - axis.from) / (axis.to - axis.from)) * box.width;

/** A triangle that points down at (x, y). */
export function triangle(x: number, y: number, em: number): string {
  const corners = [x, y, x - 0.26 * em, y - 0.48 * em, x + 0.26 * em, y - 0.48 * em];
  return element("path", { d: `M${corners.map((c) => c.toFixed(3)).join(" ")}Z`, fill: RESONANCE_LINE });
}

function widthText(width: number): string {
  const unit = axisUnit("energy", width);
  return `Γ ${labelNumber(width / unit.size, 2)} ${unit.name}`;
}
