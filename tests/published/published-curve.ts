import type { Potential } from "../../src/potentials/potential.js";

/**
 * Transmission of plane waves at some energies, printed to 16 digits or fewer: closed forms computed for this project with 40 digits or more,
 * CODATA 2022.
 */
export interface PublishedCurve {
  readonly title: string;
  /** Particle's mass, m_e. */
  readonly mass: number;
  readonly potential: Potential;
  /** Total energy (eV) and T. */
  readonly points: readonly (readonly [energy: number, transmission: number])[];
  /** Relative: the last digit printed, and the rounding of the decimals that the potential is made from. */
  readonly printed?: number;
  /** Energies of peaks that ring for so long that the packet's spectrum takes more than a test may: only the witness is asked. */
  readonly ringing?: readonly number[];
  /** Width of the bound that the witness may have, relative; 2.5e-12, and 1e-11 for masses above 100, where it is left out. */
  readonly widest?: number;
  /** Why only the witness is asked. */
  readonly witnessOnly?: string;
}

/** The curves of one closed form, under its source. */
export interface PublishedForm {
  readonly source: string;
  readonly curves: readonly PublishedCurve[];
}

/** Half a unit in the last of 15 to 16 digits, and some roundings of the energies and lengths in decimal. */
export const PRINTED = 5e-15;
