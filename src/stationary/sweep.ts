import { HBAR } from "../units/constants.js";
import { TransferChain, UNIT_ROUNDOFF as U } from "./chain.js";
import type { Structure } from "./structure.js";

/** Twice the greatest growth before numbers are taken back to size by a power of two. */
const LARGE = 2 ** 200;
const SMALL = 2 ** -200;
const TWO_OVER_HBAR2 = 2 / (HBAR * HBAR);

/** Energy and side of one evaluation; the kinetic energies are given because they may be known better than their differences. */
export interface Incidence {
  /** Total energy, eV. */
  readonly energy: number;
  /** Above the level of the side that the wave comes from, above zero; and of the far side, of any sign. eV. */
  readonly near: number;
  readonly far: number;
  readonly from: "left" | "right";
  /** Uncertainties of the three energies, eV. */
  readonly slack: number;
  readonly nearSlack: number;
  readonly farSlack: number;
}

/** The wave that goes out on the far side with amplitude 1 at its face, as it is on the near side. */
export interface Sweep {
  /** Amplitudes at the near face, times 2^exponent: of the wave that comes in, and of the reflected one. */
  readonly incoming: readonly [re: number, im: number];
  readonly reflected: readonly [re: number, im: number];
  readonly exponent: number;
  /** Bound on the error of either amplitude, times 2^exponent as well. */
  readonly error: number;
  /**
   * Bound on the error of the phase of `incoming`, rad. Beside a narrow resonance it is far below error/|incoming|: there what is uncertain is the
   * energy of the resonance, which changes the size of the amplitude and hardly its phase.
   */
  readonly phaseError: number;
  /** Velocities hbar k / m without the hbar: k/m near and far; far 0 where the wave cannot leave. */
  readonly nearVelocity: number;
  readonly farVelocity: number;
  /**
   * Phase (rad) that the wave gathers from the near face to the far face, or where it cannot leave the phase of the reflected
   * wave, halved: grows by pi across a narrow resonance, whichever way the wave decays.
   */
  readonly phase: number;
}

/**
 * Integrates psi and eta = d psi/d xi / m from the far face towards the near face, xi pointing towards the near side: the
 * direction in which the wanted solution grows, so that nothing is lost in barriers. Then
 * A = (psi + i eta/v)/2 comes in and B = (psi - i eta/v)/2 is reflected.
 *
 * Bound: A = w_j y_j at every interface j, with the row vectors w_j carried from the near face to the far one; to first order
 * |dA| <= sum_j |w_j+1| (|dM_j| + 3 units |M_j|) |y_j|. B's row vectors are the complex conjugates (M is real), so its bound is the same.
 * Cost O(elements). Source: adjoint (backward) error analysis, in any text on numerical linear algebra.
 */
export class Sweeper {
  private readonly chain = new TransferChain();
  /** Re psi, Im psi, Re eta, Im eta at each interface, and the power of two beside them. */
  private y = new Float64Array(0);
  private exponents = new Float64Array(0);

  constructor(private readonly structure: Structure) {}

  run(incidence: Incidence): Sweep {
    const { structure, chain } = this;
    const { energy, near, far, from, slack } = incidence;
    this.tabulate(energy, slack);
    const fromLeft = from === "left";
    const [nearMass, farMass] = fromLeft ? structure.masses : [structure.masses[1], structure.masses[0]];
    const v = Math.sqrt((2 * near) / nearMass) / HBAR;
    const vFar = Math.sqrt((2 * Math.abs(far)) / farMass) / HBAR;
    const phase = this.forward(fromLeft, far > 0 ? 0 : vFar, far > 0 ? -vFar : 0);
    const { y, exponents } = this;
    const last = 4 * chain.count;
    const [pr, pi, er, ei] = [y[last], y[last + 1], y[last + 2] / v, y[last + 3] / v];
    const incoming = [(pr - ei) / 2, (pi + er) / 2] as const;
    const reflected = [(pr + ei) / 2, (pi - er) / 2] as const;
    const size = (Math.hypot(pr, pi) + Math.hypot(er, ei)) / 2;
    const nearVelocity = 3 * U + incidence.nearSlack / (2 * near);
    const farVelocity = far === 0 ? 0 : 3 * U + incidence.farSlack / (2 * Math.abs(far));
    const inner = this.backward(fromLeft, v, vFar * farVelocity, incoming);
    const outer = 4 * U * size + nearVelocity * Math.hypot(er, ei);
    return {
      incoming,
      reflected,
      exponent: exponents[chain.count],
      // The last few operations, v in eta/v, and what the structure does; a tenth more for the second order.
      error: 1.1 * (outer + inner.error),
      phaseError: 1.1 * (outer / Math.hypot(incoming[0], incoming[1]) + inner.phaseError),
      nearVelocity: v,
      farVelocity: far > 0 ? vFar : 0,
      // With a real psi its zeros are half turns, and psi + i eta/v fills in between them.
      phase: far > 0 ? phase : phase - Math.atan(er / pr),
    };
  }

  /**
   * Number of bound states below an energy that lies above neither level: the zeros of the solution that decays on the far side, those
   * outside the near face included.
   */
  statesBelow({ energy, near, far, from }: Pick<Incidence, "energy" | "near" | "far" | "from">): number {
    const { structure, chain, y } = this.tabulate(energy, 0);
    const fromLeft = from === "left";
    const [nearMass, farMass] = fromLeft ? structure.masses : [structure.masses[1], structure.masses[0]];
    const turned = this.forward(fromLeft, Math.sqrt((-2 * far) / farMass) / HBAR, 0);
    const [psi, eta] = [y[4 * chain.count], y[4 * chain.count + 2]];
    // Outside, psi cosh(kappa xi) + m eta sinh(kappa xi)/kappa has a zero when its growing part has the other sign.
    const growing = psi * (Math.sqrt((-2 * near) / nearMass) / HBAR) + eta;
    return Math.round(turned / Math.PI) + (psi * growing < 0 ? 1 : 0);
  }

