import type { DensityMap } from "../analysis/results.js";
import type { CellWindow } from "./resample.js";

/** Part of a map to show, nm and fs; what is left out is taken from the whole map. */
export interface WindowOptions {
  readonly xFromNm?: number;
  readonly xToNm?: number;
  readonly tFromFs?: number;
  readonly tToFs?: number;
}

/** The window of the map that is drawn, in nm and fs. */
export interface MapWindow {
  readonly xFrom: number;
  readonly xTo: number;
  readonly tFrom: number;
  readonly tTo: number;
}

/** The window asked for, which has to lie within the map. */
export function windowOf(map: DensityMap, options: WindowOptions): MapWindow {
  const { xFromNm = map.xFrom, xToNm = map.xTo, tFromFs = map.tFrom, tToFs = map.tTo } = options;
  if (map.density.length !== map.columns * map.rows)
    throw new RangeError(
      `a map of ${map.columns} x ${map.rows} cells is needed; got ${map.density.length} densities`,
    );
  const inside = xFromNm >= map.xFrom && xToNm <= map.xTo && tFromFs >= map.tFrom && tToFs <= map.tTo;
  if (!inside || !(xToNm > xFromNm) || !(tToFs > tFromFs))
    throw new RangeError(
      `the part of the map to draw must lie within x = ${map.xFrom} to ${map.xTo} nm and t = ${map.tFrom} to ${map.tTo} fs; ` +
        `got x = ${xFromNm} to ${xToNm} nm, t = ${tFromFs} to ${tToFs} fs`,
    );
  return { xFrom: xFromNm, xTo: xToNm, tFrom: tFromFs, tTo: tToFs };
}

/** The window in cells of the map. */
export function cells(map: DensityMap, window: MapWindow): CellWindow {
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
export function cropped(map: DensityMap, window: MapWindow): Float64Array {
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
