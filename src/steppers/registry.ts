import { chebyshev } from "./chebyshev.js";
import { crankNicolson } from "./crank-nicolson.js";
import { eigenstates } from "./eigenstates.js";
import { splitOperator } from "./split-operator.js";
import type { StepperDefinition } from "./stepper.js";

/** Every stepper; help, docs and the contract tests read this list. */
export const steppers: readonly StepperDefinition[] = [splitOperator, crankNicolson, eigenstates, chebyshev];

/** The stepper of that name, or undefined. */
export function stepperNamed(name: string): StepperDefinition | undefined {
  return steppers.find((stepper) => stepper.name === name);
}
