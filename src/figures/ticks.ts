import { format } from "d3-format";
import { scaleLinear } from "d3-scale";

/** One tick: its value in the unit of its axis, and its label with a true minus sign (U+2212). */
export interface Tick {
  readonly value: number;
  readonly label: string;
}

/** Round values between two ends (either order), about as many as asked for, all with the same number of decimals. */
export function linearTicks(from: number, to: number, count: number): Tick[] {
  const scale = scaleLinear().domain([from, to]);
  const label = scale.tickFormat(count, "f");
  return scale.ticks(count).map((value) => ({ value, label: label(value) }));
}

/** The same along a line of text `room` px long: no more ticks than leave `gap` px between the labels. */
export function fittingTicks(
  from: number,
  to: number,
  count: number,
  room: number,
  gap: number,
  widthOf: (label: string) => number,
): Tick[] {
  for (let wanted = count; ; wanted--) {
    const ticks = linearTicks(from, to, wanted);
    if (ticks.length < 2 || wanted <= 2) return ticks;
    const apart = (room * (ticks[1].value - ticks[0].value)) / (to - from);
    if (apart >= Math.max(...ticks.map(({ label }) => widthOf(label))) + gap) return ticks;
  }
}

const SUPERSCRIPTS: Readonly<Record<string, string>> = {
  "-": "⁻",
  "0": "⁰",
  "1": "¹",
  "2": "²",
  "3": "³",
  "4": "⁴",
  "5": "⁵",
  "6": "⁶",
  "7": "⁷",
  "8": "⁸",
  "9": "⁹",
};

/** An integer as superscript signs. */
export const superscript = (integer: number): string =>
  [...String(integer)].map((sign) => SUPERSCRIPTS[sign]).join("");

/** 10 to an integer power as figures print it; 1 and 10 plainly. */
export const powerOfTen = (exponent: number): string =>
  exponent === 0 ? "1" : exponent === 1 ? "10" : `10${superscript(exponent)}`;

/** A number for a label: up to `digits` significant ones, no trailing zeros, powers of ten beyond 1e-3 to 1e4. */
export function labelNumber(value: number, digits = 3): string {
  const size = Math.abs(value);
  if (value === 0 || (size >= 1e-3 && size < 1e4)) return format(`.${digits}~r`)(value);
  const [mantissa, exponent] = format(`.${digits - 1}~e`)(value)
    .replace("−", "-")
    .split("e");
  return `${mantissa.replace("-", "−")}×${powerOfTen(Number(exponent))}`;
}
