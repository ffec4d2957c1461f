import { kineticEnergy, wavenumberOf } from "../packets/gaussian.js";
import { HBAR } from "../units/constants.js";
import type { Scatterer, ScatteringEnergy } from "./scattering.js";

/** One place on the axis: the energies, and the wavenumber on the near side with its slope dk/ds. */
export interface AxisPoint extends ScatteringEnergy {
  readonly k: number;
  readonly slope: number;
}

/**
 * The variable s in which energies are integrated: the wavenumber on the side whose level is higher. Both T and everything else is smooth in it
 * down to s = 0, where it starts in proportion to s.
 */
export class EnergyAxis {
  private readonly farSets: boolean;
  /** Least wavenumber on the near side at which anything is transmitted, 1/nm. */
  readonly leastK: number;

  constructor(private readonly scatterer: Scatterer) {
    const { near, far, nearMass } = scatterer;
    this.farSets = far > near;
    this.leastK = this.farSets ? wavenumberOf(far - near, nearMass) : 0;
  }

  /** s of a wavenumber k >= leastK on the near side. */
  of(k: number): number {
    const { near, far, nearMass, farMass } = this.scatterer;
    if (!this.farSets) return k;
    return wavenumberOf(Math.max(0, kineticEnergy(k, nearMass) - (far - near)), farMass);
  }

  at(s: number): AxisPoint {
    const { near, far, nearMass, farMass } = this.scatterer;
    if (!this.farSets) {
      const kinetic = kineticEnergy(s, nearMass);
      return { energy: near + kinetic, near: kinetic, far: kinetic + (near - far), k: s, slope: 1 };
    }
    const kinetic = kineticEnergy(s, farMass);
    const above = kinetic + (far - near);
    const k = wavenumberOf(above, nearMass);
    return { energy: far + kinetic, near: above, far: kinetic, k, slope: (nearMass * s) / (farMass * k) };
  }

  /** k on the near side and dk/dE (1/(eV nm)) at a total energy above both levels. */
  perEnergy(energy: number): { readonly k: number; readonly slope: number } {
    const { near, nearMass } = this.scatterer;
    const k = wavenumberOf(energy - near, nearMass);
    return { k, slope: nearMass / (HBAR * HBAR * k) };
  }

  /** s of a total energy. */
  ofEnergy(energy: number): number {
    const { near, far, nearMass, farMass } = this.scatterer;
    return this.farSets
      ? wavenumberOf(Math.max(0, energy - far), farMass)
      : wavenumberOf(Math.max(0, energy - near), nearMass);
  }
}
