import { gridWave } from "../analysis/energy-spectrum.js";
import { norm } from "../analysis/probabilities.js";
import { recordWeights, stepPhase, stepTransform } from "../analysis/step-spectrum.js";
import { alignedGrid } from "../grid/aligned.js";
import type { Grid } from "../grid/grid.js";
import { type GaussianPacket, sampleGaussian, wavenumberWeight } from "../packets/gaussian.js";
import type { Design } from "../problem/design.js";
import { propagate } from "../propagate.js";
import { crankNicolson } from "../steppers/crank-nicolson.js";
import type { StudyOptions } from "./calculation.js";
import type { ClosedPlan } from "./closed-plan.js";
import { packetOnGrid } from "./outcome.js";

/** What one whole calculation shows at one energy. */
export interface SeenAt {
  /** T at this energy on the calculation's own lattice. */
  readonly transmission: number;
  /** Relative error of that T left by the end: from how much it changes when the record is ended earlier. */
  readonly unfinished: number;
}

export interface FaceRun {
  /** One an energy, in their order. */
  readonly at: readonly SeenAt[];
  /** Change of the norm over the calculation, relative. */
  readonly drift: number;
}

/** The record is also ended at these shares of its length; two, since one alone may catch a ringing amplitude at the same phase as the end does. */
const EARLIER_ENDS = [0.8, 0.9];
/**
 * What is still to come is taken as so many times the change since the earlier ends. With one look at |T| alone the error was once 36 times the change;
 * with two looks at the complex amplitude and this factor none of 558 rows of random designs escaped. Behind a resonance the amplitude
 * falls exponentially, and from a tenth less time to this factor it would have to fall by less than a fifth.
 */
const STILL_TO_COME = 4;

/**
 * Runs Crank-Nicolson on the plan's grid, refined so many times, and records the amplitude at the structure's far face step by step. Nothing comes
 * back to that face, so its transform in time is that of the transmitted waves alone:
 *
 *   |t(E)|^2 = |sum_n psi_n(face) e^(i theta n)|^2 (d theta / dk)^2 / (2 pi |phi(k)|^2),  T = |t|^2 slope_far / slope_near,
 *
 * with theta(E) the phase of one step, k and slope = dE/dk those of the lattice's own plane waves at E, and |phi|^2 the start's own momentum
 * distribution. It holds for the discrete problem to round-off once all that is near E has passed.
 * @param energies total energies, eV, above both levels
 * Cost: that of the run, and three sums over its steps an energy.
 */
export async function faceRun(
  plan: ClosedPlan,
  design: Design,
  refinement: number,
  energies: readonly number[],
  options: StudyOptions,
): Promise<FaceRun> {
  const { from, steps, timeStep, clock } = plan;
  const grid = alignedGrid(plan.stretches, refinement);
  const { potential, particleMass } = design;
  const system = { grid, potential, particleMass, referenceEnergy: clock.reference };
  const stepper = crankNicolson.prepare(system, timeStep);
  const packet = packetOnGrid(from, grid);
  const psi = new Float64Array(2 * grid.x.length);
  sampleGaussian(psi, grid.x, packet);
  const start = norm(psi, grid.weight);
  const record = new Float64Array(2 * (steps + 1));
  const node = nearestNode(grid, potential.faces[from.direction > 0 ? 1 : 0]);
  let n = 0;
  const watch = {
    every: 1,
    record(_time: number, state: Float64Array) {
      record[2 * n] = state[2 * node];
      record[2 * n + 1] = state[2 * node + 1];
      n++;
    },
  };
  await propagate({ stepper, psi, steps }, [watch], {
    signal: options.signal,
    onProgress: options.onProgress && ((done, total) => options.onProgress?.("propagating", done / total)),
  });
  const weights = [...EARLIER_ENDS, 1].map((share) => recordWeights(Math.floor(share * steps)));
  return {
    at: energies.map((energy) => seenAt(energy, record, weights, plan, grid, packet)),
    drift: Math.abs(norm(psi, grid.weight) - start) / start,
  };
}

function seenAt(
  energy: number,
  record: Float64Array,
  weights: readonly Float64Array[],
  { from, clock, timeStep }: ClosedPlan,
  { spacing }: Grid,
  packet: GaussianPacket,
): SeenAt {
  const [left, right] = [spacing[0], spacing[spacing.length - 1]];
  const [nearStep, farStep] = from.direction > 0 ? [left, right] : [right, left];
  const near = gridWave(energy - from.near, from.mass, nearStep);
  const far = gridWave(energy - from.far, from.mass, farStep);
  if (!near || !far) return { transmission: Number.NaN, unfinished: Number.POSITIVE_INFINITY };
  const { theta, slope } = stepPhase(energy, timeStep, clock.reference);
  const sums = weights.map((w) => stepTransform(record, w, theta));
  const [re, im] = sums[sums.length - 1];
  const change = Math.max(...sums.map((sum) => Math.hypot(sum[0] - re, sum[1] - im)));
  const came = 2 * Math.PI * wavenumberWeight(near.k, Math.abs(packet.wavenumber), packet.width);
  const missing = (STILL_TO_COME * change) / Math.hypot(re, im);
  return {
    transmission: ((re * re + im * im) * slope * slope * near.slope * far.slope) / came,
    unfinished: missing * (2 + missing),
  };
}

function nearestNode({ x }: Grid, place: number): number {
  let node = 0;
  for (let j = 1; j < x.length; j++) if (Math.abs(x[j] - place) < Math.abs(x[node] - place)) node = j;
  return node;
}
