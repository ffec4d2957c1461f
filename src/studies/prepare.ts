import type { Departure } from "../grid/journey.js";
import { sampleGaussian } from "../packets/gaussian.js";
import type { Design } from "../problem/design.js";
import type { Run } from "../propagate.js";
import { type PrepareOptions, planRun } from "./run-plan.js";

export type { PrepareOptions } from "./run-plan.js";

/** A run whose own time is right, with the facts that a reader of its results needs. */
export interface PreparedRun extends Run {
  readonly from: Departure;
  readonly end: number;
}

/**
 * Makes a run of the design's packet ready whose time error is small or none, on a grid whose ends nothing reaches: for series, maps and
 * whatever a caller records. The transmission with its bound comes from `estimate`.
 * @throws DesignLimitError when the design cannot be computed as written
 */
export function prepare(design: Design, options: PrepareOptions = {}): PreparedRun {
  const { definition, from, order, timeStep, steps, makeGrid } = planRun(design, options);
  const { potential, particleMass } = design;
  const system = { grid: makeGrid(), potential, particleMass, referenceEnergy: from.energy };
  const stepper = definition.prepare(system, timeStep, order);
  const psi = new Float64Array(2 * system.grid.x.length);
  sampleGaussian(psi, system.grid.x, from.packet);
  return { stepper, psi, steps, from, end: steps * timeStep };
}
