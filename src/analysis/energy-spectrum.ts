import type { Grid } from "../grid/grid.js";
import { HBAR } from "../units/constants.js";

/** A plane wave of a grid's own dispersion relation: its wavenumber (1/nm) and dE/dk (eV nm). */
export interface GridWave {
  readonly k: number;
  readonly slope: number;
}

/**
 * The plane wave of kinetic energy E (eV) on a uniform stretch: E = hbar^2/(m h^2) (1 - cos k h) between neighbours
 * (`step` h in nm), or E = hbar^2 k^2 / 2m where the grid is spectral (`step` 0). Undefined outside the band.
 */
export function gridWave(energy: number, mass: number, step: number): GridWave | undefined {
  if (!(energy > 0)) return undefined;
  if (step === 0) {
    const k = Math.sqrt(2 * mass * energy) / HBAR;
    return { k, slope: (HBAR * HBAR * k) / mass };
  }
  const half = (mass * step * step * energy) / (2 * HBAR * HBAR);
  if (half >= 1) return undefined;
  // 1 - cos kh = 2 sin^2(kh/2), stable for small kh.
  const k = (2 / step) * Math.asin(Math.sqrt(half));
  return { k, slope: ((HBAR * HBAR) / (mass * step)) * Math.sin(k * step) };
}

/** |sum_j w_j psi_j exp(-i k x_j)|^2 / 2 pi over nodes `from` ... `to` - 1: probability per wavenumber, nm. Cost O(n). */
export function wavenumberDensity(
  psi: Float64Array,
  grid: Grid,
  from: number,
  to: number,
  k: number,
): number {
  const { x, weight } = grid;
  let re = 0;
  let im = 0;
  for (let j = from; j < to; j++) {
    const cos = weight[j] * Math.cos(k * x[j]);
    const sin = weight[j] * Math.sin(k * x[j]);
    re += psi[2 * j] * cos + psi[2 * j + 1] * sin;
    im += psi[2 * j + 1] * cos - psi[2 * j] * sin;
  }
  return (re * re + im * im) / (2 * Math.PI);
}

/** Nodes after which a turned phase is computed afresh: rounding grows by one unit in the last place a node. */
const FRESH = 32;
/** Relative difference up to which neighbouring spacings count as equal: coordinates carry their rounding. */
const EQUAL_SPACING = 1e-9;

/**
 * sqrt(2/pi) sum_j w_j psi_j sin(k (x_j - wall)) over nodes `from` ... `to` - 1: the amplitude per root of wavenumber, sqrt(nm), of what is
 * on its way to, at or back from a closed end at `wall` (nm). The sines are the waves of the stretch before that end, so the
 * modulus does not change while a group is turned round. Cost O(n); phases are turned from node to node along equal spacings.
 */
export function wallAmplitude(
  psi: Float64Array,
  grid: Grid,
  from: number,
  to: number,
  k: number,
  wall: number,
): [re: number, im: number] {
  const { x, weight, spacing } = grid;
  let re = 0;
  let im = 0;
  for (let j = from; j < to; ) {
    const h = spacing[Math.min(j, spacing.length - 1)];
    const [turnCos, turnSin] = [Math.cos(k * h), Math.sin(k * h)];
    let cos = Math.cos(k * (x[j] - wall));
    let sin = Math.sin(k * (x[j] - wall));
    const stop = Math.min(to, j + FRESH);
    for (;;) {
      const wave = weight[j] * sin;
      re += psi[2 * j] * wave;
      im += psi[2 * j + 1] * wave;
      j++;
      if (j >= stop || Math.abs(spacing[j - 1] - h) > EQUAL_SPACING * h) break;
      const next = sin * turnCos + cos * turnSin;
      cos = cos * turnCos - sin * turnSin;
      sin = next;
    }
  }
  const scale = Math.sqrt(2 / Math.PI);
  return [scale * re, scale * im];
}

/** |wallAmplitude|^2: probability per wavenumber, nm. */
export function wallDensity(
  psi: Float64Array,
  grid: Grid,
  from: number,
  to: number,
  k: number,
  wall: number,
): number {
  const [re, im] = wallAmplitude(psi, grid, from, to, k, wall);
  return re * re + im * im;
}
