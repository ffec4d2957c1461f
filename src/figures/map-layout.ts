import { type Axis, bottomRoom, sideRoom } from "./axis.js";
import { type Box, snapBox } from "./figure.js";
import { massText, meanEnergyText, type ProfilePanel } from "./profile-panel.js";
import { textAt, textWidth, wrapText } from "./text.js";
import { INK, TICK_TEXT, TITLE_TEXT } from "./theme.js";

export interface MapAxes {
  readonly x: Axis;
  readonly time: Axis;
  readonly density: Axis;
}

export interface MapBoxes {
  readonly map: Box;
  readonly profile: Box;
  readonly bar: Box;
  readonly leftRoom: number;
  readonly barRoom: number;
  readonly titleLines: readonly string[];
}

/** Shares the page out: title, profile and map from top to bottom, the colour bar at the right of the map. */
export function layOut(
  size: { width: number; height: number },
  axes: MapAxes,
  panel: ProfilePanel,
  title: string,
  em: number,
  dpi: number,
): MapBoxes {
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

/** The title, bold, at the top. */
export function titleText({ map, titleLines }: MapBoxes, em: number): string[] {
  // Flush with the axes where the title fits above the map; a longer one starts at the left edge of the page.
  const size = TITLE_TEXT * em;
  const longest = Math.max(0, ...titleLines.map((line) => textWidth(line, size, "bold")));
  const x = longest <= map.width ? map.x : 0.5 * em;
  return titleLines.map((text, i) =>
    textAt([{ text }], { x, y: (1.4 + 1.3 * i) * em, size, bold: true, fill: INK }),
  );
}
