import { HBAR } from "../units/constants.js";
import { type Element, type TransferChain, UNIT_ROUNDOFF as U } from "./chain.js";

/** Exponents kappa w up to here stay far from overflow even after products with their neighbours. */
const UNSCALED = 200;
/** Exponents kappa w from here on have their growing and their decaying part carried apart. */
const THICK = 2;
/** 2/hbar^2, 1/(eV^2 fs^2). */
const TWO_OVER_HBAR2 = 2 / (HBAR * HBAR);

/** A layer of constant V and mass: nm, eV, eV fs^2/nm^2. */
export interface Flat {
  readonly left: number;
  readonly right: number;
  readonly value: number;
  readonly mass: number;
}

/**
 * Exact transfer through a flat layer of width w: with u = 2 (V - E)/hbar^2, z = m u w^2, C = cosh sqrt z and
 * S = sinh(sqrt z)/sqrt z (cos and sin for z < 0), M = [[C, m w S], [u w S, C]].
 *
 * Thick walls, see `thick`, take M in factors.
 *
 * Bounds: every rounding of V - E, of the width (a difference of two rounded places) and of the constants is a change of z, and enters by
 * dC/dz = S/2, dS/dz = (C - S)/(2z); what the last operations round is added to the entries themselves.
 */
export function flatLayer({ left, right, value, mass }: Flat): Element {
  const width = right - left;
  // Each place is right to about a unit or two in its last digit, having been summed from widths.
  const widthSlack = (2 * U * (Math.abs(left) + Math.abs(right))) / width + U;
  return {
    transfer(chain, energy, slack) {
      const u = TWO_OVER_HBAR2 * (value - energy);
      const z = mass * u * width * width;
      const uSlack = TWO_OVER_HBAR2 * (slack + U * Math.abs(value));
      const zSlack = Math.abs(z) * (8 * U + 2 * widthSlack) + mass * width * width * uSlack;
      if (z > 0) evanescent(chain, z, zSlack, mass * width, u * width, width * uSlack, widthSlack);
      else oscillating(chain, z, zSlack, mass * width, u * width, width * uSlack, widthSlack);
    },
  };
}

/** C and S themselves where the layer is thin; else the growing and the decaying part apart. */
function evanescent(
  chain: TransferChain,
  z: number,
  zSlack: number,
  mw: number,
  uw: number,
  uwSlack: number,
  slack: number,
): void {
  const r = Math.sqrt(z);
  if (r < THICK) {
    const C = Math.cosh(r);
    const S = r === 0 ? 1 : Math.sinh(r) / r;
    const dS = r < 0.3 ? 0.18 : Math.abs(C - S) / (2 * z);
    write(chain.next(), chain, C, S, dS, zSlack, mw, uw, uwSlack, slack);
    return;
  }
  thick(chain, r, (0.5 * zSlack) / r, r / mw, 8 * U + (0.5 * uwSlack) / uw);
}

/**
 * M = P diag(exp r, exp -r) P^-1 with P = [[1, -1/(2s)], [s, 1/2]], s = kappa/m, as three matrices of determinant 1. Near a resonance the wave dies out
 * towards the near side, and what M would leave of C psi + m w S eta is the small difference of large numbers. Here the growing part
 * psi/2 + eta/(2s) is that difference, once for psi and eta together, so that its rounding is a shift of the resonance and nothing else.
 *
 * @param rSlack absolute uncertainty of r; `sSlack` relative one of s
 */
function thick(chain: TransferChain, r: number, rSlack: number, s: number, sSlack: number): void {
  const exponent = r < UNSCALED ? 0 : Math.floor(r / Math.LN2);
  const growing = Math.exp(r - exponent * Math.LN2);
  const decaying = Math.exp(-r - exponent * Math.LN2);
  const error = rSlack + 4 * U * (1 + r);
  const into = chain.next();
  chain.entries.set([0.5, 0.5 / s, -s, 1], into);
  chain.bounds.set([0, (0.5 / s) * (sSlack + 2 * U), s * sSlack, 0], into);
  const across = chain.next(exponent);
  chain.entries.set([growing, 0, 0, decaying], across);
  chain.bounds.set([growing * error, 0, 0, decaying * error], across);
  const out = chain.next();
  chain.entries.set([1, -0.5 / s, s, 0.5], out);
  chain.bounds.set([0, (0.5 / s) * (sSlack + 2 * U), s * sSlack, 0], out);
}

function oscillating(
  chain: TransferChain,
  z: number,
  zSlack: number,
  mw: number,
  uw: number,
  uwSlack: number,
  slack: number,
): void {
  const r = Math.sqrt(-z);
  const C = Math.cos(r);
  const S = r === 0 ? 1 : Math.sin(r) / r;
  // |dS/dz| <= 1/6 everywhere, and <= (1 + 1/r)/(2 r^2).
  const dS = r < 0.3 ? 0.17 : Math.abs(C - S) / (2 * r * r) + U;
  write(chain.next(0, Math.floor(r / Math.PI)), chain, C, S, dS, zSlack, mw, uw, uwSlack, slack);
}

function write(
  at: number,
  chain: TransferChain,
  C: number,
  S: number,
  dS: number,
  zSlack: number,
  mw: number,
  uw: number,
  uwSlack: number,
  slack: number,
): void {
  const { entries, bounds } = chain;
  const sSlack = dS * zSlack + 3 * U * Math.abs(S);
  const cSlack = 0.5 * Math.abs(S) * zSlack + 2 * U * Math.abs(C);
  entries[at] = C;
  entries[at + 1] = mw * S;
  entries[at + 2] = uw * S;
  entries[at + 3] = C;
  bounds[at] = cSlack;
  bounds[at + 1] = mw * (sSlack + (4 * U + slack) * Math.abs(S));
  bounds[at + 2] = Math.abs(uw) * (sSlack + (6 * U + slack) * Math.abs(S)) + uwSlack * Math.abs(S);
  bounds[at + 3] = cSlack;
}

/** A point of strength g (eV nm): psi is continuous, psi'/m jumps by 2 g/hbar^2 psi. */
export function pointOfStrength(strength: number): Element {
  const jump = TWO_OVER_HBAR2 * strength;
  return {
    transfer(chain) {
      const at = chain.next();
      chain.entries.set([1, 0, jump, 1], at);
      chain.bounds.set([0, 0, 8 * U * Math.abs(jump), 0], at);
    },
  };
}
