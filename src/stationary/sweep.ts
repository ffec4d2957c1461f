import { HBAR } from "../units/constants.js";
import { amplitudeError } from "./backward-pass.js";
import { TransferChain, UNIT_ROUNDOFF as U } from "./chain.js";
import { ForwardPass } from "./forward-pass.js";
import type { Structure } from "./structure.js";

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
   * Phase (rad) between the incoming wave at the near face and the outgoing one at the far face, or where nothing can leave half that of the reflected
   * wave: grows by pi across a narrow resonance, whichever way it decays, and elsewhere as slowly as that of a free wave.
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
  private readonly wave = new ForwardPass();

  constructor(private readonly structure: Structure) {}

  run(incidence: Incidence): Sweep {
    const { structure, chain } = this;
    const { energy, near, far, from, slack } = incidence;
    this.tabulate(energy, slack);
    const fromLeft = from === "left";
    const [nearMass, farMass] = fromLeft ? structure.masses : [structure.masses[1], structure.masses[0]];
    const v = Math.sqrt((2 * near) / nearMass) / HBAR;
    const vFar = Math.sqrt((2 * Math.abs(far)) / farMass) / HBAR;
    const { wave } = this;
    const phase = wave.run(chain, fromLeft, far > 0 ? 0 : vFar, far > 0 ? -vFar : 0, v);
    const { y, phases, exponents } = wave;
    const last = 4 * chain.count;
    const [pr, pi, er, ei] = [y[last], y[last + 1], y[last + 2] / v, y[last + 3] / v];
    const [cr, ci] = [phases[2 * chain.count], phases[2 * chain.count + 1]];
    const incoming = product(cr, ci, (pr - ei) / 2, (pi + er) / 2);
    const reflected = product(cr, ci, (pr + ei) / 2, (pi - er) / 2);
    const incomingSize = Math.hypot(incoming[0], incoming[1]);
    const size = (Math.hypot(pr, pi) + Math.hypot(er, ei)) / 2;
    const nearVelocity = 3 * U + incidence.nearSlack / (2 * near);
    const farVelocity = far === 0 ? 0 : 3 * U + incidence.farSlack / (2 * Math.abs(far));
    const cut = TWO_OVER_HBAR2 * structure.cutAway;
    const inner = amplitudeError(chain, wave, fromLeft, v, incoming, vFar * farVelocity, cut);
    const outer = 6 * U * size + nearVelocity * Math.hypot(er, ei);
    return {
      incoming,
      reflected,
      exponent: exponents[chain.count],
      // The last few operations, v in eta/v, and what the structure does; a tenth more for the second order.
      error: 1.1 * (outer + inner.error),
      phaseError: 1.1 * (outer / incomingSize + inner.phaseError),
      nearVelocity: v,
      farVelocity: far > 0 ? vFar : 0,
      // From psi, which may have a node at this face, to A: arg(1 + i eta/(v psi)), never beyond a quarter turn.
      phase: phase - Math.atan2(pr * er + pi * ei, pr * pr + pi * pi - (pr * ei - pi * er)),
    };
  }

  /**
   * Number of bound states below an energy that lies above neither level: the zeros of the solution that decays on the far side, those
   * outside the near face included.
   */
  statesBelow({ energy, near, far, from }: Pick<Incidence, "energy" | "near" | "far" | "from">): number {
    const { structure, chain, wave } = this;
    this.tabulate(energy, 0);
    const fromLeft = from === "left";
    const [nearMass, farMass] = fromLeft ? structure.masses : [structure.masses[1], structure.masses[0]];
    // In a real wave any weight of eta against psi does.
    const turned = wave.run(chain, fromLeft, Math.sqrt((-2 * far) / farMass) / HBAR, 0, 1);
    const [psi, eta] = [wave.y[4 * chain.count], wave.y[4 * chain.count + 2]];
    // Outside, psi cosh(kappa xi) + m eta sinh(kappa xi)/kappa has a zero when its growing part has the other sign.
    const growing = psi * (Math.sqrt((-2 * near) / nearMass) / HBAR) + eta;
    return Math.round(turned / Math.PI) + (psi * growing < 0 ? 1 : 0);
  }

  private tabulate(energy: number, slack: number): void {
    this.chain.clear();
    for (const element of this.structure.elements) element.transfer(this.chain, energy, slack);
  }
}

function product(ar: number, ai: number, br: number, bi: number): readonly [number, number] {
  return [ar * br - ai * bi, ar * bi + ai * br];
}
