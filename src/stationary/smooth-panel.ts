import { HBAR } from "../units/constants.js";
import { type Element, type TransferChain, UNIT_ROUNDOFF as U } from "./chain.js";
import { FIT_NOISE, type Fit, fitPolynomial } from "./fit.js";
import { LONGEST_PHASE, type Majorant, majorant, PanelSeries } from "./series.js";

const TWO_OVER_HBAR2 = 2 / (HBAR * HBAR);
/** Classes of |g0|, each half the one before, down to where it no longer counts: one number of terms for all energies in a class. */
const CLASSES = 64;
/**
 * Roundings in units: a step of the recursion multiplies, adds and divides once each beside its smaller terms, and the n-th term has n steps behind it,
 * which sums to 3 K h times the majorant; the sums over the terms add two.
 */
const STEP_ROUNDINGS = 3;
const SUM_ROUNDINGS = 2;

/** What a panel has to know of the potential. */
export interface Profile {
  value(x: number): number;
  mass(x: number): number;
  /** V changes by at most this much anywhere, eV. */
  readonly range: number;
}

/** V to this part of the whole range is as good as exact: it changes nothing that double precision shows. */
export const FIT_NEGLIGIBLE = 2e-18;

const series = new PanelSeries();

/**
 * A stretch over which V and the mass are polynomials to round-off. Where the energy makes its waves too quick for one
 * series it hands over to its two halves, which are sampled afresh when first needed and kept for later energies.
 */
export class SmoothPanel implements Element {
  readonly potential: Fit;
  private readonly half: number;
  private readonly meanMass: number;
  private readonly g: Float64Array;
  private readonly rho: Float64Array;
  /** sum |g_j|, j > 0: how much g varies on the panel at most. */
  private readonly variation: number;
  private readonly rhoSize: number;
  private readonly classes: (Majorant | undefined)[] = [];
  private halves: readonly [SmoothPanel, SmoothPanel] | undefined;
  /** Absolute uncertainty of V on the panel, eV: fit, rounding of V and of the places where it is taken. */
  private readonly valueSlack: number;
  /** Relative uncertainty of the mass. */
  private readonly massSlack: number;

  constructor(
    private readonly profile: Profile,
    private readonly left: number,
    private readonly right: number,
  ) {
    this.half = (right - left) / 2;
    this.potential = fitPolynomial(profile.value, left, right, FIT_NEGLIGIBLE * profile.range);
    const mass = fitPolynomial(profile.mass, left, right, 0);
    this.meanMass = mass.powers[0];
    this.rho = mass.powers.map((m) => m / this.meanMass);
    this.g = this.potential.powers.map((v) => this.half * this.half * this.meanMass * TWO_OVER_HBAR2 * v);
    this.rhoSize = this.rho.reduce((sum, r) => sum + Math.abs(r), 0);
    this.variation = this.g.reduce((sum, g, j) => (j === 0 ? 0 : sum + Math.abs(g)), 0);
    const slope = this.potential.powers.reduce((sum, v, j) => sum + j * Math.abs(v), 0) / this.half;
    const place = Math.max(Math.abs(left), Math.abs(right));
    this.massSlack = mass.residual / this.meanMass;
    this.valueSlack =
      this.potential.residual + (4 * U + FIT_NOISE) * this.potential.size + 2 * U * place * slope;
  }

  transfer(chain: TransferChain, energy: number, slack: number): void {
    const factor = this.half * this.half * this.meanMass * TWO_OVER_HBAR2;
    const g0 = factor * (this.potential.powers[0] - energy);
    const size = (Math.abs(g0) + this.variation) * this.rhoSize;
    if (size > LONGEST_PHASE * LONGEST_PHASE) {
      this.halves ??= this.split();
      this.halves[0].transfer(chain, energy, slack);
      this.halves[1].transfer(chain, energy, slack);
      return;
    }
    const { terms, sums, tail } = this.majorantFor(Math.abs(g0));
    series.sum(this.g, g0, this.rho, terms);
    const gSlack = factor * (this.valueSlack + slack) + 6 * U * size;
    this.write(chain, sums, tail, size, gSlack);
  }

  /** M = P(+1) P(-1)^-1, P's columns being the two solutions; P has determinant 1. */
  private write(
    chain: TransferChain,
    sums: readonly number[],
    tail: number,
    size: number,
    gSlack: number,
  ): void {
    const { even, odd } = series;
    const at = chain.next();
    const { entries, bounds } = chain;
    const [p1, x1, p2, x2] = [even[0] + odd[0], even[1] + odd[1], even[2] + odd[2], even[3] + odd[3]];
    const [q1, y1, q2, y2] = [even[0] - odd[0], even[1] - odd[1], even[2] - odd[2], even[3] - odd[3]];
    const [P1, X1, P2, X2] = sums;
    // One entry of P errs by `own` of its majorant.
    const phase = Math.sqrt(size);
    const own = U * (SUM_ROUNDINGS + STEP_ROUNDINGS * phase) + this.massSlack * (1 + phase) + tail;
    const scale = this.half * this.meanMass;
    // A change of g by gSlack: M changes by int P(1) P(s)^-1 [0 0; gSlack 0] P(s) P(-1)^-1 ds <= 2 cosh(2 K h) gSlack.
    const shift = 2 * Math.cosh(2 * phase) * gSlack * Math.max(1, this.rhoSize * this.rhoSize);
    entries[at] = p1 * y2 - p2 * y1;
    entries[at + 1] = (p2 * q1 - p1 * q2) * scale;
    entries[at + 2] = (x1 * y2 - x2 * y1) / scale;
    entries[at + 3] = x2 * q1 - x1 * q2;
    bounds[at] = product(p1, y2, own * P1, own * X2) + product(p2, y1, own * P2, own * X1) + shift;
    bounds[at + 1] =
      (product(p2, q1, own * P2, own * P1) + product(p1, q2, own * P1, own * P2) + shift) * scale;
    bounds[at + 2] =
      (product(x1, y2, own * X1, own * X2) + product(x2, y1, own * X2, own * X1) + shift) / scale;
    bounds[at + 3] = product(x2, q1, own * X2, own * P1) + product(x1, q2, own * X1, own * P2) + shift;
  }

  private majorantFor(g0Size: number): Majorant {
    const most = Math.max(LONGEST_PHASE ** 2 / this.rhoSize - this.variation, g0Size);
    const halvings = Math.floor(Math.log2(most / g0Size));
    const index = Math.min(Math.max(halvings, 0), CLASSES);
    let found = this.classes[index];
    if (found === undefined) {
      found = majorant(this.g, most * 0.5 ** index, this.rho);
      this.classes[index] = found;
    }
    return found;
  }

  private split(): readonly [SmoothPanel, SmoothPanel] {
    const middle = (this.left + this.right) / 2;
    return [
      new SmoothPanel(this.profile, this.left, middle),
      new SmoothPanel(this.profile, middle, this.right),
    ];
  }
}

/** Bound on the error of a product of two numbers with such errors, and on the rounding of it and of the sum that it goes into. */
function product(a: number, b: number, aError: number, bError: number): number {
  return aError * Math.abs(b) + bError * Math.abs(a) + aError * bError + 2 * U * Math.abs(a * b);
}
