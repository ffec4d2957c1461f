import type { Grid } from "../grid/grid.js";
import { ForwardFft, fftWavenumbers } from "../numerics/fft.js";

/** Mean and standard deviation. */
export interface Moments {
  readonly mean: number;
  readonly spread: number;
}

/** <x> and its spread in nm, of the normalised state. Cost O(n). */
export function positionMoments(psi: Float64Array, grid: Grid): Moments {
  const { x, weight } = grid;
  // Deviations from a point in the middle of the grid keep the digits of the spread.
  const origin = x[x.length >> 1];
  let total = 0;
  let first = 0;
  let second = 0;
  for (let j = 0; j < x.length; j++) {
    const p = weight[j] * (psi[2 * j] ** 2 + psi[2 * j + 1] ** 2);
    const s = x[j] - origin;
    total += p;
    first += p * s;
    second += p * s * s;
  }
  const mean = first / total;
  return { mean: origin + mean, spread: Math.sqrt(Math.max(0, second / total - mean * mean)) };
}

/**
 * Makes the measurement of <k> and its spread (1/nm; momentum is hbar k) for a grid: by Fourier transform on a circle, by
 * differences between neighbours on a closed grid,
 *
 *   <k> = sum Im(psi_j* psi_(j+1)),  <k^2> = sum |psi_(j+1) - psi_j|^2 / h_(j+1/2),
 *
 * whose error is of second order in the spacing, like that of the stepper on such a grid. Cost O(n log n) or O(n).
 */
export function wavenumberMoments(grid: Grid): (psi: Float64Array) => Moments {
  return grid.ends === "periodic" ? spectralMoments(grid) : differenceMoments(grid);
}

function spectralMoments(grid: Grid): (psi: Float64Array) => Moments {
  const n = grid.x.length;
  const fft = new ForwardFft(n);
  const spectrum = new Float64Array(2 * n);
  const k = fftWavenumbers(n, n * grid.finest);
  return (psi) => {
    fft.forward(spectrum, psi);
    let total = 0;
    let first = 0;
    let second = 0;
    for (let j = 0; j < n; j++) {
      const p = spectrum[2 * j] ** 2 + spectrum[2 * j + 1] ** 2;
      total += p;
      first += p * k[j];
      second += p * k[j] * k[j];
    }
    const mean = first / total;
    return { mean, spread: Math.sqrt(Math.max(0, second / total - mean * mean)) };
  };
}

function differenceMoments({ x, spacing, weight }: Grid): (psi: Float64Array) => Moments {
  return (psi) => {
    let total = 0;
    let first = 0;
    let second = 0;
    for (let j = 0; j < x.length; j++) {
      const re = psi[2 * j];
      const im = psi[2 * j + 1];
      total += weight[j] * (re * re + im * im);
      if (j === x.length - 1) break;
      const nextRe = psi[2 * j + 2];
      const nextIm = psi[2 * j + 3];
      first += re * nextIm - im * nextRe;
      second += ((nextRe - re) ** 2 + (nextIm - im) ** 2) / spacing[j];
    }
    const mean = first / total;
    return { mean, spread: Math.sqrt(Math.max(0, second / total - mean * mean)) };
  };
}

/** <H> in eV of the normalised state, with `scratch` (length 2n) for H psi. Cost that of H. */
export function meanEnergy(
  psi: Float64Array,
  grid: Grid,
  applyHamiltonian: (out: Float64Array, psi: Float64Array) => void,
  scratch: Float64Array,
): number {
  applyHamiltonian(scratch, psi);
  let total = 0;
  let sum = 0;
  for (let j = 0; j < grid.x.length; j++) {
    const w = grid.weight[j];
    total += w * (psi[2 * j] ** 2 + psi[2 * j + 1] ** 2);
    sum += w * (psi[2 * j] * scratch[2 * j] + psi[2 * j + 1] * scratch[2 * j + 1]);
  }
  return sum / total;
}
