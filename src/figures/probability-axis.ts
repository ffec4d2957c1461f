import type { Axis } from "./axis.js";
import { type Label, symbol, textWidth } from "./text.js";
import { linearTicks, powerOfTen, superscript, type Tick } from "./ticks.js";

/** Room above the greatest value, relative to the height of the axis, so that no line runs along the frame. */
const AIR = 0.05;
/** From here on a linear axis goes to 1, the greatest probability there is; below it ends near the greatest value. */
const WHOLE_FROM = 0.4;
/** Least distance of the labels of an axis, in ems. */
const LABEL_DISTANCE = 1.7;
/** Least height of a decade that shows its digits 2 to 9 as ticks, in ems. */
const DIGITS_FROM = 1.5;
/** Decades between labels, the first of these that leaves room for them. */
const STRIDES = [1, 2, 3, 5, 10, 20, 30, 50, 100, 200];

/** "transmission T" with a factor where there is one; the symbol alone where the axis is too short for the word. */
function probabilityLabel(height: number, em: number, factor = ""): Label {
  const word = "transmission ";
  const rest: Label = [symbol("T"), { text: factor }];
  return textWidth(`${word}T${factor}`, em) < height ? [{ text: word }, ...rest] : rest;
}

/**
 * The linear axis of a probability, from 0.
 *
 * @param greatest the greatest value to be shown
 * @param height of the axis, and the size of its letters, in CSS pixels
 */
export function linearProbabilityAxis(greatest: number, height: number, em: number): Axis {
  const top = greatest > WHOLE_FROM ? 1 : greatest > 0 ? greatest : 1;
  const power = Math.floor(Math.log10(top));
  const exponent = power < -2 ? power : 0;
  const unit = 10 ** exponent;
  const to = top * (1 + AIR);
  const count = Math.max(2, Math.min(6, Math.floor(height / (LABEL_DISTANCE * em))));
  const ticks = linearTicks(0, to / unit, count).map(({ value, label }) => ({ value: value * unit, label }));
  const factor = exponent === 0 ? "" : ` (10${superscript(exponent)})`;
  return { from: 0, to, ticks, label: probabilityLabel(height, em, factor) };
}

/**
 * The logarithmic axis of a probability over whole decades. Its position takes any value: zero and what lies below the axis stand at
 * its lower end.
 *
 * @param least the least value to be shown, above zero
 * @param greatest the greatest one
 * @param height of the axis, and the size of its letters, in CSS pixels
 */
export function logProbabilityAxis(least: number, greatest: number, height: number, em: number): Axis {
  // The small shifts keep an exact power of ten in its own decade whatever the logarithm's rounding.
  const highest = Math.ceil(Math.log10(greatest) - 1e-9);
  const lowest = Math.min(Math.floor(Math.log10(least) + 1e-9), highest - 1);
  const decades = highest - lowest;
  const top = highest + AIR * decades;
  const decade = height / (top - lowest);
  const stride = STRIDES.find((each) => each * decade >= LABEL_DISTANCE * em) ?? 500;
  const ticks: Tick[] = [];
  const minor: number[] = [];
  for (let power = lowest; power <= highest; power++) {
    if (power % stride === 0) ticks.push({ value: 10 ** power, label: powerOfTen(power) });
    // Ticks closer than a tenth of a letter would be a grey bar.
    else if (decade > 0.1 * em) minor.push(10 ** power);
    if (power < highest && decade > DIGITS_FROM * em)
      for (let digit = 2; digit < 10; digit++) minor.push(digit * 10 ** power);
  }
  return {
    from: 10 ** lowest,
    to: 10 ** top,
    ticks,
    minor,
    label: probabilityLabel(height, em),
    position: (value) => (value > 0 ? Math.max(0, (Math.log10(value) - lowest) / (top - lowest)) : 0),
  };
}
