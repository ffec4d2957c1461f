/** Unit round-off: a correctly rounded operation is right to this part of its result. */
export const UNIT_ROUNDOFF = 2 ** -53;

/**
 * The transfer matrices of one energy, element by element from left to right, with a bound on each of their entries.
 * y = (psi, psi'/m) on an element's right side is M y on its left, M real with determinant 1; entries of thick barriers
 * carry a power of two beside them, so that nothing overflows. Kept in flat arrays that are used again for the next energy.
 */
export class TransferChain {
  count = 0;
  /** M11, M12, M21, M22 of each element. */
  entries = new Float64Array(4 * 16);
  /** Bounds on the errors of these entries. */
  bounds = new Float64Array(4 * 16);
  /** The true matrix is `entries` times 2^exponent. */
  exponents = new Float64Array(16);
  /** Half turns that the phase of a complex wave makes inside the element, before the part that shows at its ends. */
  halfTurns = new Float64Array(16);

  clear(): void {
    this.count = 0;
  }

  /** Place in `entries` and `bounds` at which the next element's four numbers are to be written. */
  next(exponent = 0, halfTurns = 0): number {
    if (this.count === this.exponents.length) this.grow();
    this.exponents[this.count] = exponent;
    this.halfTurns[this.count] = halfTurns;
    return 4 * this.count++;
  }

  private grow(): void {
    const size = 2 * this.exponents.length;
    const larger = (old: Float64Array, length: number) => {
      const fresh = new Float64Array(length);
      fresh.set(old);
      return fresh;
    };
    this.entries = larger(this.entries, 4 * size);
    this.bounds = larger(this.bounds, 4 * size);
    this.exponents = larger(this.exponents, size);
    this.halfTurns = larger(this.halfTurns, size);
  }
}

/** A part of the structure that can say how it transfers a wave. */
export interface Element {
  /**
   * Appends its transfer matrices at total energy `energy` (eV).
   * @param slack absolute uncertainty of the energy itself, eV
   */
  transfer(chain: TransferChain, energy: number, slack: number): void;
}
