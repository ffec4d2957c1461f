import type { Grid } from "../grid/grid.js";
import type { Potential } from "../potentials/potential.js";

/** Probability left of, inside and right of the structure. */
export interface Shares {
  readonly left: number;
  readonly inside: number;
  readonly right: number;
}

/** Node numbers that divide a grid: nodes below `first` are left of the structure, nodes from `end` on right of it. */
export interface Division {
  readonly first: number;
  readonly end: number;
  /** On a circle the right side ends before this node and what follows belongs to the left. */
  readonly seam: number;
}

/** Divides a grid at the faces (nm); nodes on a face count as inside. `seam` (nm) matters on a circle only. */
export function divide(
  grid: Grid,
  faces: readonly [number, number],
  seam = Number.POSITIVE_INFINITY,
): Division {
  const { x } = grid;
  // A face is a node up to the rounding of its coordinate.
  const slack = 1e-9 * grid.finest;
  let first = 0;
  while (first < x.length && x[first] < faces[0] - slack) first++;
  let end = first;
  while (end < x.length && x[end] <= faces[1] + slack) end++;
  let last = end;
  while (last < x.length && x[last] < seam) last++;
  return { first, end, seam: last };
}

/** Share of its range that V may still be away from its level where a structure is taken to end for counting. */
const CORE_TOLERANCE = 1e-5;

/**
 * The places between which a probability counts as inside: the faces of a layered structure; of a smooth one those where V has come within
 * 1e-5 of its range of the level, so that slow components in the far flanks are not taken for trapped ones.
 */
export function core(potential: Potential): readonly [number, number] {
  const { faces, scale, levelLeft, levelRight, highest, lowest } = potential;
  if (scale === Number.POSITIVE_INFINITY || potential.confining) return faces;
  const limit = CORE_TOLERANCE * (highest - lowest);
  const inward = (x: number, level: number, step: number, stop: number): number => {
    let at = x;
    while ((stop - at) * step > 0 && Math.abs(potential.value(at + step) - level) < limit) at += step;
    return at;
  };
  return [
    inward(faces[0], levelLeft, scale / 8, faces[1]),
    inward(faces[1], levelRight, -scale / 8, faces[0]),
  ];
}

/** Height up to which a rising flank counts as the foot, as a share of the way to the top. */
const FOOT_HEIGHT = 0.95;

/**
 * The place (nm) up to which a smooth potential rises steadily, nearly to its top, on the side that a packet comes from (`direction` +1: the
 * left). What lingers before it and reaches into it is slow: it has no well to be held in and will be sent back, so it is not still to be shared
 * out. Layers, and shapes that fall first, have no such foot: theirs ends where the core begins. (For a first layer this let bounds escape.)
 */
export function footEnd(potential: Potential, direction: 1 | -1): number {
  const [left, right] = core(potential);
  const [near, far, level] =
    direction > 0 ? [left, right, potential.levelLeft] : [right, left, potential.levelRight];
  if (potential.scale === Number.POSITIVE_INFINITY || potential.confining) return near;
  const top = level + FOOT_HEIGHT * (potential.highest - level);
  const step = (direction * potential.scale) / 16;
  let at = near;
  while ((far - at) * direction > 0) {
    const next = potential.value(at + step);
    if (next < potential.value(at)) return near;
    if (next > top) return at;
    at += step;
  }
  return near;
}

/** sum_j w_j |psi_j|^2 over the three parts. Cost O(n). */
export function shares(psi: Float64Array, grid: Grid, division: Division): Shares {
  const { weight } = grid;
  const { first, end, seam } = division;
  return {
    left: norm(psi, weight, 0, first) + norm(psi, weight, seam, weight.length),
    inside: norm(psi, weight, first, end),
    right: norm(psi, weight, end, seam),
  };
}

/** sum of w_j |psi_j|^2 for j from `from` to `to` - 1. */
export function norm(psi: Float64Array, weight: Float64Array, from = 0, to = weight.length): number {
  let sum = 0;
  for (let j = from; j < to; j++)
    sum += weight[j] * (psi[2 * j] * psi[2 * j] + psi[2 * j + 1] * psi[2 * j + 1]);
  return sum;
}

/** Factor by which the density must have risen over its least value before a tail is taken to have ended. */
const TAIL_END = 4;

/**
 * Probability beside the structure that belongs to what is held in it: the tails that fall outward from the faces on either side, each up to
 * where the density has risen again to TAIL_END times its least value. A bound state shallow against its well has most of itself there;
 * what leaves the structure has its greatest density further out, so that nothing of it is counted. Cost O(length of the tails).
 */
export function tails(
  psi: Float64Array,
  grid: Grid,
  { first, end, seam }: Division,
): { left: number; right: number } {
  return { left: tail(psi, grid.weight, first - 1, -1, -1), right: tail(psi, grid.weight, end, 1, seam) };
}

function tail(psi: Float64Array, weight: Float64Array, from: number, step: 1 | -1, stop: number): number {
  let sum = 0;
  let least = Number.POSITIVE_INFINITY;
  for (let j = from; j !== stop; j += step) {
    const density = psi[2 * j] ** 2 + psi[2 * j + 1] ** 2;
    if (density > TAIL_END * least) return sum;
    least = Math.min(least, density);
    sum += weight[j] * density;
  }
  return sum;
}
