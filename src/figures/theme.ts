/** Colours of lines and areas; text and lines reach a contrast of 4.5 to 1 on white (WCAG 2.1, 1.4.3). */
export const INK = "#1b1f27";
export const PROFILE_LINE = "#1f3352";
export const PROFILE_FILL = "#cdd6e4";
export const MASS_SHADE = "#f6e3bd";
export const ENERGY_LINE = "#b3400f";
export const REFLECTION_LINE = "#1f6b4a";
export const RESONANCE_LINE = "#7a1f6b";
/** Where nothing can be known, such as below round-off. */
export const HIDDEN_FILL = "#e3e3e6";
export const PAPER = "#ffffff";

/** Parts of the base font size. */
export const TICK_TEXT = 0.92;
export const TITLE_TEXT = 1.06;
export const TICK_LENGTH = 0.32;
export const MINOR_TICK_LENGTH = 0.19;
export const THIN = 0.055;
export const THICK = 0.11;

/** CSS pixels in a millimetre and in a point (CSS Values and Units 3, 5.2). */
export const PX_PER_MM = 96 / 25.4;
export const PX_PER_POINT = 96 / 72;

/** Base font size, in points, of a figure 160 mm wide: 6 pt is left when it is printed at 80 mm. */
const BASE_POINTS = 12;
/** Smaller figures keep at least this, in points: tick labels of 5.9 pt. */
const LEAST_POINTS = 6.4;

/** A flat figure gets the letters of one with this width over its height. */
const GREATEST_ASPECT = 2;

/** The base font size (em) of a figure in CSS pixels. */
export function baseSize(widthMm: number, heightMm: number): number {
  const width = Math.min(widthMm, GREATEST_ASPECT * heightMm);
  return Math.max((BASE_POINTS * width) / 160, LEAST_POINTS) * PX_PER_POINT;
}
