import type { Design } from "../problem/design.js";
import { type Explanation, forcedOr, stepperChoice } from "./choice.js";
import { planRun } from "./run-plan.js";
import { warningsFor } from "./warnings.js";

/** The choices of a run in true time, for designs that there is no estimate of; `warning` says why. */
export function explainRun(design: Design, warning: string): Explanation {
  const plan = planRun(design);
  const { numerics, packet, potential } = design;
  const { confining } = potential;
  return {
    choices: [
      stepperChoice(design, plan.definition),
      {
        name: "start",
        value: plan.from.packet.center,
        unit: "nm",
        why: forcedOr(
          packet.start !== undefined,
          confining ? "where V is lowest" : "clear of the structure, where |psi| has fallen to round-off",
        ),
      },
      {
        name: "time step",
        value: plan.timeStep,
        unit: "fs",
        why: forcedOr(
          numerics.timeStep !== undefined,
          plan.order === undefined ? "as fine as a map shows" : "small against the packet's own periods",
        ),
      },
      {
        name: "end",
        value: plan.steps * plan.timeStep,
        unit: "fs",
        why: forcedOr(
          numerics.end !== undefined,
          confining ? "two round trips at the mean energy" : "when 3 spreads of k have passed",
        ),
      },
      {
        name: "box length",
        value: plan.length,
        unit: "nm",
        why: forcedOr(
          numerics.length !== undefined,
          confining ? "beyond where the fastest part of the packet turns" : "nothing reaches an end of it",
        ),
      },
      {
        name: "points",
        value: plan.points,
        unit: "",
        why: forcedOr(
          numerics.points !== undefined || numerics.step !== undefined,
          "a fixed share of the shortest wavelength",
        ),
      },
    ],
    warnings: confining
      ? [warning]
      : [warning, ...warningsFor({ ...design, numerics: { stepper: numerics.stepper } }, plan.from)],
  };
}
