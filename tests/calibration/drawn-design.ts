import type { Transmission } from "../potentials/closed-forms.js";

export type Family = "layered" | "smooth";

/** A design drawn at random: its text is all that the calculation sees, the rest says what it was meant to be. */
export interface DrawnDesign {
  readonly seed: number;
  readonly index: number;
  readonly family: Family;
  /** What was sought: "thick", "resonance", "above", "step" ... */
  readonly theme: string;
  readonly text: string;
  /** The closed form or the tests' own transfer matrix for incidence from the left, where there is one: the arbiter in a dispute. */
  readonly closedForm?: Transmission;
  /** Level on the right, eV. */
  readonly levelRight: number;
  /** The packet's mean wavenumber in units of its spread, 2 sigma k0. */
  readonly spreads: number;
}

/** A structure without its packet. */
export interface Structure {
  readonly theme: string;
  /** Lines of the design's `potential:`, without indentation. */
  readonly potential: readonly string[];
  /** Particle's mass, m_e. */
  readonly mass: number;
  readonly levelRight: number;
  /** Highest V, eV. */
  readonly top: number;
  /** Length over which something happens, nm: what the packet's width is drawn around. */
  readonly length: number;
  /** integral kappa dx = integral sqrt(2 m (V - E)) / hbar dx over the places where V > E, E in eV, total. */
  readonly opacity: (energy: number) => number;
  readonly closedForm?: Transmission;
}

/** The packet in the design's own words: eV, nm. */
export interface DrawnPacket {
  readonly energy: number;
  readonly width: number;
  readonly from: "left" | "right";
}

/** To so many digits: the text holds the number, and everything else is computed from the same rounded one. */
export function rounded(x: number, digits = 4): number {
  return Number(x.toPrecision(digits));
}
