import type { Bounded } from "../units/bounded.js";

/** How a spectrum is computed: from wavepackets in time, or by the stationary witness. */
export const SPECTRUM_METHODS = ["packet", "stationary"] as const;
export type SpectrumMethod = (typeof SPECTRUM_METHODS)[number];

/** Transmission and reflection of a plane wave at one energy. */
export interface SpectrumRow {
  /** eV above the left level. */
  readonly energy: number;
  readonly transmission: Bounded;
  readonly reflection: Bounded;
}
