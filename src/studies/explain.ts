import { alignedPoints } from "../grid/aligned.js";
import type { Departure } from "../grid/journey.js";
import { DEFAULT_ACCURACY, type Design } from "../problem/design.js";
import { stepperNamed } from "../steppers/registry.js";
import { splitOperator } from "../steppers/split-operator.js";
import { chooseStepper } from "./choose-stepper.js";
import { planCircle } from "./circle-plan.js";
import { extent, planClosed } from "./closed-plan.js";
import { REFINEMENTS } from "./crank-nicolson-transmission.js";
import { DesignLimitError } from "./limits.js";
import { prepare } from "./prepare.js";
import { warningsFor } from "./warnings.js";

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

/**
 * Every numeric choice of an estimate with its reason, and what would be warned about; computes no transmission.
 * The end and the number of refinements are where the calculation starts from: it moves them out while too much remains or the bound is too wide.
 */
export function explainPlan(design: Design): Explanation {
  const { potential, numerics } = design;
  if (potential.confining) return explainConfined(design);
  const accuracy = numerics.accuracy ?? DEFAULT_ACCURACY;
  const name = chooseStepper(design, accuracy);
  const refusal = stepperNamed(name)?.refusal(potential);
  if (refusal) throw new DesignLimitError("numerics.stepper", refusal);
  const spectral = name === splitOperator.name;
  const { from } = spectral ? planCircle(design, accuracy) : planClosed(design);
  const numeric = spectral ? circleChoices(design, accuracy) : closedChoices(design);
  const choices = [stepperChoice(design, name), ...packetChoices(design, from), ...numeric];
  return { choices, warnings: warningsFor(design, from) };
}

function forcedOr(forced: boolean, why: string): string {
  return forced ? "as the design asks" : why;
}

function stepperChoice({ numerics, potential }: Design, name: string): Choice {
  const layered = potential.slopeTransform !== undefined || !potential.uniformMass;
  const why =
    name === splitOperator.name
      ? "V is smooth and the accuracy asked for is high: spectral in space"
      : layered
        ? "every interface stands on a node, and the error is a clean series in the spacing squared"
        : "reaches the accuracy asked for in tens of steps, since T does not depend on the time step";
  return { name: "stepper", value: name, unit: "", why: forcedOr(numerics.stepper !== undefined, why) };
}

function packetChoices({ packet }: Design, from: Departure): Choice[] {
  const clear = from.distance / packet.width;
  return [
    { name: "wavenumber", value: from.k0, unit: "1/nm", why: "k0 = sqrt(2 m E) / hbar" },
    {
      name: "start",
      value: from.packet.center,
      unit: "nm",
      why: forcedOr(
        packet.start !== undefined,
        `${clear.toFixed(0)} widths clear of the structure, where |psi| has fallen to round-off`,
      ),
    },
    {
      name: "lowest energy",
      value: from.lowest,
      unit: "eV",
      why: "6 spreads of k below the mean; slower parts are followed until they do not matter",
    },
    { name: "highest energy", value: from.highest, unit: "eV", why: "6 spreads of k above the mean" },
  ];
}

function closedChoices(design: Design): Choice[] {
  const plan = planClosed(design);
  const { numerics } = design;
  const [a, b] = plan.forced ? [1, 1] : [REFINEMENTS[0], REFINEMENTS[4]];
  const { widest, finest, length } = extent(plan, 1);
  const spacingWhy = plan.forced
    ? "as the design asks: one calculation on this grid, its error measured against an automatic one"
    : "a fixed share of the local wavelength or decay length, stretch by stretch; refined together until the extrapolation is within the accuracy";
  return [
    {
      name: "order",
      value: plan.order,
      unit: "",
      why: forcedOr(
        numerics.order !== undefined,
        "the transmission does not depend on the time step, so the cheapest order will do",
      ),
    },
    {
      name: "time step",
      value: plan.timeStep,
      unit: "fs",
      why: forcedOr(
        numerics.timeStep !== undefined,
        "as large as lets the packet's slowest part, which decides the end, pass at half its speed or better; fast parts may be slowed to its pace",
      ),
    },
    {
      name: "end",
      value: plan.end,
      unit: "fs",
      why: forcedOr(
        numerics.end !== undefined,
        "when the slow edge of the packet has passed; moved out while what remains inside or on its way matters",
      ),
    },
    { name: "steps", value: plan.steps, unit: "", why: "end over time step" },
    {
      name: "box length",
      value: length,
      unit: "nm",
      why: forcedOr(
        numerics.length !== undefined,
        "nothing that an end of the box sends back gets to the structure before the end",
      ),
    },
    { name: "widest spacing", value: widest / b, unit: "nm", why: spacingWhy },
    {
      name: "finest spacing",
      value: finest / b,
      unit: "nm",
      why: "every interface stands on a node, so spacings differ by layer",
    },
    {
      name: "points",
      value:
        a === b
          ? alignedPoints(plan.stretches, a)
          : `${alignedPoints(plan.stretches, a)} to about ${alignedPoints(plan.stretches, b)}`,
      unit: "",
      why: plan.forced ? "box over spacing" : "successive calculations, extrapolated to vanishing spacing",
    },
  ];
}

function circleChoices(design: Design, accuracy: number): Choice[] {
  const plan = planCircle(design, accuracy);
  const { numerics } = design;
  return [
    {
      name: "order",
      value: plan.order,
      unit: "",
      why: forcedOr(
        numerics.order !== undefined,
        "least work for this accuracy; where V has jumps the kinetic phase limits the step, not the order",
      ),
    },
    {
      name: "time step",
      value: plan.timeStep,
      unit: "fs",
      why: forcedOr(
        plan.forcedTime,
        "to start from; halved until two whole calculations agree, and where V has jumps until no drift turns the fastest momentum by more than pi",
      ),
    },
    {
      name: "end",
      value: plan.end,
      unit: "fs",
      why: forcedOr(
        numerics.end !== undefined,
        "when the slow edge of the packet has passed; moved out while what remains matters",
      ),
    },
    {
      name: "box length",
      value: plan.circle.points * plan.circle.step,
      unit: "nm",
      why: forcedOr(numerics.length !== undefined, "neither front gets round the circle before the end"),
    },
    {
      name: "spacing",
      value: plan.circle.step,
      unit: "nm",
      why: forcedOr(plan.forcedSpace, "to start from; halved until two whole calculations agree"),
    },
    {
      name: "points",
      value: plan.circle.points,
      unit: "",
      why: "a power of two, for the fast Fourier transform",
    },
  ];
}

function explainConfined(design: Design): Explanation {
  const run = prepare(design);
  const { grid } = run.stepper.system;
  const n = grid.x.length;
  return {
    choices: [
      stepperChoice(design, run.stepper.definition.name),
      {
        name: "start",
        value: run.from.packet.center,
        unit: "nm",
        why: forcedOr(design.packet.start !== undefined, "where V is lowest"),
      },
      {
        name: "time step",
        value: run.stepper.timeStep,
        unit: "fs",
        why: "small against the packet's own periods",
      },
      { name: "end", value: run.end, unit: "fs", why: "two round trips at the mean energy" },
      {
        name: "box length",
        value: grid.x[n - 1] - grid.x[0],
        unit: "nm",
        why: "beyond where the fastest part of the packet turns",
      },
      { name: "points", value: n, unit: "", why: "a fixed share of the shortest wavelength" },
    ],
    warnings: [
      `The ${design.potential.shape} potential confines the particle, so nothing is transmitted: use "postern map", not estimate.`,
    ],
  };
}
