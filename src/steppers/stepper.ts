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

/** The order in the time step, or "exact" where a step of any length makes no error but rounding. */
export type TimeOrder = number | "exact";

/** A stepper made ready for one system, one time step and one order; it owns all its work space. */
export interface Stepper {
  readonly definition: StepperDefinition;
  readonly system: System;
  readonly order: TimeOrder;
  /** fs */
  readonly timeStep: number;
  /** Advances psi (interleaved, length 2n) in place by one time step. Allocates nothing. `time` is that at the start, fs. */
  advance(psi: Float64Array, time: number): void;
  /** out <- H psi in eV, with the discrete Hamiltonian that this stepper propagates. The arrays must differ. */
  applyHamiltonian(out: Float64Array, psi: Float64Array): void;
  /** V on the nodes as the stepper holds it, eV. */
  readonly potentialOnGrid: Float64Array;
}

/** What a file in this folder exports, and the registry lists. `Order` is narrower for one that is known to have orders. */
export interface StepperDefinition<Order extends TimeOrder = TimeOrder> {
  readonly name: string;
  readonly summary: string;
  /** Orders in the time step that can be asked for; none for a stepper that is exact in time. */
  readonly orders: readonly number[];
  /** What is taken unless asked otherwise: one of `orders`, or "exact" when there are none. */
  readonly defaultOrder: Order;
  /** The kind of grid that it works on. */
  readonly grid: Grid["ends"];
  /** What one step keeps to round-off. "energy": <H> of the discrete Hamiltonian. */
  readonly conserves: readonly ("norm" | "energy")[];
  readonly source: string;
  /** Says why this stepper cannot do a design and names the one that can; undefined when it can. */
  refusal(potential: Potential): string | undefined;
  /** @throws RangeError when the grid is of the wrong kind, the order is not offered, the time step is not finite and non-zero, or `refusal` says so */
  prepare(system: System, timeStep: number, order?: number): Stepper;
}

/**
 * Shared check of the arguments of `prepare`, for a stepper with orders to choose from; returns the order to use.
 * @throws RangeError
 */
export function checkPrepare(
  definition: StepperDefinition,
  system: System,
  timeStep: number,
  order: TimeOrder = definition.defaultOrder,
): number {
  if (typeof order !== "number" || !definition.orders.includes(order))
    throw new RangeError(
      `${definition.name}: order must be one of ${definition.orders.join(", ")}; got ${order}`,
    );
  checkSystem(definition, system, timeStep);
  return order;
}

/** The same for a stepper that is exact in time. @throws RangeError */
export function checkPrepareExact(
  definition: StepperDefinition,
  system: System,
  timeStep: number,
  order?: number,
): void {
  if (order !== undefined)
    throw new RangeError(`${definition.name}: it is exact in time, so no order can be chosen; got ${order}`);
  checkSystem(definition, system, timeStep);
}

function checkSystem(definition: StepperDefinition, { grid, potential }: System, timeStep: number): void {
  if (!Number.isFinite(timeStep) || timeStep === 0)
    throw new RangeError(
      `${definition.name}: a finite time step other than zero is needed, in fs; got ${timeStep}`,
    );
  if (grid.ends !== definition.grid)
    throw new RangeError(`${definition.name}: a ${definition.grid} grid is needed; got a ${grid.ends} one`);
  const reason = definition.refusal(potential);
  if (reason) throw new RangeError(reason);
}
