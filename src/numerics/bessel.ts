/** Values beyond this are scaled down on the way: far from the edge of what a double holds, and seldom reached. */
const LARGE = 1e100;

/**
 * Bessel functions of the first kind J_0(x), J_1(x), ... J_(N-1)(x), with N the least number such that |J_n(x)| < `negligible` for
 * all n >= N, by the recurrence J_(n-1) = (2 n / x) J_n - J_(n+1), downwards from where J is next to nothing, and
 * J_0^2 + 2 sum J_n^2 = 1 for the scale. N is about |x| + 10 |x|^(1/3) for 1e-15.
 * @param x any finite number
 * @param negligible above 1e-30; relative to the greatest value, which is of order one
 * @returns values with an error of some roundings of the greatest
 * @throws RangeError when an argument is out of range
 * Cost O(N). Source: J. C. P. Miller's recurrence, Abramowitz and Stegun, Handbook of Mathematical Functions, 9.12; citation from memory.
 */
export function besselSeries(x: number, negligible = 1e-16): Float64Array {
  if (!Number.isFinite(x)) throw new RangeError(`Bessel functions: a finite argument is needed; got ${x}`);
  if (!(negligible >= 1e-30 && negligible < 1))
    throw new RangeError(`Bessel functions: a threshold from 1e-30 to 1 is needed; got ${negligible}`);
  const size = Math.abs(x);
  // J_1 = x / 2 is negligible already.
  if (size < 2 * negligible) return Float64Array.of(1);
  // There J has fallen to 1e-37 by its Airy form, and for small x by (e x / 2 n)^n.
  const top = Math.ceil(size + 20 * Math.cbrt(size)) + 60;
  const values = new Float64Array(top + 1);
  let above = 0;
  let here = 1;
  for (let n = top; n >= 0; n--) {
    values[n] = here;
    const below = ((2 * n) / size) * here - above;
    above = here;
    here = below;
    if (Math.abs(here) > LARGE) {
      here /= LARGE;
      above /= LARGE;
      for (let m = n; m <= top; m++) values[m] /= LARGE;
    }
  }
  let sum = values[0] ** 2;
  for (let n = 1; n <= top; n++) sum += 2 * values[n] ** 2;
  const scale = 1 / Math.sqrt(sum);
  let count = 0;
  for (let n = 0; n <= top; n++) {
    // J_n(-x) = (-1)^n J_n(x)
    values[n] *= x < 0 && n % 2 === 1 ? -scale : scale;
    if (Math.abs(values[n]) >= negligible) count = n + 1;
  }
  return values.slice(0, count);
}
