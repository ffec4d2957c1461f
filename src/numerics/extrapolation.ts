/** Result of an extrapolation to vanishing spacing, with an estimate of what is left. */
export interface Extrapolated {
  readonly value: number;
  /** Bound on |limit - value| from the tableau itself; Infinity until two columns can be compared. */
  readonly error: number;
}

/** Largest and smallest contraction that the bound believes in from one row of the tableau to the next. */
const BEST_CONTRACTION = 1 / 20;
/** Factor by which an observed contraction is enlarged before it is believed. Tuned against check-values 3.6. */
const CAUTION = 4;

/**
 * Richardson extrapolation by Neville's scheme: a quantity measured at spacings h_0 > h_1 > ... whose error is a series in
 * h^p, h^(p+q), h^(p+2q) ... (default h^2, h^4, ...) is carried on to h = 0,
 *
 *   A_(i,0) = f_i,  A_(i,j) = A_(i,j-1) + (A_(i,j-1) - A_(i-1,j-1)) / ((h_(i-j)/h_i)^2 - 1),
 *
 * with halved spacings this is Romberg's. The bound: delta_i, the larger of the changes to the neighbours in the row and
 * on the diagonal, times the contraction that the last two rows showed, cautiously enlarged.
 * Source: L. F. Richardson, Phil. Trans. A 226, 299 (1927); W. Romberg (1955); citations from memory.
 */
export class Extrapolation {
  private row: number[] = [];
  private readonly squares: number[] = [];
  private lastChange = Number.NaN;
  private current: Extrapolated = { value: Number.NaN, error: Number.POSITIVE_INFINITY };

  /** Adds the measurement `f` at relative spacing h (smaller than all before) and returns the extrapolated value. */
  add(h: number, f: number): Extrapolated {
    const { squares } = this;
    if (squares.length > 0 && !(h * h < squares[squares.length - 1]))
      throw new RangeError(
        `extrapolation: spacings must fall; got ${h} after ${Math.sqrt(squares[squares.length - 1])}`,
      );
    squares.push(h * h);
    const i = squares.length - 1;
    const row = [f];
    for (let j = 1; j <= i; j++)
      row.push(row[j - 1] + (row[j - 1] - this.row[j - 1]) / (squares[i - j] / squares[i] - 1));
    const value = row[i];
    let error = Number.POSITIVE_INFINITY;
    if (i > 0) {
      const change = Math.max(Math.abs(value - row[i - 1]), Math.abs(value - this.current.value));
      const contraction = Number.isNaN(this.lastChange) ? 1 : (CAUTION * change) / this.lastChange;
      error = change * Math.min(1, Math.max(BEST_CONTRACTION, contraction));
      this.lastChange = change;
    }
    this.row = row;
    this.current = { value, error };
    return this.current;
  }

  /** The extrapolated value of the measurements so far. */
  get result(): Extrapolated {
    return this.current;
  }
}
