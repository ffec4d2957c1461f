import type { Departure } from "../grid/journey.js";
import { ALONE, Extrapolation, IN_PARTS } from "../numerics/extrapolation.js";
import { kineticEnergy, wavenumberWeight } from "../packets/gaussian.js";
import { HBAR } from "../units/constants.js";
import { LAST_PART, type Outcome } from "./outcome.js";

/** Wavenumbers at which a calculation's transmission is looked at, in spreads from the mean: what gets through a thick barrier is the far tail. */
const FIRST_SPREAD = -6;
const LAST_SPREAD = 12;
const SPREADS_APART = 0.5;
/** Groups of neighbouring energies that are extrapolated on their own, each of about the same share of what got through. */
const GROUPS = 4;
/** Share of the accuracy asked for below which no bound is told. */
const LEAST_SHARE = 0.01;
/** What is inside at the end, relative to what got through, below which no resonance counts. */
const NEGLIGIBLE_INSIDE = 1e-9;

/**
 * What the spacing leaves of the transmission T, from calculations on refined grids. T is extrapolated as it is; so are the logarithm of the
 * smaller of T and R, which falls exponentially with thickness or smoothness, and the transmitted shares of four groups of energies. Errors of different
 * energies may cancel in T and make all its changes small by accident; in its parts they rarely do. The bound is the largest of: that
 * of T, that of the logarithm, the distance between the two, and the sum of the groups' own. Beside a peak narrower than the samples' distance the groups
 * say nothing, and more caution takes their place.
 */
export class SpacingBound {
  private readonly transmission = new Extrapolation(IN_PARTS);
  private readonly logarithm = new Extrapolation(IN_PARTS);
  private readonly groups = Array.from({ length: GROUPS }, () => new Extrapolation(IN_PARTS));
  private ends: readonly number[] | undefined;
  private reflectedIsSmaller = false;

  /** @param end time at which the calculations end, fs */
  constructor(
    private readonly from: Departure,
    private readonly accuracy: number,
    private readonly end: number,
  ) {}

  /** Adds the calculation at relative spacing h (smaller than all before) and returns the bound, absolute. */
  add(h: number, outcome: Outcome): number {
    const { transmitted, reflected } = outcome;
    if (this.ends === undefined) this.reflectedIsSmaller = transmitted >= 0.5;
    const small = this.reflectedIsSmaller ? reflected : transmitted;
    const t = this.transmission.add(h, transmitted);
    const l = this.logarithm.add(h, Math.log(Math.max(small, Number.MIN_VALUE)));
    const second = Math.exp(l.value);
    const apart = Math.abs((this.reflectedIsSmaller ? 1 - t.value : t.value) - second);
    const parts = this.addGroups(h, outcome);
    const whole = Math.max(t.error, second * l.error, IN_PARTS.factor * apart);
    // Samples that may fall on the flank of a peak say nothing: then the whole stands alone.
    const bound = Math.max(
      this.isSharp(outcome) ? (ALONE.factor / IN_PARTS.factor) * whole : Math.max(whole, parts),
      LEAST_SHARE * this.accuracy * small,
    );
    return Number.isNaN(bound) ? 1 : Math.min(1, bound);
  }

  /** Whether what is still inside decays so slowly that a peak narrower than two samples' distance is behind it, and counts. */
  private isSharp({ inside, insideBefore, transmitted }: Outcome): boolean {
    if (inside < NEGLIGIBLE_INSIDE * transmitted) return false;
    const { k0, spread, mass } = this.from;
    const apart = (HBAR * HBAR * k0 * SPREADS_APART * spread) / mass;
    const width = (HBAR * Math.log(insideBefore / inside)) / (LAST_PART * this.end);
    return !(width > 2 * apart);
  }

  private addGroups(h: number, outcome: Outcome): number {
    const shares = sharesByEnergy(outcome, this.from);
    this.ends ??= groupEnds(shares);
    let sum = 0;
    this.groups.forEach((group, g) => {
      const first = g === 0 ? 0 : (this.ends?.[g - 1] ?? 0);
      const part = shares.slice(first, this.ends?.[g]).reduce((a, b) => a + b, 0);
      const { error } = group.add(h, part);
      sum += error;
    });
    return sum;
  }
}

/** T(E) |phi(k)|^2 dk at equally spaced wavenumbers, from the calculation's own plane waves; 0 where the packet or the far side has none. */
function sharesByEnergy(outcome: Outcome, { k0, spread, mass, near, packet }: Departure): number[] {
  const shares: number[] = [];
  for (let z = FIRST_SPREAD; z <= LAST_SPREAD; z += SPREADS_APART) {
    const k = k0 + z * spread;
    const t = k > 0 ? outcome.transmissionAt(near + kineticEnergy(k, mass)) : undefined;
    const share = (t ?? 0) * wavenumberWeight(k, k0, packet.width) * SPREADS_APART * spread;
    shares.push(Number.isFinite(share) ? share : 0);
  }
  return shares;
}

/** Where the groups end: at each quarter of what got through. */
function groupEnds(shares: readonly number[]): number[] {
  const total = shares.reduce((a, b) => a + b, 0);
  const ends: number[] = [];
  let sum = 0;
  shares.forEach((share, i) => {
    sum += share;
    while (ends.length < GROUPS - 1 && sum >= (total * (ends.length + 1)) / GROUPS) ends.push(i + 1);
  });
  while (ends.length < GROUPS) ends.push(shares.length);
  return ends;
}
