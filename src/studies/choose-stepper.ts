import type { Design } from "../problem/design.js";
import { crankNicolson } from "../steppers/crank-nicolson.js";
import { stepperNamed } from "../steppers/registry.js";
import { splitOperator } from "../steppers/split-operator.js";
import type { StepperDefinition } from "../steppers/stepper.js";
import { DesignLimitError } from "./limits.js";

/** Asked for more than this (relative), a smooth structure goes to the split operator, which converges faster there. */
export const SPECTRAL_ACCURACY = 1e-9;

/** The stepper that a design gets: the one it names, or the cheapest that reaches the accuracy. */
export function chooseStepper(design: Design, accuracy: number): string {
  const { stepper } = design.numerics;
  const smooth = design.potential.slopeTransform === undefined && design.potential.uniformMass;
  return stepper ?? (smooth && accuracy < SPECTRAL_ACCURACY ? splitOperator.name : crankNicolson.name);
}

/**
 * The same as a definition that can do the design at the order that it asks for.
 * @throws DesignLimitError when it cannot, with the reason
 */
export function chosenStepper(design: Design, accuracy: number): StepperDefinition {
  const name = chooseStepper(design, accuracy);
  const definition = stepperNamed(name);
  if (definition === undefined) throw new DesignLimitError("numerics.stepper", `there is no stepper ${name}`);
  const refusal = definition.refusal(design.potential);
  if (refusal) throw new DesignLimitError("numerics.stepper", refusal);
  const { order } = design.numerics;
  if (order !== undefined && !definition.orders.includes(order))
    throw new DesignLimitError(
      "numerics.order",
      definition.defaultOrder === "exact"
        ? `${name} is exact in time, so there is no order to choose; leave this out`
        : `${name} has the orders ${definition.orders.join(", ")}; got ${order}`,
    );
  return definition;
}
