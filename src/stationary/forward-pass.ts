import type { TransferChain } from "./chain.js";

/** Sizes at which numbers are taken back to about 1 by a power of two; products of three such and one entry of a matrix stay finite. */
export const LARGE = 2 ** 200;
export const SMALL = 2 ** -200;

/**
 * The wave carried from the far face to the near face, kept as a real part, a small imaginary part and a common phase:
 * y = (psi, eta) = c (p + i q), |c| = 1, p and q real, with q = 0 in that component of y which is the larger one.
 *
 * Why not plain complex numbers: M is real, so that Im(psi* eta) = F is the same everywhere (the current), and q follows from it,
 * F/psi or -F/eta, without any cancellation. Rounding then acts on p alone: it shifts the energies of resonances, as a slightly different V would, and
 * leaves their widths right relative to themselves, however narrow they are.
 */
export class ForwardPass {
  /** Re psi, Im psi, Re eta, Im eta at each interface without their common phase. */
  y = new Float64Array(64);
  /** The common phase, as cosine and sine. */
  phases = new Float64Array(32);
  /** The power of two beside `y`. */
  exponents = new Float64Array(16);

  /**
   * @param velocity k/m, in whose units eta is weighed against psi
   * @returns the phase (rad) that psi gathers towards the far face
   */
  run(chain: TransferChain, fromLeft: boolean, etaRe: number, etaIm: number, velocity: number): number {
    const { count, entries, halfTurns } = chain;
    this.makeRoom(count + 1);
    const { y, phases, exponents } = this;
    let [pr, pi, er, ei] = [1, 0, etaRe, etaIm];
    let [cr, ci] = [1, 0];
    let flux = etaIm;
    let exponent = 0;
    let phase = 0;
    for (let j = 0; ; j++) {
      y[4 * j] = pr;
      y[4 * j + 1] = pi;
      y[4 * j + 2] = er;
      y[4 * j + 3] = ei;
      phases[2 * j] = cr;
      phases[2 * j + 1] = ci;
      exponents[j] = exponent;
      if (j === count) return phase;
      const element = fromLeft ? count - 1 - j : j;
      const at = 4 * element;
      // Walked through the other way, M has its diagonal exchanged.
      const a = entries[fromLeft ? at + 3 : at];
      const b = entries[at + 1];
      const c = entries[at + 2];
      const d = entries[fromLeft ? at : at + 3];
      const nr = a * pr + b * er;
      const ni = a * pi + b * ei;
      const fr = c * pr + d * er;
      const fi = c * pi + d * ei;
      // Im(psi* psi') = b F for psi' = a psi + b eta.
      phase += turn(b, flux, pr * nr + pi * ni, halfTurns[element]);
      // det M = 2^(-2 exponent of M) when its power of two is left out.
      flux *= 2 ** -chain.exponents[element] * 2 ** -chain.exponents[element];
      exponent += chain.exponents[element];
      const psi = Math.sqrt(nr * nr + ni * ni);
      const eta = Math.sqrt(fr * fr + fi * fi);
      const along = nr * fr + ni * fi;
      let [ur, ui] = [nr / psi, ni / psi];
      if (psi * velocity >= eta) {
        [pr, pi, er, ei] = [psi, 0, along / psi, flux / psi];
      } else {
        [ur, ui] = [fr / eta, fi / eta];
        [pr, pi, er, ei] = [along / eta, -flux / eta, eta, 0];
      }
      [cr, ci] = [cr * ur - ci * ui, cr * ui + ci * ur];
      const size = Math.max(Math.abs(pr), Math.abs(er));
      if (size > LARGE || size < SMALL) {
        const shift = Math.floor(Math.log2(size));
        const factor = 2 ** -shift;
        pr *= factor;
        pi *= factor;
        er *= factor;
        ei *= factor;
        flux *= factor * factor;
        exponent += shift;
      }
    }
  }

  private makeRoom(length: number): void {
    if (this.exponents.length >= length) return;
    this.y = new Float64Array(8 * length);
    this.phases = new Float64Array(4 * length);
    this.exponents = new Float64Array(2 * length);
  }
}

/**
 * Phase by which psi turns (clockwise along xi) from one end of an element to the other, half turns included; Im(psi* psi') is b F.
 */
function turn(b: number, flux: number, dot: number, halfTurns: number): number {
  // After n half turns psi has changed its sign n times; the rest is a half turn at most, in the direction of b.
  const sign = halfTurns % 2 === 0 ? 1 : -1;
  const cross = -sign * b * flux;
  // A real wave, or one whose current has underflowed, turns at its zeros alone.
  if (cross === 0) return (halfTurns + (sign * dot < 0 ? (sign * b < 0 ? -1 : 1) : 0)) * Math.PI;
  return halfTurns * Math.PI + Math.atan2(cross, sign * dot);
}
