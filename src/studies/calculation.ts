import type { TimeOrder } from "../steppers/stepper.js";
import type { Bounded } from "../units/bounded.js";

/** One line of the list that the verdict rests on. */
export interface Check {
  readonly name: string;
  readonly value: number;
  readonly limit: number;
  readonly passed: boolean;
  /** What the number means, or why it failed, in words. */
  readonly explanation: string;
}

/** What a transmission calculation hands to the study, whichever stepper it used. */
export interface Calculation {
  readonly stepper: string;
  readonly order: TimeOrder;
  readonly transmission: Bounded;
  readonly reflection: Bounded;
  /** Probability still in the structure, or still to arrive, at the end. */
  readonly remaining: number;
  readonly normDrift: number;
  readonly grid: {
    readonly points: number;
    readonly step_nm: number;
    readonly finest_nm: number;
    readonly length_nm: number;
  };
  readonly time: { readonly step_fs: number; readonly end_fs: number; readonly steps: number };
  /** Parts of the transmission's bound, absolute. */
  readonly parts: {
    readonly spacing: number;
    readonly timeStep: number;
    readonly remaining: number;
    /** From the part of the packet that lies beyond the near face from the start. */
    readonly start: number;
    readonly roundOff: number;
  };
  /** Whole calculations that the answer was put together from. */
  readonly runs: readonly RunSummary[];
  readonly checks: readonly Check[];
  /** T at the packet's mean energy, from the same calculations. */
  readonly atMeanEnergy: Bounded;
  /** Total energy (eV) at which most of what got through was carried: the peak of its energy distribution. */
  readonly carryingEnergy: number;
}

/** One whole calculation among those that an answer rests on. */
export interface RunSummary {
  readonly points: number;
  readonly step_nm: number;
  readonly timeStep_fs: number;
  readonly transmission: number;
}

/** A check that passes when value <= limit. */
export function atMost(name: string, value: number, limit: number, explanation: string): Check {
  return { name, value, limit, passed: value <= limit, explanation };
}

/** Progress of a study: a short text and, when known, the share done. */
export type Progress = (text: string, share?: number) => void;

export interface StudyOptions {
  readonly signal?: AbortSignal;
  readonly onProgress?: Progress;
}
