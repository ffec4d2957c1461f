import type { Grid } from "../grid/grid.js";
import type { Potential } from "../potentials/potential.js";

/** What a stepper is prepared for. Internal units: nm, eV, fs. */
export interface System {
  readonly grid: Grid;
  readonly potential: Potential;
  /** Mass outside the structure, eV fs^2/nm^2. */
  readonly particleMass: number;
  /** An energy (eV) at which an implicit stepper makes no time error; default 0. Others ignore it. */
  readonly referenceEnergy?: number;
}

/** A stepper made ready for one system, one time step and one order; it owns all its work space. */
export interface Stepper {
  readonly definition: StepperDefinition;
  readonly system: System;
  readonly order: number;
  /** fs */
  readonly timeStep: number;
  /** Advances psi (interleaved, length 2n) in place by one time step. Allocates nothing. `time` is that at the start, fs. */
  advance(psi: Float64Array, time: number): void;
  /** out <- H psi in eV, with the discrete Hamiltonian that this stepper propagates. The arrays must differ. */
  applyHamiltonian(out: Float64Array, psi: Float64Array): void;
  /** V on the nodes as the stepper holds it, eV. */
  readonly potentialOnGrid: Float64Array;
}

/** What a file in this folder exports, and the registry lists. */
export interface StepperDefinition {
  readonly name: string;
  readonly summary: string;
  /** Orders in the time step that can be asked for. */
  readonly orders: readonly number[];
  readonly defaultOrder: number;
  /** The kind of grid that it works on. */
  readonly grid: Grid["ends"];
  /** What one step keeps to round-off. "energy": <H> of the discrete Hamiltonian. */
  readonly conserves: readonly ("norm" | "energy")[];
  readonly source: string;
  /** Says why this stepper cannot do a design and names the one that can; undefined when it can. */
  refusal(potential: Potential): string | undefined;
  /** @throws RangeError when the grid is of the wrong kind, the order is not offered or the time step is not finite and non-zero */
  prepare(system: System, timeStep: number, order?: number): Stepper;
}

/** Shared check of the arguments of `prepare`; returns the order to use. */
export function checkPrepare(
  definition: StepperDefinition,
  system: System,
  timeStep: number,
  order?: number,
): number {
  const chosen = order ?? definition.defaultOrder;
  if (!definition.orders.includes(chosen))
    throw new RangeError(
      `${definition.name}: order must be one of ${definition.orders.join(", ")}; got ${chosen}`,
    );
  if (!Number.isFinite(timeStep) || timeStep === 0)
    throw new RangeError(
      `${definition.name}: a finite time step other than zero is needed, in fs; got ${timeStep}`,
    );
  if (system.grid.ends !== definition.grid)
    throw new RangeError(
      `${definition.name}: a ${definition.grid} grid is needed; got a ${system.grid.ends} one`,
    );
  return chosen;
}
