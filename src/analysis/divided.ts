import type { Grid } from "../grid/grid.js";
import { ForwardFft, fftWavenumbers } from "../numerics/fft.js";
import type { Shares } from "./probabilities.js";

/**
 * Makes the measurement of the probabilities left of, between and right of two places (nm) that is as good as the grid itself also while
 * the packet passes, when a whole cell more or less on one side would be seen:
 *
 * on a closed grid, where both places are nodes, half of such a node's neighbouring cells counts on either side (an error of second
 * order in the spacing, like the grid's own); on a circle the series of |psi|^2 is integrated between the places,
 *
 *   integral_a^b |psi|^2 dx = sum_q rho_q integral_a^b exp(i q (x - x_0)) dx,
 *
 * which is as exact as the state is, as long as |psi|^2 fits into the band. What lies beyond the seam of a circle belongs to the
 * left up to its first node: nothing reaches it in a run whose ends are untouched.
 * @throws RangeError when a closed grid has no node at a place
 * Cost O(n) or O(n log n) a look.
 */
export function dividedAt(grid: Grid, left: number, right: number): (psi: Float64Array) => Shares {
  return grid.ends === "periodic" ? onCircle(grid, left, right) : onNodes(grid, left, right);
}

function onNodes(
  { x, spacing, weight, finest }: Grid,
  left: number,
  right: number,
): (psi: Float64Array) => Shares {
  const node = (place: number): number => {
    const j = x.findIndex((at) => Math.abs(at - place) < 1e-6 * finest);
    if (j < 0) throw new RangeError(`a node at ${place} nm is needed to divide this grid there`);
    return j;
  };
  const [a, b] = [node(left), node(right)];
  const density = (psi: Float64Array, j: number) => psi[2 * j] ** 2 + psi[2 * j + 1] ** 2;
  const sum = (psi: Float64Array, from: number, to: number) => {
    let total = 0;
    for (let j = from; j < to; j++) total += weight[j] * density(psi, j);
    return total;
  };
  const half = (j: number, side: -1 | 1) => 0.5 * spacing[side < 0 ? j - 1 : j];
  return (psi) => ({
    left: sum(psi, 0, a) + half(a, -1) * density(psi, a),
    inside: a === b ? 0 : half(a, 1) * density(psi, a) + sum(psi, a + 1, b) + half(b, -1) * density(psi, b),
    right: half(b, 1) * density(psi, b) + sum(psi, b + 1, x.length),
  });
}

function onCircle(grid: Grid, left: number, right: number): (psi: Float64Array) => Shares {
  const { x, finest: step } = grid;
  const n = x.length;
  const length = n * step;
  const fft = new ForwardFft(n);
  const q = fftWavenumbers(n, length);
  const density = new Float64Array(2 * n);
  const spectrum = new Float64Array(2 * n);
  const [fromStart, inside] = [spans(q, 0, left - x[0]), spans(q, left - x[0], right - x[0])];
  return (psi) => {
    for (let j = 0; j < n; j++) density[2 * j] = psi[2 * j] ** 2 + psi[2 * j + 1] ** 2;
    fft.forward(spectrum, density);
    const total = spectrum[0] * step;
    const [low, middle] = [fromStart, inside].map((weights) => {
      let sum = 0;
      for (let k = 0; k < 2 * n; k += 2) sum += spectrum[k] * weights[k] - spectrum[k + 1] * weights[k + 1];
      return sum / n;
    });
    return { left: low, inside: middle, right: total - low - middle };
  };
}

/** integral_a^b exp(i q x) dx for every q, interleaved. The band's edge stands for both signs and is left out. */
function spans(q: Float64Array, a: number, b: number): Float64Array {
  const n = q.length;
  const weights = new Float64Array(2 * n);
  weights[0] = b - a;
  for (let k = 1; k < n; k++) {
    if (k === n / 2) continue;
    weights[2 * k] = (Math.sin(q[k] * b) - Math.sin(q[k] * a)) / q[k];
    weights[2 * k + 1] = -(Math.cos(q[k] * b) - Math.cos(q[k] * a)) / q[k];
  }
  return weights;
}
