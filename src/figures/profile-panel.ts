import { area, line } from "d3-shape";
import { ATOMIC_MASS, ELECTRON_MASS } from "../units/constants.js";
import { type Axis, frame, sideAxis } from "./axis.js";
import type { AxisUnit } from "./axis-unit.js";
import type { Box } from "./figure.js";
import type { MassStretch, Point, ProfileLine } from "./profile.js";
import { element, straight } from "./svg.js";
import { MIDDLE, plain, textAt, textWidth } from "./text.js";
import { ENERGY_LINE, INK, MASS_SHADE, PROFILE_FILL, PROFILE_LINE, THICK, THIN, TICK_TEXT } from "./theme.js";
import { labelNumber } from "./ticks.js";

/** All that the panel above a map shows. Lengths in nm, energies in eV; the axis in its own unit. */
export interface ProfilePanel {
  readonly line: ProfileLine;
  readonly points: readonly Point[];
  readonly stretches: readonly MassStretch[];
  readonly meanEnergy?: number;
  readonly xFrom: number;
  readonly xTo: number;
  readonly axis: Axis;
  readonly energyUnit: AxisUnit;
  readonly lengthUnit: AxisUnit;
}

interface Scales {
  readonly x: (value: number) => number;
  readonly y: (energy: number) => number;
}

/** The lines of text at the end of the line of the mean energy. */
export function meanEnergyText(panel: Pick<ProfilePanel, "meanEnergy" | "energyUnit">): string[] {
  if (panel.meanEnergy === undefined) return [];
  return ["mean energy", `${labelNumber(panel.meanEnergy / panel.energyUnit.size)} ${panel.energyUnit.name}`];
}

/** What the shade means: the masses inside, in m_e or u. */
export function massText(stretches: readonly MassStretch[]): string | undefined {
  if (stretches.length === 0) return undefined;
  const masses = stretches.map(({ mass }) => mass);
  const least = Math.min(...masses);
  const most = Math.max(...masses);
  const heavy = least >= 0.5 * ATOMIC_MASS;
  const number = (mass: number, digits: number) =>
    labelNumber(mass / (heavy ? ATOMIC_MASS : ELECTRON_MASS), digits);
  const same = number(least, 3) === number(most, 3);
  const range = same ? number(least, 3) : `${number(least, 2)}–${number(most, 2)}`;
  return `${range} ${heavy ? "u" : "mₑ"}`;
}

/** Draws the panel into a box, its axis on the left, notes on the right. */
export function profilePanel(box: Box, panel: ProfilePanel, labelOffset: number, em: number): string {
  const { axis, energyUnit } = panel;
  const scales: Scales = {
    x: (value) => box.x + ((value - panel.xFrom) / (panel.xTo - panel.xFrom)) * box.width,
    y: (energy) => box.y + (1 - (energy / energyUnit.size - axis.from) / (axis.to - axis.from)) * box.height,
  };
  return [
    massShades(box, panel, scales),
    curve(box, panel, scales, em),
    meanEnergyLine(box, panel, scales, em),
    arrows(box, panel, scales, em),
    frame(box, em),
    notes(box, panel, scales, em),
    sideAxis(box, axis, "left", labelOffset, em),
  ].join("");
}

function massShades(box: Box, panel: ProfilePanel, { x }: Scales): string {
  const shade = ({ from, to }: MassStretch) =>
    element("rect", { x: x(from), y: box.y, width: x(to) - x(from), height: box.height, fill: MASS_SHADE });
  return panel.stretches.map(shade).join("");
}

/** The line of V, its area down to the bottom of the panel, both cut off where they leave it. */
function curve(box: Box, panel: ProfilePanel, { x, y }: Scales, em: number): string {
  // Far outside the panel is as good as infinitely far, and keeps coordinates printable.
  const clamp = (value: number) => Math.min(Math.max(value, box.y - box.height), box.y + 2 * box.height);
  const points = panel.line.x
    .map((place, i) => [x(place), clamp(y(panel.line.energy[i]))] as [number, number])
    .filter(([, height]) => !Number.isNaN(height));
  const outline = line().digits(3)(points) ?? "";
  const filled = area<[number, number]>()
    .digits(3)
    .x((point) => point[0])
    .y1((point) => point[1]);
  const ground = filled.y0(box.y + box.height)(points) ?? "";
  const id = `panel-${[box.x, box.y, box.width, box.height].map((side) => Math.round(side * 1000)).join("-")}`;
  const clip = element("clipPath", { id }, element("rect", { ...box }));
  const stroke = { stroke: PROFILE_LINE, "stroke-width": THICK * em, "stroke-linejoin": "miter" };
  const paths =
    element("path", { d: ground, fill: PROFILE_FILL }) +
    element("path", { d: outline, fill: "none", ...stroke });
  return element("defs", {}, clip) + element("g", { "clip-path": `url(#${id})` }, paths);
}

