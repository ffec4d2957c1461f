const SQRT_PI = Math.sqrt(Math.PI);
/** Above this x the continued fraction, below it the series; both converge in under 60 terms there. */
const SWITCH = 2;

/**
 * Complementary error function erfc(x) = 2/sqrt(pi) integral_x^inf exp(-t^2) dt, relative error below 1e-13 for x <= 26
 * (smaller values underflow). Series: DLMF 7.6.2; continued fraction: DLMF 7.9.2 (numbers from memory).
 */
export function erfc(x: number): number {
  if (Number.isNaN(x)) return x;
  if (x < 0) return 2 - erfc(-x);
  if (x > 27) return 0;
  return x < SWITCH ? 1 - erfSeries(x) : erfcFraction(x);
}

/** Weight of a normal distribution above z standard deviations: erfc(z / sqrt 2) / 2. */
export function normalTail(z: number): number {
  return 0.5 * erfc(z / Math.SQRT2);
}

/** erf x = 2/sqrt(pi) exp(-x^2) sum_n 2^n x^(2n+1) / (2n+1)!! */
function erfSeries(x: number): number {
  let term = x;
  let sum = x;
  for (let n = 1; term > 1e-17 * sum; n++) {
    term *= (2 * x * x) / (2 * n + 1);
    sum += term;
  }
  return (2 / SQRT_PI) * Math.exp(-x * x) * sum;
}

/** sqrt(pi) exp(x^2) erfc x = 1/(x + (1/2)/(x + 1/(x + (3/2)/(x + ...)))), evaluated from the inside out. */
function erfcFraction(x: number): number {
  let tail = 0;
  for (let n = 80; n > 0; n--) tail = n / 2 / (x + tail);
  return Math.exp(-x * x) / (SQRT_PI * (x + tail));
}
