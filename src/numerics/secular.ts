/** Half the distance between one and the next double: what one rounding may cost, relatively. */
const UNIT_ROUNDOFF = Number.EPSILON / 2;
/** Steps after which a root is taken as it stands; four or five are usual, and bisection alone would need about 60. */
const MOST_STEPS = 100;

/**
 * The roots lambda_i of the secular equation
 *
 *   f(lambda) = 1 / rho + sum_j z_j^2 / (d_j - lambda) = 0,   d_0 < d_1 < ... ascending, rho > 0, z_j != 0,
 *
 * which are the eigenvalues of diag(d) + rho z z^T. lambda_i lies between d_i and d_(i+1), the last one beyond the last d. Each is
 * given as its distance `offset` from the nearer of the two, d_origin, so that every difference d_j - lambda_i keeps its
 * digits however close they are; eigenvectors are orthogonal to round-off only because of that.
 * Cost O(n) a root and step. Source: Li, LAPACK Working Note 89 (1993), the middle way; citation from memory.
 */
export class SecularRoots {
  readonly origin: Int32Array;
  readonly offset: Float64Array;
  private count = 0;
  private d: Float64Array = new Float64Array(0);
  private readonly squares: Float64Array;
  private inverseRho = 0;
  /** Of the last `evaluate`: f, the slopes of its parts up to the lower pole and beyond it, and a bound on its rounding. */
  private value = 0;
  private slopeBelow = 0;
  private slopeAbove = 0;
  private rounding = 0;

  /** @param most the greatest number of roots asked for at once */
  constructor(most: number) {
    this.origin = new Int32Array(most);
    this.offset = new Float64Array(most);
    this.squares = new Float64Array(most);
  }

  /** Finds all roots for the first `count` entries of d and z. `d` is kept and must not change while differences are asked for. */
  find(d: Float64Array, z: Float64Array, count: number, rho: number): void {
    this.d = d;
    this.count = count;
    this.inverseRho = 1 / rho;
    let sum = 0;
    for (let j = 0; j < count; j++) {
      this.squares[j] = z[j] * z[j];
      sum += this.squares[j];
    }
    for (let i = 0; i < count - 1; i++) this.between(i);
    if (count === 1) {
      this.origin[0] = 0;
      this.offset[0] = rho * sum;
    } else this.beyond(rho * sum);
  }

  /** The root between d_i and d_(i+1). */
  private between(i: number): void {
    const { d, squares } = this;
    const width = d[i + 1] - d[i];
    this.evaluate(i, i, 0.5 * width);
    const left = this.value >= 0;
    const [p, q] = [squares[i], squares[i + 1]];
    // f with all other poles held at their value in the middle: its root is the first guess.
    const c = this.value + (p - q) / (0.5 * width);
    this.origin[i] = left ? i : i + 1;
    if (left) {
      const a = c * width + p + q;
      const b = p * width;
      const root = Math.sqrt(Math.abs(a * a - 4 * b * c));
      const guess = a > 0 ? (2 * b) / (a + root) : (a - root) / (2 * c);
      this.offset[i] = this.converge(i, i, guess, 0, 0.5 * width);
    } else {
      const a = c * width - p - q;
      const b = q * width;
      const root = Math.sqrt(Math.abs(a * a + 4 * b * c));
      const guess = a < 0 ? (2 * b) / (a - root) : -(a + root) / (2 * c);
      this.offset[i] = this.converge(i, i + 1, guess, -0.5 * width, 0);
    }
  }

  /** The root beyond the last d, at most `reach` from it. */
  private beyond(reach: number): void {
    const last = this.count - 1;
    this.origin[last] = last;
    this.offset[last] = this.converge(last, last, 0.5 * reach, 0, reach);
  }

  /**
   * f and its slopes at d_origin + offset, the sum split after pole `lower`: what lies below falls, what lies above rises
   * towards the poles that enclose the root. The bound on the rounding adds up all partial sums.
   */
  private evaluate(lower: number, origin: number, offset: number): void {
    const { d, squares, count } = this;
    const at = d[origin];
    const split = Math.min(lower, count - 2);
    let below = 0;
    let slopeBelow = 0;
    let rounding = 0;
    for (let j = 0; j <= split; j++) {
      const inverse = 1 / (d[j] - at - offset);
      const term = squares[j] * inverse;
      below += term;
      slopeBelow += term * inverse;
      rounding -= below;
    }
    let above = 0;
    let slopeAbove = 0;
    for (let j = count - 1; j > split; j--) {
      const inverse = 1 / (d[j] - at - offset);
      const term = squares[j] * inverse;
      above += term;
      slopeAbove += term * inverse;
      rounding += Math.abs(above);
    }
    this.value = this.inverseRho + below + above;
    this.slopeBelow = slopeBelow;
    this.slopeAbove = slopeAbove;
    this.rounding =
      rounding +
      8 * (Math.abs(above) + Math.abs(below)) +
      this.inverseRho +
      Math.abs(offset) * (slopeBelow + slopeAbove);
  }

  /** Iterates from a guess within the bracket from `low` to `high` (offsets from d_origin), in which f rises through zero. */
  private converge(lower: number, origin: number, guess: number, low: number, high: number): number {
    const { d, count } = this;
    const a = Math.min(lower, count - 2);
    const beyondAll = lower === count - 1;
    let offset = guess > low && guess < high ? guess : between(low, high);
    for (let step = 0; step < MOST_STEPS; step++) {
      this.evaluate(lower, origin, offset);
      if (Math.abs(this.value) <= UNIT_ROUNDOFF * this.rounding) break;
      if (this.value > 0) high = offset;
      else low = offset;
      const toA = d[a] - d[origin] - offset;
      const toB = d[a + 1] - d[origin] - offset;
      let next = offset + this.step(toA, toB, beyondAll);
      if (!(next > low && next < high)) next = between(low, high);
      if (next === offset || high - low <= UNIT_ROUNDOFF * Math.abs(offset)) break;
      offset = next;
    }
    return offset;
  }

  /** Step to the zero of c + p / (toA - x) + q / (toB - x), which has the value and, each on its side, the slope of f. */
  private step(toA: number, toB: number, beyondAll: boolean): number {
    const { value, slopeBelow, slopeAbove } = this;
    const c = value - toA * slopeBelow - toB * slopeAbove;
    const a = (toA + toB) * value - toA * toB * (slopeBelow + slopeAbove);
    const b = toA * toB * value;
    const root = Math.sqrt(Math.abs(a * a - 4 * b * c));
    if (beyondAll) return a >= 0 ? (a + root) / (2 * c) : (2 * b) / (a - root);
    return a <= 0 ? (a - root) / (2 * c) : (2 * b) / (a + root);
  }
}

/** A place inside a bracket: in the geometric middle when its ends differ in size, because roots crowd towards a pole, which is zero. */
function between(low: number, high: number): number {
  const [near, far] = Math.abs(low) < Math.abs(high) ? [low, high] : [high, low];
  if (near === 0) return far / 16;
  return far / near > 4 ? near * Math.sqrt(far / near) : 0.5 * (low + high);
}
