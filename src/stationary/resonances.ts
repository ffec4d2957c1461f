import type { PhaseStep } from "./resolved-quadrature.js";

/** A quasi-level: the pole E - i width/2 of the transmitted amplitude, eV. */
export interface Resonance {
  readonly energy: number;
  /** Full width at half height, eV; hbar/width is its lifetime. */
  readonly width: number;
}

/** The amplitude of the incoming wave (over that of the outgoing one, which has no zeros): re, im, and a power of two beside them. */
export type IncomingAmplitude = (energy: number) => readonly [re: number, im: number, exponent: number];

/** How much faster the phase must turn at a resonance than a free wave's over the same length. */
const DISTINCT = 3;
/** Steps of the search for the pole; each one squares the distance, and three do. */
const REFINEMENTS = 4;

/**
 * Resonances seen as steps of the phase, from panels whose ends are energies.
 * @param pace d(phase)/dE (rad/eV) of a free wave over the structure, at an energy
 */
export function resonancesAmong(
  steps: readonly PhaseStep[],
  incoming: IncomingAmplitude,
  pace: (energy: number) => number,
): Resonance[] {
  const found: Resonance[] = [];
  const slope = (i: number) => (steps[i] === undefined ? 0 : steps[i].turn / (steps[i].b - steps[i].a));
  for (let i = 0; i < steps.length; i++) {
    if (!(slope(i) > slope(i - 1) && slope(i) >= slope(i + 1))) continue;
    const { a, b } = steps[i];
    const middle = (a + b) / 2;
    if (slope(i) < DISTINCT * pace(middle)) continue;
    // The slope of arctan((E - E_r)/(width/2)) at its middle is 2/width.
    const pole = refine({ energy: middle, width: Math.max(2 / slope(i), b - a) }, incoming);
    const first = steps[0].a;
    const last = steps[steps.length - 1].b;
    const plausible = pole.width > 0 && pole.energy > first && pole.energy < last;
    if (!plausible || 2 / pole.width < DISTINCT * pace(pole.energy)) continue;
    const known = found.some(
      ({ energy, width }) => Math.abs(energy - pole.energy) < (width + pole.width) / 4,
    );
    if (!known) found.push(pole);
  }
  return found.sort((p, q) => p.energy - q.energy);
}

/** The zero of the incoming amplitude near the real axis, by a parabola through three real energies about it. */
function refine(start: Resonance, incoming: IncomingAmplitude): Resonance {
  let { energy, width } = start;
  for (let step = 0; step < REFINEMENTS; step++) {
    // Never so close that the three energies are the same number.
    const reach = Math.max(width / 2, 64 * Number.EPSILON * Math.abs(energy));
    const values = [-1, 0, 1].map((offset) => incoming(energy + offset * reach));
    const [[lr, li], [cr, ci], [rr, ri]] = values.map(([re, im, exponent]) => {
      const factor = 2 ** (exponent - values[1][2]);
      return [re * factor, im * factor];
    });
    // A = c + b t + a t^2, t = (E - energy)/reach; its zero near 0 is -2c/(b +- sqrt(b^2 - 4 a c)).
    const a = [(rr + lr) / 2 - cr, (ri + li) / 2 - ci] as const;
    const b = [(rr - lr) / 2, (ri - li) / 2] as const;
    const c = [cr, ci] as const;
    const [br, bi] = squared(b);
    const [sr, si] = root([br - 4 * (a[0] * c[0] - a[1] * c[1]), bi - 4 * (a[0] * c[1] + a[1] * c[0])]);
    const sign = sr * b[0] + si * b[1] >= 0 ? 1 : -1;
    const [tr, ti] = over([-2 * c[0], -2 * c[1]], [b[0] + sign * sr, b[1] + sign * si]);
    if (!Number.isFinite(tr) || !Number.isFinite(ti)) break;
    energy += tr * reach;
    width = Math.abs(2 * ti * reach);
  }
  return { energy, width };
}

type Complex = readonly [re: number, im: number];
const squared = ([re, im]: Complex): Complex => [re * re - im * im, 2 * re * im];
function root([re, im]: Complex): Complex {
  const size = Math.hypot(re, im);
  const real = Math.sqrt((size + Math.abs(re)) / 2);
  if (real === 0) return [0, 0];
  const other = im / (2 * real);
  return re >= 0 ? [real, other] : [Math.abs(other), im < 0 ? -real : real];
}
function over([ar, ai]: Complex, [br, bi]: Complex): Complex {
  const square = br * br + bi * bi;
  return [(ar * br + ai * bi) / square, (ai * br - ar * bi) / square];
}
