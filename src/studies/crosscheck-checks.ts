import type { Departure } from "../grid/journey.js";
import type { Bounded } from "../units/bounded.js";
import { atMost, type Check } from "./calculation.js";
import { amplitudeAtFace, CLEAR_AMPLITUDE } from "./common-checks.js";
import type { Estimate } from "./estimate.js";
import { type MeasuredOrder, ORDER_TOLERANCE, SPECTRAL_POWER } from "./measured-order.js";
import { COMPARED_COLUMNS, type ComparedColumn, columnOf, largestDifference, type Motion } from "./motion.js";
import type { StateDistance, WitnessAnswer } from "./second-opinions.js";

/** A check of a crosscheck: about one method alone, about two of them, or about an order. Only comparisons decide on `agree`. */
export interface CrosscheckCheck extends Check {
  readonly kind: "basic" | "comparison" | "order";
}

/** What is compared. */
export interface Compared {
  readonly from: Departure;
  readonly steppers: readonly Estimate[];
  readonly witness: WitnessAnswer;
  readonly motions: readonly Motion[];
  readonly states: readonly StateDistance[];
  readonly orders: readonly MeasuredOrder[];
}

/** Largest change of the norm over a run that counts as round-off. */
const NORM_LIMIT = 1e-9;
/** Change of <H>, relative to the packet's own energy, that counts as round-off. */
const ENERGY_LIMIT = 1e-9;

/** Every check, from the most basic to the most derived, so that the first one to fail is the place to look. */
export function crosscheckChecks(compared: Compared): CrosscheckCheck[] {
  const { from, motions, states, orders } = compared;
  return [
    {
      ...atMost(
        "start",
        amplitudeAtFace(from),
        CLEAR_AMPLITUDE,
        "the packet's amplitude at the structure's face at the start of the matched runs, relative to its peak",
      ),
      kind: "basic",
    },
    ...motions.map(
      (motion): CrosscheckCheck => ({
        ...atMost(
          `norm, ${motion.name}`,
          motion.drift.norm,
          NORM_LIMIT,
          "change of the norm over a matched run",
        ),
        kind: "basic",
      }),
    ),
    ...motions.map((motion): CrosscheckCheck => energyCheck(motion, from)),
    ...probabilityChecks(compared, "transmission"),
    ...probabilityChecks(compared, "reflection"),
    ...(motions.length > 1 ? COMPARED_COLUMNS.map((column) => seriesCheck(motions, column)) : []),
    ...states.map(stateCheck),
    ...orders.map(orderCheck),
  ];
}

function energyCheck(motion: Motion, from: Departure): CrosscheckCheck {
  // Only a step that is a function of H keeps <H> to rounding; a splitting keeps it to its own error.
  const limit = Math.max(ENERGY_LIMIT * (from.energy - from.near), motion.seriesErrors.energy);
  return {
    ...atMost(
      `energy, ${motion.name}`,
      motion.drift.energy,
      limit,
      "change of <H> over a matched run in eV, against rounding or the error that refinement shows",
    ),
    kind: "basic",
  };
}

/** Stepper against stepper, then each against the witness: |a - b| within the sum of the two bounds. */
function probabilityChecks(
  { steppers, witness }: Compared,
  what: "transmission" | "reflection",
): CrosscheckCheck[] {
  const named = [
    ...steppers.map((s) => ({ name: s.stepper, value: s[what] })),
    { name: witness.name, value: witness[what] },
  ];
  return named.flatMap((a, i) =>
    named
      .slice(i + 1)
      .map((b): CrosscheckCheck => comparison(`${what}, ${a.name} and ${b.name}`, a.value, b.value)),
  );
}

function comparison(name: string, a: Bounded, b: Bounded): CrosscheckCheck {
  const check = atMost(
    name,
    Math.abs(a.value - b.value),
    a.error + b.error,
    "the two probabilities lie further apart than the sum of their bounds",
  );
  return {
    ...check,
    explanation: check.passed ? "difference, against the sum of the two bounds" : check.explanation,
    kind: "comparison",
  };
}

const COLUMN_WORDS: Readonly<Record<ComparedColumn, string>> = {
  transmission: "transmission over time",
  reflection: "reflection over time",
  x_mean: "mean position over time",
  k_mean: "mean wavenumber over time",
  energy: "mean energy over time",
};

function seriesCheck([a, b]: readonly Motion[], column: ComparedColumn): CrosscheckCheck {
  const apart = largestDifference(columnOf(a.series, column), columnOf(b.series, column));
  return {
    ...atMost(
      COLUMN_WORDS[column],
      apart,
      a.seriesErrors[column] + b.seriesErrors[column],
      "largest difference at a common instant of the matched runs, against the sum of the errors that refinement shows",
    ),
    kind: "comparison",
  };
}

function stateCheck({ between, where, distance, limit }: StateDistance): CrosscheckCheck {
  return {
    ...atMost(
      `state, ${between.join(" and ")}`,
      distance,
      limit,
      `L2 distance of the final states ${where}, phase kept, against the sum of their own errors`,
    ),
    kind: "comparison",
  };
}

function orderCheck({
  stepper,
  of,
  order,
  declared,
  measured,
  passed,
  roundOff,
}: MeasuredOrder): CrosscheckCheck {
  const expected =
    declared === undefined
      ? `faster than any power, shown by ${SPECTRAL_POWER} or more`
      : `${declared} is declared`;
  return {
    kind: "order",
    name: `order in the ${of}, ${stepper}${of === "time step" ? ` of order ${order}` : ""}`,
    value: measured ?? 0,
    limit: declared ?? SPECTRAL_POWER,
    passed,
    explanation: roundOff
      ? `power that the error falls with; ${expected}; round-off was reached`
      : `power that the error falls with; ${expected}, and ${ORDER_TOLERANCE} less still passes`,
  };
}
