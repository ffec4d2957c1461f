/**
 * The logistic function and its integrals, free of overflow and of cancellation: every result is right to a few
 * units in the last place relative to itself, however far out the argument lies.
 */

/** 1 / (1 + exp(-z)). */
export function logistic(z: number): number {
  if (z >= 0) return 1 / (1 + Math.exp(-z));
  const y = Math.exp(z);
  return y / (1 + y);
}

/** Its slope, y / (1 + y)^2 with y = exp(z): a bump of height 1/4 at z = 0 that falls like exp(-|z|). */
export function logisticSlope(z: number): number {
  const y = Math.exp(-Math.abs(z));
  return y / ((1 + y) * (1 + y));
}

/**
 * Integral of the logistic function from a to a + d, d > 0: log((1 + exp(a + d)) / (1 + exp(a))).
 * The length d is asked for by itself because the caller knows it better than the difference of two far ends.
 */
export function logisticIntegral(a: number, d: number): number {
  const b = a + d;
  if (b <= 0) {
    // exp(b) (1 - exp(-d)) is exp(b) - exp(a) without its cancellation.
    return Math.log1p((Math.exp(b) * -Math.expm1(-d)) / (1 + Math.exp(a)));
  }
  // logistic(z) = 1 - logistic(-z) turns the right half into the case above.
  if (a >= 0) return d - Math.log1p((Math.exp(-a) * -Math.expm1(-d)) / (1 + Math.exp(-b)));
  const left = Math.log1p(-Math.expm1(a) / (1 + Math.exp(a)));
  const right = b - Math.log1p(-Math.expm1(-b) / (1 + Math.exp(-b)));
  return left + right;
}

/** Integral of the slope from a to a + d, d > 0: logistic(a + d) - logistic(a), as a product instead of a difference. */
export function logisticDifference(a: number, d: number): number {
  const b = a + d;
  const nearest = a > 0 ? a : b < 0 ? -b : 0;
  const spread = -Math.expm1(-d) * Math.exp(-nearest);
  return spread / ((1 + Math.exp(-Math.abs(a))) * (1 + Math.exp(-Math.abs(b))));
}
