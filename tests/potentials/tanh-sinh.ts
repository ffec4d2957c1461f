/**
 * Integral by the tanh-sinh rule (H. Takahasi and M. Mori, 1974, from memory), written for the tests so that they do
 * not lean on the quadrature under test. Good to round-off for functions that are smooth inside [a, b] and not much
 * narrower than it.
 */
export function tanhSinh(f: (x: number) => number, a: number, b: number): number {
  const half = (b - a) / 2;
  const h = 1 / 32;
  let sum = 0;
  for (let i = -110; i <= 110; i++) {
    const t = i * h;
    const u = (Math.PI / 2) * Math.sinh(t);
    // Distance from the nearer end, without cancellation: 1 - tanh|u| = 2/(exp(2|u|) + 1).
    const distance = (2 * half) / (Math.exp(2 * Math.abs(u)) + 1);
    const weight = ((Math.PI / 2) * Math.cosh(t)) / Math.cosh(u) ** 2;
    sum += weight * f(u > 0 ? b - distance : a + distance);
  }
  return sum * half * h;
}

/** The same over panels that end at the given places and are no wider than `panel`. */
export function integrateBetween(
  f: (x: number) => number,
  a: number,
  b: number,
  breaks: readonly number[],
  panel: number,
): number {
  const ends = [a, ...breaks.filter((x) => x > a && x < b), b];
  let sum = 0;
  for (let i = 0; i + 1 < ends.length; i++) {
    const count = Math.max(1, Math.ceil((ends[i + 1] - ends[i]) / panel));
    const width = (ends[i + 1] - ends[i]) / count;
    for (let p = 0; p < count; p++) sum += tanhSinh(f, ends[i] + p * width, ends[i] + (p + 1) * width);
  }
  return sum;
}
