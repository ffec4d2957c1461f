import type { Design } from "../problem/design.js";
import type { StepperDefinition } from "../steppers/stepper.js";

/** One choice of the grid builder with its reason. `unit` is "nm", "fs", "1/nm", "eV" or "" . */
export interface Choice {
  readonly name: string;
  readonly value: number | string;
  readonly unit: "nm" | "fs" | "1/nm" | "eV" | "";
  readonly why: string;
}

export interface Explanation {
  readonly choices: readonly Choice[];
  readonly warnings: readonly string[];
}

/** The reason for a choice, unless the user made it. */
export function forcedOr(forced: boolean, why: string): string {
  return forced ? "as the design asks" : why;
}

/** Which stepper, and why. */
export function stepperChoice({ numerics, potential }: Design, { name, grid }: StepperDefinition): Choice {
  const layered = potential.slopeTransform !== undefined || !potential.uniformMass;
  const why =
    grid === "periodic"
      ? "V is smooth and the accuracy asked for is high: spectral in space"
      : layered
        ? "every interface stands on a node, and the error is a clean series in the spacing squared"
        : "reaches the accuracy asked for in tens of steps, since T does not depend on the time step";
  return { name: "stepper", value: name, unit: "", why: forcedOr(numerics.stepper !== undefined, why) };
}
