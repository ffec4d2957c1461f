import type { Potential } from "./potential.js";

/** Half the width (share of the structure's own lengths) of the interval by which a point is looked for. */
const CLOSE = 1e-9;

/**
 * True when a point of strength (a delta) stands somewhere in the potential: there the mean of V over a small enough interval lies outside of
 * all values that V has. What a finite band makes of a point is wrong by the first power of the spacing, where a jump costs the third.
 */
export function hasPoint(potential: Potential): boolean {
  const { interfaces, faces, lowest, highest } = potential;
  const size = Math.max(faces[1] - faces[0], ...interfaces.map(Math.abs), Number.MIN_VALUE);
  // Where everything stands at zero there is no length to go by; any one is small against a point then.
  const close = size > Number.MIN_VALUE ? CLOSE * size : CLOSE;
  const slack = 1e-6 * (highest - lowest);
  return interfaces.some((x) => {
    const mean = potential.cellAverage(x - close, x + close);
    return mean > highest + slack || mean < lowest - slack;
  });
}
