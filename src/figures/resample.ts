/** What each of `count` target cells takes from the source cells: from `start[j]` on, weights `offset[j]` to `offset[j + 1]`. */
interface Weights {
  readonly start: Int32Array;
  readonly offset: Int32Array;
  readonly weight: Float64Array;
}

/**
 * Weights that carry cell means over to other cells. Where a target cell is at least as wide as a source cell, each is
 * weighted by the length that they share (exact: the integral is kept); else by linear interpolation between centres.
 */
function axisWeights(cells: number, from: number, to: number, count: number): Weights {
  const width = (to - from) / count;
  const start = new Int32Array(count);
  const offset = new Int32Array(count + 1);
  const weight: number[] = [];
  for (let j = 0; j < count; j++) {
    const a = from + j * width;
    if (width >= 1) {
      const b = Math.min(a + width, cells);
      start[j] = Math.min(Math.max(Math.floor(a), 0), cells - 1);
      for (let i = start[j]; i < b && i < cells; i++)
        weight.push((Math.min(i + 1, b) - Math.max(i, a)) / (b - a));
    } else {
      const centre = Math.min(Math.max(a + width / 2 - 0.5, 0), cells - 1);
      start[j] = Math.min(Math.floor(centre), Math.max(cells - 2, 0));
      weight.push(1 - (centre - start[j]));
      if (cells > 1) weight.push(centre - start[j]);
    }
    offset[j + 1] = weight.length;
  }
  return { start, offset, weight: Float64Array.from(weight) };
}

/** Part of a map to be drawn, in source cells (fractions allowed). */
export interface CellWindow {
  readonly columnFrom: number;
  readonly columnTo: number;
  readonly rowFrom: number;
  readonly rowTo: number;
}

/**
 * Cell means on another raster: exact means over area where that is coarser, bilinear where it is finer, so that fine
 * fringes average out instead of beating with the pixels.
 *
 * @param source row-major, `columns` x `rows`
 * @param window the part to be carried over, inside the source
 * @returns row-major, `targetColumns` x `targetRows`, rows in the order of the source; O(pixels + cells)
 */
export function resample(
  source: Float64Array,
  columns: number,
  rows: number,
  window: CellWindow,
  targetColumns: number,
  targetRows: number,
): Float64Array {
  const across = axisWeights(columns, window.columnFrom, window.columnTo, targetColumns);
  const down = axisWeights(rows, window.rowFrom, window.rowTo, targetRows);
  const target = new Float64Array(targetColumns * targetRows);
  const strips = new Map<number, Float64Array>();
  for (let j = 0; j < targetRows; j++) {
    const first = down.start[j];
    for (const row of strips.keys()) if (row < first) strips.delete(row);
    for (let n = down.offset[j]; n < down.offset[j + 1]; n++) {
      const row = first + n - down.offset[j];
      let strip = strips.get(row);
      if (strip === undefined) {
        strip = squeezeRow(source, row * columns, across, targetColumns);
        strips.set(row, strip);
      }
      const w = down.weight[n];
      const at = j * targetColumns;
      for (let i = 0; i < targetColumns; i++) target[at + i] += w * strip[i];
    }
  }
  return target;
}

function squeezeRow(source: Float64Array, at: number, weights: Weights, count: number): Float64Array {
  const { start, offset, weight } = weights;
  const strip = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    let sum = 0;
    const from = at + start[i] - offset[i];
    for (let n = offset[i]; n < offset[i + 1]; n++) sum += weight[n] * source[from + n];
    strip[i] = sum;
  }
  return strip;
}
