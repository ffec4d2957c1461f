import { departure } from "../grid/journey.js";
import { DEFAULT_ACCURACY, type Design } from "../problem/design.js";
import type { StepperDefinition } from "../steppers/stepper.js";
import type { Bounded } from "../units/bounded.js";
import { atMost, type Calculation, type Check, type StudyOptions } from "./calculation.js";
import { chosenStepper } from "./choose-stepper.js";
import { relativeError } from "./common-checks.js";
import { crankNicolsonTransmission } from "./crank-nicolson-transmission.js";
import { isForced } from "./forced.js";
import { DesignLimitError } from "./limits.js";
import { type SplitOperatorOptions, splitOperatorTransmission } from "./split-operator-transmission.js";
import { tailNote, warningsFor } from "./warnings.js";

/** The answer to a design: probabilities with bounds, and what the verdict rests on. */
export interface Estimate extends Calculation {
  readonly design: { readonly title: string; readonly sha256: string };
  /** Relative accuracy of the transmission: what was asked for and what the bound says was reached. */
  readonly accuracy: { readonly asked: number; readonly reached: number };
  /** Mean energy of the packet (eV, total) and the share of it that moves away from the structure from the start. */
  readonly meanEnergy: number;
  readonly backward: number;
  readonly verdict: "trusted" | "doubtful";
  /** What a reader should know, in sentences. */
  readonly notes: readonly string[];
}

/**
 * Transmission and reflection of a design's packet, with bounds and a verdict.
 * @returns value and bound, what remains, checks; `verdict` is "trusted" when every check passed and the bound is within the accuracy asked for.
 * @throws DesignLimitError when the design cannot be computed as written; rejects with the signal's reason when stopped
 * Cost: three to five whole calculations. Source: refinement by Richardson extrapolation, see numerics/extrapolation.ts.
 */
export async function estimate(design: Design, options: SplitOperatorOptions = {}): Promise<Estimate> {
  if (design.potential.confining)
    throw new DesignLimitError(
      "potential",
      `the ${design.potential.shape} potential confines the particle on both sides, so nothing is transmitted; use "postern map" to see the packet move`,
    );
  const accuracy = design.numerics.accuracy ?? DEFAULT_ACCURACY;
  const calculate = calculationBy(chosenStepper(design, accuracy));
  const own = await calculate(design, accuracy, options);
  const calculation = isForced(design.numerics)
    ? await heldAgainstAutomatic(own, design, accuracy, options)
    : own;
  return judged(design, calculation, accuracy);
}

/** @throws DesignLimitError for a stepper that follows a packet in time but takes no whole calculations that could be refined */
function calculationBy({ name, grid, defaultOrder }: StepperDefinition) {
  if (grid === "periodic") return splitOperatorTransmission;
  if (defaultOrder === "exact")
    throw new DesignLimitError(
      "numerics.stepper",
      `${name} follows a packet in time, as "postern map" shows it; an estimate, which refines its grid, needs crank-nicolson, split-operator or chebyshev`,
    );
  return crankNicolsonTransmission;
}

/**
 * A calculation with forced numerics cannot refine what was forced, so its bound is measured from outside: the
 * distance to an automatic Crank-Nicolson calculation plus that one's own bound.
 */
async function heldAgainstAutomatic(
  own: Calculation,
  design: Design,
  accuracy: number,
  options: StudyOptions,
): Promise<Calculation> {
  const automatic = await crankNicolsonTransmission(
    { ...design, numerics: {} },
    Math.min(accuracy, DEFAULT_ACCURACY),
    options,
  );
  const widen = (mine: Bounded, other: Bounded): Bounded => ({
    value: mine.value,
    error: Math.abs(mine.value - other.value) + other.error,
  });
  const transmission = widen(own.transmission, automatic.transmission);
  const check = atMost(
    "forced numerics",
    relativeError(transmission.error, own.transmission.value),
    accuracy,
    "relative distance to an automatic calculation, plus that one's own bound",
  );
  return {
    ...own,
    transmission,
    parts: { ...own.parts, spacing: Math.abs(own.transmission.value - automatic.transmission.value) },
    reflection: widen(own.reflection, automatic.reflection),
    atMeanEnergy: widen(own.atMeanEnergy, automatic.atMeanEnergy),
    checks: [...own.checks.filter((c) => c.name !== "spacing"), check],
  };
}

function judged(design: Design, calculation: Calculation, accuracy: number): Estimate {
  const { value, error } = calculation.transmission;
  const from = departure(design);
  const reached = relativeError(error, value);
  const checks: Check[] = [
    ...calculation.checks,
    atMost(
      "accuracy",
      reached,
      accuracy,
      "bound of the transmission relative to its value, against the accuracy asked for",
    ),
  ].map((check) => ({ ...check, value: Number.isFinite(check.value) ? check.value : Number.MAX_VALUE }));
  return {
    ...calculation,
    design: { title: design.title, sha256: design.sha256 },
    accuracy: { asked: accuracy, reached },
    meanEnergy: from.energy,
    backward: from.backward,
    checks,
    verdict: checks.every((check) => check.passed) ? "trusted" : "doubtful",
    notes: [...warningsFor(design, from), tailNote(from, calculation.carryingEnergy)].filter(
      (note) => note !== undefined,
    ),
  };
}
