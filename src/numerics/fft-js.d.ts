/** The part of fft.js 4 that is used here; the package ships no types. */
declare module "fft.js" {
  export default class FFT {
    constructor(size: number);
    transform(out: Float64Array, data: Float64Array): void;
  }
}
