import { alignedPoints } from "../grid/aligned.js";
import type { Departure } from "../grid/journey.js";
import { DEFAULT_ACCURACY, type Design } from "../problem/design.js";
import { type Choice, type Explanation, forcedOr, stepperChoice } from "./choice.js";
import { chosenStepper } from "./choose-stepper.js";
import { planCircle } from "./circle-plan.js";
import { extent, planClosed } from "./closed-plan.js";
import { REFINEMENTS } from "./crank-nicolson-transmission.js";
import { explainRun } from "./explain-run.js";
import { warningsFor } from "./warnings.js";

export type { Choice, Explanation } from "./choice.js";

/**
 * Every numeric choice of an estimate with its reason, and what would be warned about; computes no transmission.
 * The end and the number of refinements are where the calculation starts from: it moves them out while too much remains or the bound is too wide.
 */
export function explainPlan(design: Design): Explanation {
  const { potential, numerics } = design;
  if (potential.confining)
    return explainRun(
      design,
      `The ${potential.shape} potential confines the particle, so nothing is transmitted: use "postern map", not estimate.`,
    );
  const accuracy = numerics.accuracy ?? DEFAULT_ACCURACY;
  const definition = chosenStepper(design, accuracy);
  const spectral = definition.grid === "periodic";
  if (!spectral && definition.defaultOrder === "exact")
    return explainRun(
      design,
      `The stepper ${definition.name} follows a packet in time: use "postern map", not estimate.`,
    );
  const { from } = spectral ? planCircle(design, accuracy) : planClosed(design);
  const numeric = spectral ? circleChoices(design, accuracy) : closedChoices(design);
  const choices = [stepperChoice(design, definition), ...packetChoices(design, from), ...numeric];
  return { choices, warnings: warningsFor(design, from) };
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
  const exact = plan.order === "exact";
  return [
    {
      name: "order",
      value: plan.order,
      unit: "",
      why: exact
        ? "a step of any length makes no error but rounding"
        : forcedOr(
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
        exact
          ? "of no consequence; so many that the last tenth of the run can be looked at by itself"
          : "to start from; halved until two whole calculations agree, and where V has jumps until no drift turns the fastest momentum by more than pi",
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