function meanEnergyLine(box: Box, panel: ProfilePanel, { y }: Scales, em: number): string {
  if (panel.meanEnergy === undefined) return "";
  const at = y(panel.meanEnergy);
  const dashes = `${(0.5 * em).toFixed(2)} ${(0.32 * em).toFixed(2)}`;
  const stroke = { stroke: ENERGY_LINE, "stroke-width": 0.09 * em, "stroke-dasharray": dashes };
  return straight(box.x, at, box.x + box.width, at, stroke);
}

/** Deltas as arrows to the edge of the panel, upward for a barrier; neighbours share one label. */
function arrows(box: Box, panel: ProfilePanel, { x, y }: Scales, em: number): string {
  const unit = panel.energyUnit.size * panel.lengthUnit.size;
  const size = TICK_TEXT * em;
  const tip = ({ strength }: Point) => (strength > 0 ? box.y + 0.18 * em : box.y + box.height - 0.18 * em);
  const drawn = panel.points.map((point) => {
    const at = x(point.x);
    const end = tip(point);
    const back = end + Math.sign(point.strength) * 0.75 * em;
    const foot = Math.min(Math.max(y(levelAt(panel.line, point.x)), box.y), box.y + box.height);
    const head = `M${[at, end, at - 0.26 * em, back, at + 0.26 * em, back].map((c) => c.toFixed(3)).join(" ")}Z`;
    return (
      straight(at, foot, at, back, { stroke: PROFILE_LINE, "stroke-width": 0.14 * em }) +
      element("path", { d: head, fill: PROFILE_LINE })
    );
  });
  const labels = groups(panel.points, ({ x: place }) => x(place), 9 * em).map((group) => {
    const numbers = [...new Set(group.map(({ strength }) => labelNumber(strength / unit)))];
    const times = group.length > 1 && numbers.length === 1 ? `${group.length} × ` : "";
    const text = `${times}${numbers.join(", ")} ${panel.energyUnit.name} ${panel.lengthUnit.name}`;
    const last = group[group.length - 1];
    const onRight = x(last.x) + 0.6 * em + textWidth(text, size) < box.x + box.width;
    const place = onRight ? x(last.x) + 0.6 * em : x(group[0].x) - 0.6 * em;
    const baseline = tip(last) + (last.strength > 0 ? 0.8 : -0.12) * em;
    const anchor = onRight ? "start" : "end";
    return textAt(plain(text), { x: place, y: baseline, size, anchor, fill: INK });
  });
  return drawn.join("") + labels.join("");
}

/** V beside a place: the mean of the two points of the line that share it, or of its neighbours. */
function levelAt(profile: ProfileLine, place: number): number {
  const after = profile.x.findIndex((value) => value >= place);
  const next = profile.x[after + 1] === place ? after + 1 : after;
  return (profile.energy[Math.max(after, 0)] + profile.energy[Math.max(next, 0)]) / 2;
}

/** Groups points of one sign whose neighbours stand closer than `reach` on paper. */
function groups(points: readonly Point[], place: (point: Point) => number, reach: number): Point[][] {
  const found: Point[][] = [];
  for (const sign of [1, -1]) {
    let last: Point[] | undefined;
    for (const point of points.filter(({ strength }) => Math.sign(strength) === sign)) {
      if (last && place(point) - place(last[last.length - 1]) < reach) last.push(point);
      else {
        last = [point];
        found.push(last);
      }
    }
  }
  return found;
}

/** What stands right of the panel: the mean energy at its line, and the mass of the shaded parts. */
function notes(box: Box, panel: ProfilePanel, { y }: Scales, em: number): string {
  const size = TICK_TEXT * em;
  const left = box.x + box.width + 0.4 * em;
  const spacing = 1.22 * size;
  const energy = meanEnergyText(panel);
  const mass = massText(panel.stretches);
  const ascent = MIDDLE * size;
  const middle = panel.meanEnergy === undefined ? box.y : y(panel.meanEnergy);
  // First baseline of the two lines about the dashed one, kept within the height of the panel.
  const first = Math.min(
    Math.max(middle - spacing / 2 + ascent, box.y + 2 * ascent),
    box.y + box.height - spacing - 0.2 * size,
  );
  const lines = energy.map((text, i) =>
    textAt(plain(text), { x: left, y: first + i * spacing, size, fill: ENERGY_LINE }),
  );
  if (mass === undefined) return lines.join("");
  const below = panel.meanEnergy !== undefined && first > box.y + box.height / 2 - spacing / 2;
  const baseline = below ? box.y + 2 * ascent : box.y + box.height - 0.1 * size;
  const swatch = { x: left, y: baseline - 2 * ascent, width: 0.9 * size, height: 2 * ascent };
  lines.push(element("rect", { ...swatch, fill: MASS_SHADE, stroke: INK, "stroke-width": THIN * em * 0.7 }));
  lines.push(textAt(plain(mass), { x: left + 1.15 * size, y: baseline, size, fill: INK }));
  return lines.join("");
}
