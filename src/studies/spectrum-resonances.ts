import type { SpectrumRow } from "./spectrum-row.js";

/** A resonance: energy above the left level and full width at half maximum, eV. */
export interface Resonance {
  readonly energy: number;
  readonly width: number;
}

/** Ratio of the golden section. */
const GOLDEN = (Math.sqrt(5) - 1) / 2;
/** Sections of a bracket: they leave 1e-14 of it. */
const SECTIONS = 67;
/** First step from a peak outward, relative to the bracket, how much longer each next one reaches, and how many there are at most. */
const FIRST_STEP = 1e-12;
const LENGTHENING = 1.25;
const STEPS = 200;
/** Relative rounding of T, far above that of the witness: it makes no valley. */
const ROUNDING = 1e-9;
/** Halvings of the stretch in which T passes through half its maximum. */
const HALVINGS = 40;
/** Peaks that are looked at closely, at most. */
const MOST_PEAKS = 200;

/**
 * The peaks of T between the first row and the last: every local maximum of the rows is looked at closely, by the golden section on 1/T,
 * which is a parabola at a resonance (G. Breit and E. Wigner, Phys. Rev. 49, 519 (1936), from memory), and counts where T falls to
 * half of it on both sides without rising in between. A peak that stands between two rows without being seen in either is not found.
 *
 * @param rows ascending in energy
 * @param transmissionAt T at an energy (eV above the left level)
 * @param threshold energy at and below which nothing is transmitted
 * Cost: some 500 values of T for each peak.
 */
export function peaks(
  rows: readonly SpectrumRow[],
  transmissionAt: (energy: number) => number,
  threshold: number,
): Resonance[] {
  const found: Resonance[] = [];
  let looked = 0;
  const last = rows.length - 1;
  for (let n = 0; n <= last && last > 0 && looked < MOST_PEAKS; n++) {
    // A peak may also stand beside the first row or the last; if that row itself is the highest, T rises beyond it and it is none.
    const [before, after] = [rows[Math.max(0, n - 1)], rows[Math.min(last, n + 1)]];
    const { value } = rows[n].transmission;
    if ((n > 0 && !(value > before.transmission.value)) || (n < last && !(value >= after.transmission.value)))
      continue;
    looked++;
    const energy = maximum(transmissionAt, before.energy, after.energy);
    const step = FIRST_STEP * (after.energy - before.energy);
    const [left, right] = [-1, 1].map((side) => halfPlace(transmissionAt, energy, side * step, threshold));
    if (left !== undefined && right !== undefined) found.push({ energy, width: right - left });
  }
  return found;
}

/** Where T is greatest between `low` and `high`, by the golden section. */
function maximum(transmissionAt: (energy: number) => number, low: number, high: number): number {
  let [a, b] = [low, high];
  let x = b - GOLDEN * (b - a);
  let y = a + GOLDEN * (b - a);
  let [tx, ty] = [transmissionAt(x), transmissionAt(y)];
  for (let n = 0; n < SECTIONS; n++) {
    if (tx >= ty) {
      [b, y, ty] = [y, x, tx];
      x = b - GOLDEN * (b - a);
      tx = transmissionAt(x);
    } else {
      [a, x, tx] = [x, y, ty];
      y = a + GOLDEN * (b - a);
      ty = transmissionAt(y);
    }
  }
  return (a + b) / 2;
}

/** Where T has fallen to half of its value at `peak`, by steps of growing length and then by halving; undefined when it rises before. */
function halfPlace(
  transmissionAt: (energy: number) => number,
  peak: number,
  firstStep: number,
  threshold: number,
): number | undefined {
  const top = transmissionAt(peak);
  let [inner, last] = [peak, top];
  for (let n = 0, step = firstStep; n < STEPS; n++, step *= LENGTHENING) {
    // At the threshold nothing is transmitted, so that T has passed through its half before.
    const outer = Math.max(threshold, peak + step);
    const value = outer > threshold ? transmissionAt(outer) : 0;
    if (value > last * (1 + ROUNDING)) return undefined;
    if (value <= top / 2) return halved(transmissionAt, inner, outer, top / 2);
    [inner, last] = [outer, value];
  }
  return undefined;
}

/** The place between `inner` (T above `level`) and `outer` (below) where T passes through `level`. */
function halved(
  transmissionAt: (energy: number) => number,
  inner: number,
  outer: number,
  level: number,
): number {
  let [above, below] = [inner, outer];
  for (let n = 0; n < HALVINGS; n++) {
    const middle = (above + below) / 2;
    if (transmissionAt(middle) > level) above = middle;
    else below = middle;
  }
  return (above + below) / 2;
}
