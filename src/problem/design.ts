import type { Potential } from "../potentials/potential.js";

/** The initial Gaussian packet: psi ~ exp(-(x - start)^2 / (4 width^2) + i k0 x). Internal units (nm, eV). */
export interface PacketDesign {
  /** Mean kinetic energy at the start, hbar^2 k0^2 / (2 m), eV. */
  readonly energy: number;
  /** Standard deviation of |psi|^2 in x, nm. */
  readonly width: number;
  /** The side that the packet comes from. */
  readonly from: "left" | "right";
  /** x0 in nm; chosen by the grid builder when absent. */
  readonly start?: number;
}

/** What the user forced; everything absent is chosen automatically. Internal units (nm, fs). */
export interface Numerics {
  readonly stepper?: string;
  readonly order?: number;
  readonly step?: number;
  readonly points?: number;
  readonly length?: number;
  readonly timeStep?: number;
  readonly end?: number;
  readonly boundary?: "closed";
  /** Relative accuracy asked for. */
  readonly accuracy?: number;
}

/** The immutable problem: everything that a study needs, nothing about how it was written down. */
export interface Design {
  readonly title: string;
  /** SHA-256 of the design's canonical form, 64 hex digits. */
  readonly sha256: string;
  /** Mass of the particle outside the structure, eV fs^2/nm^2. */
  readonly particleMass: number;
  readonly potential: Potential;
  readonly packet: PacketDesign;
  readonly numerics: Numerics;
}

/** Relative accuracy aimed at when none is asked for. */
export const DEFAULT_ACCURACY = 1e-6;
