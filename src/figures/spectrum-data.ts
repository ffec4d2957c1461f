import type { SpectrumRow } from "../studies/spectrum-row.js";
import type { Bounded } from "../units/bounded.js";

/** One point of a curve on paper, with the ends of its bound. */
export interface CurvePoint {
  readonly x: number;
  readonly y: number;
  readonly low: number;
  readonly high: number;
}

/** Points of a curve that are drawn with marks of their own, at most: beyond, marks would touch. */
export const MOST_MARKED = 60;

/**
 * The rows as points on paper. Where there are more than pixels, each pixel column keeps its first, least, greatest and last row, so that
 * the line looks the same and no peak is lost.
 *
 * @param place horizontal place of an energy and vertical place of a probability, CSS pixels
 * @param pixel width of one pixel of the output
 */
export function curvePoints(
  rows: readonly SpectrumRow[],
  pick: (row: SpectrumRow) => Bounded,
  place: { readonly x: (energy: number) => number; readonly y: (probability: number) => number },
  pixel: number,
): CurvePoint[] {
  const points = rows.map((row) => {
    const { value, error } = pick(row);
    return {
      x: place.x(row.energy),
      y: place.y(value),
      low: place.y(Math.max(0, value - error)),
      high: place.y(Math.min(1, value + error)),
    };
  });
  const kept: CurvePoint[] = [];
  for (let from = 0; from < points.length; ) {
    const column = Math.floor(points[from].x / pixel);
    let to = from + 1;
    while (to < points.length && Math.floor(points[to].x / pixel) === column) to++;
    kept.push(...ends(points.slice(from, to)));
    from = to;
  }
  return kept;
}

/** First, least, greatest and last of the points of one column, each once and in their order. */
function ends(points: readonly CurvePoint[]): readonly CurvePoint[] {
  if (points.length <= 4) return points;
  let least = 0;
  let greatest = 0;
  for (let n = 1; n < points.length; n++) {
    if (points[n].y > points[least].y) least = n;
    if (points[n].y < points[greatest].y) greatest = n;
  }
  const chosen = [...new Set([0, least, greatest, points.length - 1])].sort((a, b) => a - b);
  return chosen.map((n) => points[n]);
}
