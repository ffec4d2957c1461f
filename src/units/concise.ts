/** A rational number: numerator / denominator, denominator above zero. */
interface Ratio {
  readonly numerator: bigint;
  readonly denominator: bigint;
}

/** A value of 17 significant digits already says more than a double holds. */
const MOST_DIGITS = 17;
/** Values below 10^-5 and, when rounded to tens or coarser, above 10^6 are printed with an exponent. */
const LEAST_FIXED_EXPONENT = -5;
const MOST_FIXED_EXPONENT = 15;
const MOST_ROUNDED_EXPONENT = 5;

/**
 * A number with its bound in the concise notation of the GUM: 0.0266229041(8) means 0.0266229041 +- 0.0000000008, and
 * 2.5422(3)e-14 means (2.5422 +- 0.0003)e-14.
 *
 * The bound is rounded up, to one significant digit or to two where it begins with 1, and takes in the rounding of the
 * value itself: |printed value - value| + error <= printed bound, in exact arithmetic on the two doubles. A bound that
 * reaches across the decimal point is printed with its own: 0.3(1.2).
 *
 * @param value the number; finite or not
 * @param error bound on its distance from the true value, not negative; Infinity or NaN print as "(unbounded)"
 * @param options.digits significant digits of the bound, instead of one or two
 * @throws RangeError for a negative error
 *
 * Source: JCGM 100:2008 (GUM), 7.2.2, for the notation; rounding up instead of to nearest, because this is a bound.
 */
export function concise(value: number, error: number, options: { readonly digits?: number } = {}): string {
  if (error < 0) throw new RangeError(`the error of a number must be zero or more; got ${error}`);
  if (!Number.isFinite(value)) return String(value);
  if (!Number.isFinite(error)) return `${Number(value.toPrecision(4))}(unbounded)`;
  const place = lastPlace(value, error, options.digits);
  if (place === undefined) return `${value === 0 ? 0 : value}(0)`;
  const exact = ratio(value);
  const rounded = roundToPlace(exact, place);
  const slip = absolute(subtract(exact, power(rounded, place)));
  const bound = ceilToPlace(add(ratio(error), slip), place);
  return notation(rounded, bound, place, value < 0);
}

/** Exponent of ten of the last digit to print; undefined for an exact value with an error of zero. */
function lastPlace(value: number, error: number, digits: number | undefined): number | undefined {
  if (error === 0 && isExactDecimal(value)) return undefined;
  const finest = value === 0 ? -Infinity : exponentOf(value) - MOST_DIGITS + 1;
  if (error === 0) return finest;
  const [mantissa, exponent] = error.toExponential().split("e");
  const count = digits ?? (mantissa.startsWith("1") ? 2 : 1);
  return Math.max(Number(exponent) - count + 1, finest);
}

/** True when the shortest text of a double is exactly the double, as for 0.5 but not for 0.1. */
function isExactDecimal(value: number): boolean {
  if (value === 0) return true;
  const [mantissa, exponent] = value.toExponential().split("e");
  const digits = mantissa.replace(".", "");
  const decimals = mantissa.replace("-", "").length - 1;
  const text = power(BigInt(digits), Number(exponent) - Math.max(decimals - 1, 0));
  const exact = ratio(value);
  return text.numerator * exact.denominator === exact.numerator * text.denominator;
}

/** Writes rounded * 10^place with the bound bound * 10^place. */
function notation(rounded: bigint, bound: bigint, place: number, negative: boolean): string {
  const digits = (rounded < 0n ? -rounded : rounded).toString();
  const exponent = place + Math.max(digits.length, bound.toString().length) - 1;
  const fixed =
    exponent >= LEAST_FIXED_EXPONENT && exponent <= (place > 0 ? MOST_ROUNDED_EXPONENT : MOST_FIXED_EXPONENT);
  const shift = fixed ? 0 : exponent;
  const decimals = shift - place;
  const sign = negative && rounded !== 0n ? "-" : "";
  return `${sign}${withPoint(digits, decimals)}(${boundText(bound, decimals)})${fixed ? "" : `e${shift}`}`;
}

/** Bound in units of the value's last digit, or with its own point where it reaches across the value's. */
function boundText(bound: bigint, decimals: number): string {
  const text = bound.toString();
  if (decimals < 0) return text + "0".repeat(-decimals);
  return decimals > 0 && text.length > decimals ? withPoint(text, decimals) : text;
}

/** Digits with the decimal point set so that `decimals` of them follow it; zeros are added on either side. */
function withPoint(digits: string, decimals: number): string {
  if (decimals < 0) return digits === "0" ? "0" : digits + "0".repeat(-decimals);
  if (decimals === 0) return digits;
  const padded = digits.padStart(decimals + 1, "0");
  return `${padded.slice(0, -decimals)}.${padded.slice(-decimals)}`;
}

const exponentOf = (value: number): number => Number(value.toExponential().split("e")[1]);

/** A double as the exact ratio that it is. */
function ratio(value: number): Ratio {
  if (value === 0) return { numerator: 0n, denominator: 1n };
  // Both loops end exactly: a double is an integer below 2^53 times a power of two.
  let exponent = 0;
  let scaled = value;
  while (!Number.isInteger(scaled)) {
    scaled *= 2;
    exponent++;
  }
  return { numerator: BigInt(scaled), denominator: 1n << BigInt(exponent) };
}

const power = (count: bigint, exponent: number): Ratio =>
  exponent < 0
    ? { numerator: count, denominator: 10n ** BigInt(-exponent) }
    : { numerator: count * 10n ** BigInt(exponent), denominator: 1n };

const add = (a: Ratio, b: Ratio): Ratio => ({
  numerator: a.numerator * b.denominator + b.numerator * a.denominator,
  denominator: a.denominator * b.denominator,
});

const subtract = (a: Ratio, b: Ratio): Ratio => add(a, { ...b, numerator: -b.numerator });

const absolute = (a: Ratio): Ratio => (a.numerator < 0n ? { ...a, numerator: -a.numerator } : a);

/** a / 10^place to the nearest integer, halves away from zero. */
function roundToPlace(a: Ratio, place: number): bigint {
  const { numerator, denominator } = inPlaces(a, place);
  const size = numerator < 0n ? -numerator : numerator;
  const rounded = (2n * size + denominator) / (2n * denominator);
  return numerator < 0n ? -rounded : rounded;
}

/** a / 10^place to the next integer above, for a not negative. */
function ceilToPlace(a: Ratio, place: number): bigint {
  const { numerator, denominator } = inPlaces(a, place);
  return (numerator + denominator - 1n) / denominator;
}

const inPlaces = (a: Ratio, place: number): Ratio =>
  place < 0
    ? { numerator: a.numerator * 10n ** BigInt(-place), denominator: a.denominator }
    : { numerator: a.numerator, denominator: a.denominator * 10n ** BigInt(place) };
