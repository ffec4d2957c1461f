import type { Design } from "../problem/design.js";
import { crankNicolson } from "../steppers/crank-nicolson.js";
import { splitOperator } from "../steppers/split-operator.js";

/** Asked for more than this (relative), a smooth structure goes to the split operator, which converges faster there. */
export const SPECTRAL_ACCURACY = 1e-9;

/** The stepper that a design gets: the one it names, or the cheapest that reaches the accuracy. */
export function chooseStepper(design: Design, accuracy: number): string {
  const { stepper } = design.numerics;
  const smooth = design.potential.slopeTransform === undefined && design.potential.uniformMass;
  return stepper ?? (smooth && accuracy < SPECTRAL_ACCURACY ? splitOperator.name : crankNicolson.name);
}
