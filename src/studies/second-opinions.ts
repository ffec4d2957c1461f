import type { Bounded } from "../units/bounded.js";

/** Name of the witness in results. */
export const WITNESS = "stationary";

/** What the stationary witness says of a packet. */
export interface WitnessAnswer {
  readonly name: typeof WITNESS;
  readonly transmission: Bounded;
  readonly reflection: Bounded;
  /** Energies at which it was asked. */
  readonly energies: number;
}

/** Distance of two final states, beside the sum of their own errors. */
export interface StateDistance {
  readonly between: readonly [string, string];
  readonly where: "everywhere" | "outside the structure";
  readonly distance: number;
  readonly limit: number;
}
