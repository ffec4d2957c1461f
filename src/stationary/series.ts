/** Greatest K h of a panel: its series then needs about 24 terms that hardly cancel, and its waves make less than half a turn (2 K h < pi). */
export const LONGEST_PHASE = 1;
/** Terms of the series kept at most; K h <= 1 needs 16 to 40. */
const MOST_TERMS = 96;
/** A majorant's tail below this part of its sum is left out. */
const NEGLIGIBLE = 2 ** -56;

/** How many terms a panel's series needs, and bounds on the sums of the sizes of its terms. */
export interface Majorant {
  readonly terms: number;
  /** Bounds on psi and X of the solution that starts with psi = 1, X = 0, and of the one with psi = 0, X = 1. */
  readonly sums: readonly [number, number, number, number];
  /** What the terms left out may add to any of the four. */
  readonly tail: number;
}

/**
 * Power series of psi and X = h mbar chi about the middle of a panel, s in [-1, 1]:
 *   psi' = rho(s) X,  X' = g(s) psi,  rho = m/mbar,  g = h^2 mbar u
 *   (n + 1) p_{n+1} = sum_j rho_j x_{n-j},  (n + 1) x_{n+1} = sum_j g_j p_{n-j}
 * for both solutions at once; even and odd terms are summed apart, which gives both ends of the panel.
 * Source: the method of undetermined coefficients, in every text on ordinary differential equations.
 */
export class PanelSeries {
  private readonly p1 = new Float64Array(MOST_TERMS + 1);
  private readonly x1 = new Float64Array(MOST_TERMS + 1);
  private readonly p2 = new Float64Array(MOST_TERMS + 1);
  private readonly x2 = new Float64Array(MOST_TERMS + 1);
  /** Even and odd sums of p1, x1, p2, x2. */
  readonly even = new Float64Array(4);
  readonly odd = new Float64Array(4);

  /** @param g0 the first coefficient of g, which alone holds the energy; the others are g[1], g[2], ... */
  sum(g: Float64Array, g0: number, rho: Float64Array, terms: number): void {
    const { p1, x1, p2, x2, even, odd } = this;
    const gDegree = g.length - 1;
    const rhoDegree = rho.length - 1;
    p1[0] = 1;
    x1[0] = 0;
    p2[0] = 0;
    x2[0] = 1;
    for (let n = 0; n < terms; n++) {
      let a1 = rho[0] * x1[n];
      let a2 = rho[0] * x2[n];
      let b1 = g0 * p1[n];
      let b2 = g0 * p2[n];
      for (let j = Math.min(n, rhoDegree); j > 0; j--) {
        a1 += rho[j] * x1[n - j];
        a2 += rho[j] * x2[n - j];
      }
      for (let j = Math.min(n, gDegree); j > 0; j--) {
        b1 += g[j] * p1[n - j];
        b2 += g[j] * p2[n - j];
      }
      const share = 1 / (n + 1);
      p1[n + 1] = a1 * share;
      p2[n + 1] = a2 * share;
      x1[n + 1] = b1 * share;
      x2[n + 1] = b2 * share;
    }
    even.fill(0);
    odd.fill(0);
    // Smallest terms first.
    for (let n = terms; n >= 0; n--) {
      const to = n & 1 ? odd : even;
      to[0] += p1[n];
      to[1] += x1[n];
      to[2] += p2[n];
      to[3] += x2[n];
    }
  }
}

const scratch = new PanelSeries();

/**
 * The same recursion with the sizes of all coefficients bounds every term for every energy with |g0| <= `g0Size`. Terms are kept until
 * the bounds of the rest, which fall at least geometrically by then, no longer count.
 */
export function majorant(g: Float64Array, g0Size: number, rho: Float64Array): Majorant {
  const gSize = g.map(Math.abs);
  const rhoSize = rho.map(Math.abs);
  let terms = 16;
  for (; ; terms += 4) {
    scratch.sum(gSize, g0Size, rhoSize, terms + 16);
    const whole = scratch.even.map((value, i) => value + scratch.odd[i]);
    scratch.sum(gSize, g0Size, rhoSize, terms);
    const kept = scratch.even.map((value, i) => value + scratch.odd[i]);
    const rest = whole.reduce((most, value, i) => Math.max(most, value - kept[i]), 0);
    if (rest <= NEGLIGIBLE * whole[0] || terms + 20 > MOST_TERMS) {
      return { terms, sums: [whole[0], whole[1], whole[2], whole[3]], tail: 2 * rest };
    }
  }
}
