import type { Potential } from "../potentials/potential.js";

/** What a drawing needs to know of a potential; every `Potential` will do. */
export type Profile = Pick<
  Potential,
  "value" | "cellAverage" | "mass" | "interfaces" | "faces" | "levelLeft" | "levelRight" | "confining"
>;

/** Places x (nm) and values V (eV) of a line, in order; at an interface two points share x. */
export interface ProfileLine {
  readonly x: readonly number[];
  readonly energy: readonly number[];
}

/** A delta: its place in nm and its strength in eV nm. */
export interface Point {
  readonly x: number;
  readonly strength: number;
}

/** Samples between the faces, at least: enough for a structure that is to be seen in its form. */
const SAMPLES_INSIDE = 400;

/** Ends of the pieces between the interfaces that lie within a range, its own ends included. */
function pieces(profile: Profile, from: number, to: number): number[] {
  return [from, ...profile.interfaces.filter((x) => x > from && x < to), to];
}

/**
 * Samples a potential for drawing: evenly, denser inside the structure, and on both sides of each interface.
 *
 * @param samples number of samples over the whole range
 */
export function sampleProfile(profile: Profile, from: number, to: number, samples: number): ProfileLine {
  const x: number[] = [];
  const energy: number[] = [];
  const add = (place: number, value: number) => {
    const n = x.length;
    // The middle one of three equal values adds nothing to the line.
    if (n > 1 && energy[n - 1] === value && energy[n - 2] === value) x[n - 1] = place;
    else {
      x.push(place);
      energy.push(value);
    }
  };
  const [left, right] = profile.faces;
  const inside = (right - left) / SAMPLES_INSIDE;
  const coarse = (to - from) / samples;
  const ends = pieces(profile, from, to);
  const jumps = new Set(profile.interfaces);
  for (let n = 1; n < ends.length; n++) {
    const [a, b] = [ends[n - 1], ends[n]];
    const step = a < right && b > left && inside > 0 ? Math.min(coarse, inside) : coarse;
    const count = Math.max(1, Math.ceil((b - a) / step));
    // At an interface value() gives the mean: the sides are taken a billionth of the piece away from it.
    const away = 1e-9 * (b - a);
    add(a, profile.value(jumps.has(a) ? a + away : a));
    for (let i = 1; i < count; i++) {
      const place = a + (i * (b - a)) / count;
      add(place, profile.value(place));
    }
    add(b, profile.value(jumps.has(b) ? b - away : b));
  }
  return { x, energy };
}

/**
 * Finds the deltas, which `value` does not show: what is left of the integral of V over ever shorter cells around an
 * interface, 2 I(h/2) - I(h) for h -> 0.
 */
export function pointsOf(profile: Profile, from: number, to: number): Point[] {
  const ends = [from, ...profile.interfaces, to];
  const found: Point[] = [];
  for (const x of profile.interfaces) {
    if (x < from || x > to) continue;
    const gaps = ends.map((end) => Math.abs(end - x)).filter((gap) => gap > 0);
    const h = 1e-3 * Math.min(...gaps);
    const integral = (half: number) => 2 * half * profile.cellAverage(x - half, x + half);
    const strength = 2 * integral(h / 2) - integral(h);
    // A tenth of the ordinary area stands far above the rounding error and the curvature of V within h.
    const ordinary = 2 * h * Math.max(Math.abs(profile.value(x - h)), Math.abs(profile.value(x + h)));
    if (Math.abs(strength) > 0.1 * ordinary && strength !== 0) found.push({ x, strength });
  }
  return found;
}

/** A stretch with a mass of its own, eV fs^2/nm^2. */
export interface MassStretch {
  readonly from: number;
  readonly to: number;
  readonly mass: number;
}

/** The stretches between interfaces whose mass differs from the one left of the structure. */
export function massStretches(profile: Profile, from: number, to: number): MassStretch[] {
  const ends = pieces(profile, from, to);
  const outside = profile.mass(Math.min(profile.faces[0], ends[0]) - 1);
  const stretches: MassStretch[] = [];
  for (let n = 1; n < ends.length; n++) {
    const mass = profile.mass((ends[n - 1] + ends[n]) / 2);
    if (Math.abs(mass / outside - 1) > 1e-9) stretches.push({ from: ends[n - 1], to: ends[n], mass });
  }
  return stretches;
}

/**
 * The range of energies to draw: all of V, its end levels and the mean energy, with some air. Where V has no end (a
 * confining potential, a steep wall), as much of it as the energy makes sensible.
 *
 * @param meanEnergy of the packet, eV; left out when there is none
 */
export function energyRange(
  profile: Profile,
  line: ProfileLine,
  points: readonly Point[],
  meanEnergy: number | undefined,
): readonly [from: number, to: number] {
  const levels = [profile.levelLeft, profile.levelRight];
  const drawn = line.energy.filter(Number.isFinite).sort((a, b) => a - b);
  const marks = [...levels.filter(Number.isFinite), ...(meanEnergy === undefined ? [] : [meanEnergy])];
  let low = Math.min(...marks, drawn[0] ?? 0);
  let high = Math.max(...marks, drawn[drawn.length - 1] ?? 0);
  const energy = meanEnergy ?? drawn[drawn.length >> 1] ?? 0;
  const unbounded = profile.confining || drawn.length < line.energy.length;
  if (unbounded || levels.includes(Number.POSITIVE_INFINITY))
    high = Math.min(high, low + 2.5 * (energy - low) || high);
  if (levels.includes(Number.NEGATIVE_INFINITY))
    low = Math.max(low, energy - 4 * Math.abs(high - energy || energy));
  if (!(high > low)) high = low + (Math.abs(low) || 1);
  const span = high - low;
  // The arrow of a delta ends, with its label, clear of the lines.
  const upward = points.some(({ strength }) => strength > 0);
  const downward = points.some(({ strength }) => strength < 0);
  return [low - (downward ? 0.7 : 0.12) * span, high + (upward ? 0.7 : 0.14) * span];
}
