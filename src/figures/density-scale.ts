import { linearTicks, powerOfTen, type Tick } from "./ticks.js";

export type ScaleKind = "linear" | "log";

/** Decades that a logarithmic map shows below the greatest density. */
export const DEFAULT_DECADES = 6;

/** How densities become colours, and what stands beside the colour bar. */
export interface DensityScale {
  readonly kind: ScaleKind;
  /** Ends of the colour bar, in the units of the data. */
  readonly low: number;
  readonly high: number;
  /** 0 at the lower end of the colours, 1 at the upper; below the floor of a logarithmic scale, and at zero, 0. */
  position(value: number): number;
  /** Labelled ticks; values in the units of the data. */
  readonly ticks: readonly Tick[];
  /** Ticks without a label. */
  readonly minor: readonly number[];
  /** Power of ten that the tick labels are to be multiplied by. */
  readonly exponent: number;
}

/**
 * The scale for a set of densities.
 *
 * @param density values in the unit that is to be printed; zeros and the small negative numbers of round-off allowed
 * @param kind linear from 0 to the maximum, or logarithmic from a power of ten
 * @param decades for the logarithmic scale: how far below the maximum it reaches, at least; less when the smallest
 *   positive density lies above that
 * @throws RangeError when a density is not finite
 */
export function densityScale(
  density: Float64Array,
  kind: ScaleKind,
  decades = DEFAULT_DECADES,
): DensityScale {
  if (!(decades > 0 && decades <= 300))
    throw new RangeError(`the number of decades must lie between 0 and 300; got ${decades}`);
  let high = 0;
  let least = Number.POSITIVE_INFINITY;
  for (const value of density) {
    if (!Number.isFinite(value)) throw new RangeError(`densities must be finite numbers; got ${value}`);
    if (value > high) high = value;
    if (value > 0 && value < least) least = value;
  }
  // An empty map still gets a scale: one with nothing on it.
  if (high === 0) [high, least] = [1, 0];
  return kind === "linear" ? linearScale(high) : logScale(high, least, decades);
}

function linearScale(high: number): DensityScale {
  // Labels beyond 0.01 to 1000 would be longer than the bar is wide: their power of ten moves to the axis label.
  const power = Math.floor(Math.log10(high));
  const exponent = power < -2 || power > 2 ? 3 * Math.floor(power / 3) : 0;
  const unit = 10 ** exponent;
  const ticks = linearTicks(0, high / unit, 5).map(({ value, label }) => ({ value: value * unit, label }));
  return { kind: "linear", low: 0, high, position: (value) => value / high, ticks, minor: [], exponent };
}

function logScale(high: number, least: number, decades: number): DensityScale {
  const top = Math.log10(high);
  // The floor is a power of ten; the small shift keeps a maximum of 1 from getting a seventh decade by round-off.
  const bottom = Math.max(
    Math.floor(top - decades + 1e-9),
    Math.min(Math.floor(Math.log10(least)), Math.ceil(top) - 1),
  );
  const low = 10 ** bottom;
  const stride = Math.ceil((top - bottom) / 7);
  const ticks: Tick[] = [];
  const minor: number[] = [];
  for (let power = bottom; power <= top + 1e-9; power++) {
    if ((power - bottom) % stride === 0) ticks.push({ value: 10 ** power, label: powerOfTen(power) });
    else minor.push(10 ** power);
    if (stride === 1)
      for (let digit = 2; digit < 10 && digit * 10 ** power <= high; digit++) minor.push(digit * 10 ** power);
  }
  // Everything below the floor, zero too, has the floor's colour: the label says so.
  ticks[0] = { value: low, label: `≤ ${ticks[0].label}` };
  const perDecade = 1 / (Math.LN10 * (top - bottom));
  const shift = bottom / (top - bottom);
  return {
    kind: "log",
    low,
    high,
    position: (value) => (value <= low ? 0 : Math.log(value) * perDecade - shift),
    ticks,
    minor,
    exponent: 0,
  };
}
