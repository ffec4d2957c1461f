import type { Potential } from "./potential.js";

/** One corner of the polyline that draws a profile: nm, eV. */
export interface ProfilePoint {
  readonly x: number;
  readonly energy: number;
}

/** How far beside an interface its two sides are read, as part of the window: small beside any layer that shows. */
const BESIDE = 1e-12;

/**
 * The profile as a polyline over [from, to], for drawing. At a jump two points share their x. Where V is flat there
 * are no points but the corners: outside the faces, and everywhere in a piecewise constant potential.
 * @param from nm, finite; `to` the same, above it.
 * @param count samples between the faces, for shapes that are not piecewise constant; 2 or more.
 * @throws {RangeError} for an empty window or too few samples.
 */
export function profile(potential: Potential, from: number, to: number, count: number): ProfilePoint[] {
  if (!(to > from) || !Number.isFinite(to - from)) {
    throw new RangeError(`a finite window is needed, its end above its start; got ${from} to ${to} nm`);
  }
  if (!Number.isInteger(count) || count < 2)
    throw new RangeError(`2 samples or more are needed; got ${count}`);
  const jumps = potential.interfaces.filter((x) => x > from && x < to);
  const points: ProfilePoint[] = [];
  const samples = sampleCoordinates(potential, from, to, count);
  let next = 0;
  for (const x of samples) {
    for (; next < jumps.length && jumps[next] <= x; next++)
      points.push(...bothSides(potential, jumps[next], to - from));
    if (x !== jumps[next - 1]) points.push({ x, energy: potential.value(x) });
  }
  return points;
}

/** The window's ends, and samples between the faces where V is curved; ascending. */
function sampleCoordinates(potential: Potential, from: number, to: number, count: number): number[] {
  const left = Math.min(Math.max(potential.faces[0], from), to);
  const right = Math.max(Math.min(potential.faces[1], to), from);
  const inside: number[] = [];
  if (Number.isFinite(potential.scale) && right > left) {
    for (let i = 0; i < count; i++) inside.push(left + ((right - left) * i) / (count - 1));
  }
  return [...new Set([from, ...inside, to])].sort((a, b) => a - b);
}

/** The limits of V from the left and from the right; one point where they agree (only the mass jumps, or a point stands). */
function bothSides(potential: Potential, x: number, window: number): ProfilePoint[] {
  const shift = besideOf(x, window);
  const left = potential.value(x - shift);
  const right = potential.value(x + shift);
  if (left === right) return [{ x, energy: left }];
  return [
    { x, energy: left },
    { x, energy: right },
  ];
}

function besideOf(x: number, window: number): number {
  return Math.max(BESIDE * window, 8 * Number.EPSILON * Math.abs(x));
}

/** A point of strength (delta), as seen in cell averages. */
export interface StrengthPoint {
  readonly x: number;
  /** eV nm. */
  readonly strength: number;
}

/** The points of strength among the interfaces: those across which the integral of V does not vanish with the width. */
export function strengthPoints(potential: Potential): StrengthPoint[] {
  const { interfaces } = potential;
  const points: StrengthPoint[] = [];
  for (const x of interfaces) {
    const shift = besideOf(x, interfaces[interfaces.length - 1] - interfaces[0] || 1);
    const area = potential.cellAverage(x - shift, x + shift) * 2 * shift;
    // A finite V contributes (mean of both sides) * 2 shift, which is taken out.
    const finite = (potential.value(x - shift) + potential.value(x + shift)) * shift;
    const strength = area - finite;
    if (Math.abs(strength) > 1e-3 * (Math.abs(area) + Math.abs(finite))) points.push({ x, strength });
  }
  return points;
}
