import FFT from "fft.js";

/**
 * Forward discrete Fourier transform X_k = sum_j x_j exp(-2 pi i j k / n) of interleaved complex data: the one seam to
 * the library behind it. There is no inverse: conjugate before and after, which costs nothing where a multiplication
 * by phases stands beside it (the library's own inverse spends one more pass on dividing by n).
 */
export class ForwardFft {
  private readonly transform: FFT;

  /** @throws RangeError unless n is a power of two, at least 2 */
  constructor(readonly n: number) {
    if (!(n >= 2) || (n & (n - 1)) !== 0)
      throw new RangeError(`FFT: a power of two is needed as the number of points; got ${n}`);
    this.transform = new FFT(n);
  }

  /** out <- DFT of data; two different Float64Arrays of length 2n. */
  forward(out: Float64Array, data: Float64Array): void {
    if (out === data) throw new RangeError("FFT: the output must not be the input");
    this.transform.transform(out, data);
  }
}

/** Angular wavenumbers 2 pi j / length in the order of the transform: 0, 1, ..., n/2 - 1, -n/2, ..., -1. 1/nm for nm. */
export function fftWavenumbers(n: number, length: number): Float64Array {
  return Float64Array.from({ length: n }, (_, j) => (2 * Math.PI * (j < n / 2 ? j : j - n)) / length);
}