  private tabulate(energy: number, slack: number): this {
    const { structure, chain } = this;
    chain.clear();
    for (const element of structure.elements) element.transfer(chain, energy, slack);
    if (this.exponents.length < chain.count + 1) {
      this.y = new Float64Array(8 * (chain.count + 1));
      this.exponents = new Float64Array(2 * (chain.count + 1));
    }
    return this;
  }

  /** y from the far face to the near face; returns the phase gathered on the way. */
  private forward(fromLeft: boolean, etaRe: number, etaIm: number): number {
    const { chain, y, exponents } = this;
    const { count, entries, halfTurns } = chain;
    let [pr, pi, er, ei] = [1, 0, etaRe, etaIm];
    let exponent = 0;
    let phase = 0;
    y[0] = pr;
    y[1] = pi;
    y[2] = er;
    y[3] = ei;
    exponents[0] = 0;
    for (let j = 0; j < count; j++) {
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
      phase += turn(pr, pi, nr, ni, halfTurns[element]);
      [pr, pi, er, ei] = [nr, ni, fr, fi];
      exponent += chain.exponents[element];
      const size = Math.max(Math.abs(pr), Math.abs(pi), Math.abs(er), Math.abs(ei));
      if (size > LARGE || size < SMALL) {
        const shift = Math.floor(Math.log2(size));
        const factor = 2 ** -shift;
        pr *= factor;
        pi *= factor;
        er *= factor;
        ei *= factor;
        exponent += shift;
      }
      y[4 * j + 4] = pr;
      y[4 * j + 5] = pi;
      y[4 * j + 6] = er;
      y[4 * j + 7] = ei;
      exponents[j + 1] = exponent;
    }
    return phase;
  }

  /**
   * Row vectors from the near face to the far one; returns the bound on |dA| in units of 2^(exponent of A), and that on
   * |d arg A| = |Im dA/A|, for which each term counts with the part that stands across A.
   */
  private backward(
    fromLeft: boolean,
    v: number,
    farSlack: number,
    [ar, ai]: readonly [number, number],
  ): { error: number; phaseError: number } {
    const { chain, y, exponents } = this;
    const { count, entries, bounds } = chain;
    const cut = TWO_OVER_HBAR2 * this.structure.cutAway;
    const whole = exponents[count];
    let [pr, pi, er, ei] = [0.5, 0, 0, 0.5 / v];
    let exponent = 0;
    const square = ar * ar + ai * ai;
    let sum = cut * Math.hypot(er, ei) * Math.hypot(y[4 * count], y[4 * count + 1]);
    const across = 0;
    const start = sum;
    for (let j = count - 1; j >= 0; j--) {
      const element = fromLeft ? count - 1 - j : j;
      const at = 4 * element;
      const first = fromLeft ? at + 3 : at;
      const last = fromLeft ? at : at + 3;
      const [a, b, c, d] = [entries[first], entries[at + 1], entries[at + 2], entries[last]];
      const psi = Math.abs(y[4 * j]) + Math.abs(y[4 * j + 1]);
      const eta = Math.abs(y[4 * j + 2]) + Math.abs(y[4 * j + 3]);
      const onPsi =
        (bounds[first] + 3 * U * Math.abs(a)) * psi + (bounds[at + 1] + 3 * U * Math.abs(b)) * eta;
      const onEta = (bounds[at + 2] + 3 * U * Math.abs(c)) * psi + (bounds[last] + 3 * U * Math.abs(d)) * eta;
      const share = Math.hypot(pr, pi) * onPsi + Math.hypot(er, ei) * onEta;
      sum += share * 2 ** (exponent + chain.exponents[element] + exponents[j] - whole);
      [pr, pi, er, ei] = [pr * a + er * c, pi * a + ei * c, pr * b + er * d, pi * b + ei * d];
      exponent += chain.exponents[element];
      const size = Math.max(Math.abs(pr), Math.abs(pi), Math.abs(er), Math.abs(ei));
      if (size > LARGE || size < SMALL) {
        const shift = Math.floor(Math.log2(size));
        const factor = 2 ** -shift;
        pr *= factor;
        pi *= factor;
        er *= factor;
        ei *= factor;
        exponent += shift;
      }
    }
    // The start itself: v on the far side, and what was cut away beyond its face.
    const end = Math.hypot(er, ei) * (farSlack + cut) * 2 ** (exponent - whole);
    return { error: sum + end, phaseError: across + (start + end) / Math.sqrt(square) };
  }
}

/** Phase by which psi turns (clockwise along xi) from one end of an element to the other, half turns included. */
function turn(pr: number, pi: number, nr: number, ni: number, halfTurns: number): number {
  const cross = pi * nr - pr * ni;
  const dot = pr * nr + pi * ni;
  // After n half turns psi has changed its sign n times.
  const sign = halfTurns % 2 === 0 ? 1 : -1;
  const rest = Math.atan2(sign * cross, sign * dot);
  // The rest lies between 0 and a half turn; only rounding brings it below zero, at either end.
  return halfTurns * Math.PI + (rest < -Math.PI / 2 ? rest + 2 * Math.PI : rest);
}
