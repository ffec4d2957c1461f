import type { Figure } from "../figures/figure.js";
import { type MapFigureOptions, mapFigure } from "../figures/map-figure.js";
import type { Design } from "../problem/design.js";
import type { History } from "../studies/history.js";
import { version } from "./version.js";

/** Draws the map of a run as a finished figure. */
export function drawMap(
  design: Design,
  { map }: History,
  options: Omit<MapFigureOptions, "title"> = {},
): Figure {
  const { packet, potential, title } = design;
  const level = packet.from === "left" ? potential.levelLeft : potential.levelRight;
  // A packet in a confining potential has no level to count its energy from.
  const meanEnergyEv = Number.isFinite(level) ? level + packet.energy : undefined;
  return mapFigure(map, potential, { title, meanEnergyEv, ...options });
}

/** What a figure's file says about where it comes from. */
export function figureTexts({ sha256 }: Design): Record<string, string> {
  return { Software: `postern ${version()}`, "Design SHA-256": sha256 };
}

/** The numerics of a run that is looked at over time, as JSON documents show them. */
export function historyDocument({ map, stepper, order, grid, time, errors }: History) {
  const { columns, rows, xFrom, xTo, tFrom, tTo } = map;
  return {
    stepper,
    order,
    grid,
    time,
    errors,
    window: { x_from_nm: xFrom, x_to_nm: xTo, t_from_fs: tFrom, t_to_fs: tTo },
    cells: { columns, rows },
  };
}
