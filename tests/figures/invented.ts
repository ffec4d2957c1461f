import type { DensityMap } from "../../src/analysis/results.js";
import type { Profile } from "../../src/figures/profile.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";

/**
 * Invented data with the look of a real map: a free Gaussian packet that meets a mirror of amplitude r at x = 0, so that
 * psi = free(x) + r free(-x) on the left and t free(x) on the right. `unit` and `time` scale lengths and times.
 */
export function inventedMap(columns = 480, rows = 360, unit = 1, time = 1): DensityMap {
  const [xFrom, xTo, tTo] = [-150, 150, 320];
  const density = new Float64Array(columns * rows);
  const mass = 0.067 * ELECTRON_MASS;
  const k0 = Math.sqrt(2 * mass * 0.15) / HBAR;
  const [sigma, start, r] = [12, -70, Math.sqrt(0.7)];
  for (let row = 0; row < rows; row++) {
    const t = ((row + 0.5) / rows) * tTo;
    for (let column = 0; column < columns; column++) {
      const x = xFrom + ((column + 0.5) / columns) * (xTo - xFrom);
      const free = (place: number): [number, number] => {
        const spread = (HBAR * t) / (2 * mass * sigma * sigma);
        const width2 = 1 + spread * spread;
        const ahead = place - start - (HBAR * k0 * t) / mass;
        const size =
          Math.exp(-(ahead ** 2) / (4 * sigma ** 2 * width2)) / (2 * Math.PI * sigma ** 2 * width2) ** 0.25;
        const phase = k0 * ahead + (ahead ** 2 * spread) / (4 * sigma ** 2 * width2);
        return [size * Math.cos(phase), size * Math.sin(phase)];
      };
      const [a, b] = free(x);
      const [c, d] = x < 0 ? free(-x) : [0, 0];
      const part = x < 0 ? (a - r * c) ** 2 + (b - r * d) ** 2 : (1 - r * r) * (a * a + b * b);
      density[row * columns + column] = part / unit;
    }
  }
  return { columns, rows, xFrom: xFrom * unit, xTo: xTo * unit, tFrom: 0, tTo: tTo * time, density };
}

/** A piecewise constant profile: heights between the interfaces, 0 on the left, `right` on the right. */
export function inventedProfile(
  interfaces: readonly number[],
  heights: readonly number[],
  more: Partial<Profile> & { right?: number; masses?: readonly number[]; strengths?: readonly number[] } = {},
): Profile {
  const all = [0, ...heights, more.right ?? 0];
  const masses = [1, ...(more.masses ?? heights.map(() => 1)), 1];
  const below = (x: number) => interfaces.filter((place) => place < x).length;
  const mean = (list: readonly number[], x: number) => {
    const at = interfaces.indexOf(x);
    return at < 0 ? list[below(x)] : (list[at] + list[at + 1]) / 2;
  };
  return {
    value: (x) => mean(all, x),
    cellAverage: (a, b) => {
      const ends = [a, ...interfaces.filter((place) => place > a && place < b), b];
      let area = 0;
      for (let n = 1; n < ends.length; n++)
        area += (ends[n] - ends[n - 1]) * mean(all, (ends[n] + ends[n - 1]) / 2);
      interfaces.forEach((place, n) => {
        if (place > a && place < b) area += more.strengths?.[n] ?? 0;
      });
      return area / (b - a);
    },
    mass: (x) => 0.067 * ELECTRON_MASS * mean(masses, x),
    interfaces,
    faces: [interfaces[0] ?? 0, interfaces[interfaces.length - 1] ?? 0],
    levelLeft: 0,
    levelRight: more.right ?? 0,
    confining: false,
    ...more,
  };
}

/** A smooth profile from a formula. */
export function smoothProfile(value: (x: number) => number, more: Partial<Profile> = {}): Profile {
  return {
    value,
    cellAverage: (a, b) => (value(a) + 4 * value((a + b) / 2) + value(b)) / 6,
    mass: () => ELECTRON_MASS,
    interfaces: [],
    faces: [-50, 50],
    levelLeft: 0,
    levelRight: 0,
    confining: false,
    ...more,
  };
}
