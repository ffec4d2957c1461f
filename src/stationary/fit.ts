/** Points at which a panel is sampled; its polynomial has one degree less. */
export const FIT_POINTS = 24;

/** Chebyshev points of the first kind on (-1, 1): the ends, where an interface may stand, are not among them. */
const POINTS = Float64Array.from({ length: FIT_POINTS }, (_, i) => cosine(2 * i + 1));
/** cos(k theta_i), row k. */
const COSINES = Float64Array.from({ length: FIT_POINTS * FIT_POINTS }, (_, at) =>
  cosine(Math.floor(at / FIT_POINTS) * (2 * (at % FIT_POINTS) + 1)),
);
/** Coefficients of the powers of s in T_k(s), row k; whole numbers, from T_{k+1} = 2 s T_k - T_{k-1}. */
const POWERS = chebyshevPowers();

/** cos(pi n / (2 FIT_POINTS)) with the angle brought to the first octant in whole numbers, so that no digit of it is lost. */
function cosine(n: number): number {
  const turn = 4 * FIT_POINTS;
  const m = Math.min(n % turn, turn - (n % turn));
  if (2 * m > turn / 2) return -cosine(turn / 2 - m);
  const angle = (Math.PI * m) / (2 * FIT_POINTS);
  return 2 * m > turn / 4 ? Math.sin((Math.PI * (turn / 4 - m)) / (2 * FIT_POINTS)) : Math.cos(angle);
}

function chebyshevPowers(): Float64Array {
  const table = new Float64Array(FIT_POINTS * FIT_POINTS);
  table[0] = 1;
  table[FIT_POINTS + 1] = 1;
  for (let k = 2; k < FIT_POINTS; k++)
    for (let j = 0; j <= k; j++)
      table[k * FIT_POINTS + j] =
        (j > 0 ? 2 * table[(k - 1) * FIT_POINTS + j - 1] : 0) - table[(k - 2) * FIT_POINTS + j];
  return table;
}

/** Coefficients of this part of the largest sample are rounding; it counts as part of the rounding of the function itself. */
export const FIT_NOISE = 1e-15;

/** Coefficients at the end of the series below this part of the largest sample are dropped. */
const DROPPED = 3e-17;

/** A function on a panel as a polynomial in s in [-1, 1]. */
export interface Fit {
  /** Coefficients of 1, s, s^2, ...; at least one. */
  readonly powers: Float64Array;
  /** How far the polynomial may be from the function, judged by the last coefficients of its Chebyshev series. */
  readonly residual: number;
  /** Greatest sample in size. */
  readonly size: number;
}

/**
 * Polynomial through FIT_POINTS samples of f on [left, right]. Coefficients of the Chebyshev series below `negligible` at its end are
 * dropped and counted into the residual. A constant gives one power, exactly.
 */
export function fitPolynomial(
  f: (x: number) => number,
  left: number,
  right: number,
  negligible: number,
): Fit {
  const [centre, half] = [(left + right) / 2, (right - left) / 2];
  const samples = POINTS.map((s) => f(centre + half * s));
  const size = samples.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  if (samples.every((value) => value === samples[0])) {
    return { powers: samples.slice(0, 1), residual: 0, size };
  }
  const series = new Float64Array(FIT_POINTS);
  for (let k = 0; k < FIT_POINTS; k++) {
    let sum = 0;
    for (let i = 0; i < FIT_POINTS; i++) sum += samples[i] * COSINES[k * FIT_POINTS + i];
    series[k] = ((k === 0 ? 1 : 2) / FIT_POINTS) * sum;
  }
  // What was left out of a series that falls geometrically is about as large as its last terms.
  let residual = 2 * (Math.abs(series[FIT_POINTS - 1]) + Math.abs(series[FIT_POINTS - 2]));
  residual += 2 * Math.abs(series[FIT_POINTS - 3]);
  residual = Math.max(0, residual - FIT_NOISE * size);
  let degree = FIT_POINTS - 1;
  const least = Math.max(negligible, DROPPED * size);
  for (; degree > 0 && Math.abs(series[degree]) <= least; degree--) residual += Math.abs(series[degree]);
  const powers = new Float64Array(degree + 1);
  for (let k = 0; k <= degree; k++)
    for (let j = 0; j <= k; j++) powers[j] += series[k] * POWERS[k * FIT_POINTS + j];
  return { powers, residual, size };
}
