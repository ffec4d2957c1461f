import { erfc } from "../numerics/erfc.js";
import { ForwardFft, fftWavenumbers } from "../numerics/fft.js";
import type { Potential } from "../potentials/potential.js";
import type { Grid } from "./grid.js";

/** Half-width of the ramp by which the far level returns to the near one at the seam of the circle, in spacings. */
export const SEAM_SPREAD = 3;
/** Spacings on either side of the seam that the ramp needs until it has fallen to round-off. */
export const SEAM_ROOM = 9 * SEAM_SPREAD;

/**
 * V on the nodes of a periodic grid. A smooth shape is sampled. One with jumps or points is replaced by its own
 * Fourier series cut at the band of the grid,
 *
 *   V_j = mean + sum_(k != 0) c_k exp(i k x_j),  c_k = S(k) / (i k L),  S(k) = integral V'(x) exp(-i k x) dx,
 *
 * so that nothing depends on where the interfaces lie between the nodes (errors of transmission go like h^3, whereas
 * sampling rounds every width to whole spacings). Where the levels left and right differ, a Gaussian-smoothed ramp at the seam,
 * the end of the grid, leads back. Cost O(n log n + n * interfaces). Source: Fourier series, common practice, no source.
 */
export function periodicPotential(grid: Grid, potential: Potential): Float64Array {
  return potential.slopeTransform
    ? fromSeries(grid, potential, potential.slopeTransform)
    : sampled(grid, potential);
}

function sampled(grid: Grid, potential: Potential): Float64Array {
  const { x, finest: h } = grid;
  const n = x.length;
  const drop = potential.confining ? 0 : potential.levelRight - potential.levelLeft;
  const spread = SEAM_SPREAD * h;
  return x.map((at, j) => {
    const ramp = (u: number) => 0.5 * erfc(u / (Math.SQRT2 * spread));
    return potential.value(at) + (drop === 0 ? 0 : drop * (ramp(j * h) - ramp((n - j) * h)));
  });
}

function fromSeries(
  grid: Grid,
  potential: Potential,
  slope: NonNullable<Potential["slopeTransform"]>,
): Float64Array {
  const { x, finest: h } = grid;
  const n = x.length;
  const length = n * h;
  const drop = potential.levelRight - potential.levelLeft;
  const spread = SEAM_SPREAD * h;
  const k = fftWavenumbers(n, length);
  // The transform of the conjugate coefficients is the conjugate of the series; V is real, so that is the series itself.
  const coefficients = new Float64Array(2 * n);
  const series = new Float64Array(2 * n);
  for (let j = 1; j < n; j++) {
    const [sRe, sIm] = slope.call(potential, k[j]);
    const cos = Math.cos(k[j] * x[0]);
    const sin = Math.sin(k[j] * x[0]);
    // S(k) exp(i k x_0) minus the ramp at the seam, which stands at x_0 itself.
    const re = sRe * cos - sIm * sin - drop * Math.exp(-0.5 * (k[j] * spread) ** 2);
    const im = sRe * sin + sIm * cos;
    const scale = 1 / (k[j] * length);
    coefficients[2 * j] = im * scale;
    // conjugate of -i re
    coefficients[2 * j + 1] = j === n / 2 ? 0 : re * scale;
  }
  coefficients[0] = potential.cellAverage(x[0], x[0] + length);
  new ForwardFft(n).forward(series, coefficients);
  return x.map((_, j) => series[2 * j]);
}
