import { ForwardFft } from "./fft.js";

/** Coefficients smaller than this, relative to the largest, change no digit of a sum that rounding leaves. */
const NEGLIGIBLE = 1e-17;

/**
 * The trigonometric interpolant of n samples on a circle, evaluated anywhere: with coefficients c_k = (1/n) sum_j psi_j exp(-2 pi i j k / n),
 *
 *   psi(x) = sum_(k = -n/2)^(n/2 - 1) c_k z^k,   z = exp(2 pi i (x - x_0) / (n h)),
 *
 * by Horner's rule, which is stable on the unit circle. Exact for a state whose momenta lie within the band of its grid.
 * Cost O(n log n), then O(m) a place for the m coefficients that are not negligible.
 * @param psi interleaved samples; a power of two of them
 * @param first place of the first sample, nm
 * @param step spacing, nm
 * @param places where to evaluate, nm
 * @returns interleaved values
 * Source: trigonometric interpolation, common practice, no source.
 */
export function trigonometricValues(
  psi: Float64Array,
  first: number,
  step: number,
  places: Float64Array,
): Float64Array {
  const { re, im, lowest } = bandOf(psi);
  const out = new Float64Array(2 * places.length);
  const turn = (2 * Math.PI) / ((psi.length / 2) * step);
  for (let p = 0; p < places.length; p++) {
    const angle = turn * (places[p] - first);
    const zRe = Math.cos(angle);
    const zIm = Math.sin(angle);
    let a = 0;
    let b = 0;
    for (let k = re.length - 1; k >= 0; k--) {
      const next = a * zRe - b * zIm + re[k];
      b = a * zIm + b * zRe + im[k];
      a = next;
    }
    const cos = Math.cos(lowest * angle);
    const sin = Math.sin(lowest * angle);
    out[2 * p] = a * cos - b * sin;
    out[2 * p + 1] = a * sin + b * cos;
  }
  return out;
}

/** The coefficients in ascending k, from the first to the last that are not negligible. */
function bandOf(psi: Float64Array): { re: Float64Array; im: Float64Array; lowest: number } {
  const n = psi.length / 2;
  const spectrum = new Float64Array(2 * n);
  new ForwardFft(n).forward(spectrum, psi);
  const at = (k: number) => 2 * ((k + n) % n);
  const size = (k: number) => Math.hypot(spectrum[at(k)], spectrum[at(k) + 1]);
  let largest = 0;
  for (let k = -n / 2; k < n / 2; k++) largest = Math.max(largest, size(k));
  let lowest = -n / 2;
  let highest = n / 2 - 1;
  while (lowest < highest && size(lowest) <= NEGLIGIBLE * largest) lowest++;
  while (highest > lowest && size(highest) <= NEGLIGIBLE * largest) highest--;
  const re = new Float64Array(highest - lowest + 1);
  const im = new Float64Array(highest - lowest + 1);
  for (let k = lowest; k <= highest; k++) {
    re[k - lowest] = spectrum[at(k)] / n;
    im[k - lowest] = spectrum[at(k) + 1] / n;
  }
  return { re, im, lowest };
}
