import type { Bounded } from "../../src/units/bounded.js";
import type { Family } from "./drawn-design.js";
import type { Reference } from "./witness.js";

/** A probability with its bound held against a reference with its own. */
export interface Comparison {
  readonly value: number;
  readonly error: number;
  readonly reference: number;
  readonly referenceError: number;
  /** |value - reference|. */
  readonly difference: number;
  /** The distance is more than both bounds together. */
  readonly escaped: boolean;
  /** error / max(difference, what the reference can tell); `floored` where the latter decided, so that the true ratio is larger. */
  readonly ratio: number;
  readonly floored: boolean;
}

/** The parts of an estimate's bound. */
export const PARTS = ["spacing", "timeStep", "remaining", "start", "roundOff"] as const;
export type Part = (typeof PARTS)[number];

export interface EstimateRow {
  readonly verdict: "trusted" | "doubtful";
  /** Names of the checks that failed, and what they said. */
  readonly failed: readonly { readonly name: string; readonly value: number; readonly why: string }[];
  readonly stepper: string;
  readonly points: number;
  readonly steps: number;
  /** T of each whole calculation, in their order. */
  readonly runs: readonly number[];
  /** Wall time, and processor time, which is less sensitive to other work on the machine. */
  readonly seconds: number;
  readonly processor: number;
  readonly parts: Readonly<Record<Part, number>>;
  /** The largest part of the bound. */
  readonly dominant: Part;
  readonly transmission: Comparison;
  readonly reflection: Comparison;
}

export interface SpectrumSample {
  /** Total energy, eV. */
  readonly energy: number;
  readonly transmission: Comparison;
  readonly reflection: Comparison;
}

/** What became of one drawn design. */
export interface Row {
  readonly index: number;
  readonly family: Family;
  readonly theme: string;
  readonly text: string;
  /** "refused" by the library with a reason, "stopped" by our own patience, "crashed" by anything else. */
  readonly outcome: "answered" | "refused" | "stopped" | "crashed";
  readonly message?: string;
  readonly reference?: Reference;
  /** The closed form beside it, where an escape has to be judged. */
  readonly arbiter?: Reference;
  readonly estimate?: EstimateRow;
  readonly spectrum?: {
    readonly seconds: number;
    /** T below which the spectrum says that round-off may hide it. */
    readonly floor: number;
    readonly samples: readonly SpectrumSample[];
  };
}

/** Units in the last place of the reference below which no difference can be told. */
const LAST_PLACES = 4;

export function compare({ value, error }: Bounded, reference: Bounded): Comparison {
  const difference = Math.abs(value - reference.value);
  const floor = Math.max(
    reference.error,
    LAST_PLACES * Number.EPSILON * Math.abs(reference.value),
    Number.MIN_VALUE,
  );
  return {
    value,
    error,
    reference: reference.value,
    referenceError: reference.error,
    difference,
    escaped: !(difference <= error + reference.error),
    ratio: error / Math.max(difference, floor),
    floored: difference < floor,
  };
}

export const comparisons = ({ estimate, spectrum }: Row): Comparison[] => [
  ...(estimate ? [estimate.transmission, estimate.reflection] : []),
  ...(spectrum?.samples.flatMap(({ transmission, reflection }) => [transmission, reflection]) ?? []),
];

export const hasEscaped = (row: Row): boolean => comparisons(row).some(({ escaped }) => escaped);
