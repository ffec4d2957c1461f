/** I_0(x) by its power series, whose terms are all positive: accurate to round-off. Cost: about |x| + 30 terms. */
function besselI0(x: number): number {
  const square = (x * x) / 4;
  let term = 1;
  let sum = 1;
  for (let k = 1; term > 1e-18 * sum; k++) {
    term *= square / (k * k);
    sum += term;
  }
  return sum;
}

/**
 * A smooth fall from 1 to 0 over `count` equal steps: one minus the running sum of the Kaiser window
 *
 *   I_0(beta sqrt(1 - u^2)),  u from -1 to 1,
 *
 * so that what it cuts off leaks little: a tone of phase theta per step is suppressed by about e^-beta once theta count / 2 > beta.
 * @returns count + 1 values, the first 1 and the last 0
 * Source: J. F. Kaiser and R. W. Schafer, IEEE Trans. ASSP 28, 105 (1980), for the window; citation from memory.
 */
export function kaiserFall(count: number, beta: number): Float64Array {
  const fall = new Float64Array(count + 1);
  let sum = 0;
  for (let i = 1; i <= count; i++) {
    const u = (2 * i - 1) / count - 1;
    sum += besselI0(beta * Math.sqrt(Math.max(0, 1 - u * u)));
    fall[i] = sum;
  }
  for (let i = 0; i <= count; i++) fall[i] = count === 0 ? 1 : 1 - fall[i] / sum;
  return fall;
}
