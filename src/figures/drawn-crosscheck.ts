import type { Crosscheck } from "../studies/crosscheck.js";

/** Height of a crosscheck's figure over its width: a panel over time, and one of differences. */
export const CROSSCHECK_HEIGHT_RATIO = 1.05;

/** How a crosscheck is drawn. */
export interface CrosscheckFigureOptions {
  /** Print size and resolution; defaults as for a map. */
  readonly widthMm?: number;
  readonly heightMm?: number;
  readonly dpi?: number;
}

/** What a drawing needs to know of a crosscheck. */
export type DrawnCrosscheck = Pick<
  Crosscheck,
  "design" | "steppers" | "witness" | "matched" | "checks" | "agree"
>;
