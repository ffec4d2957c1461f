import { gridWave, wallDensity, wavenumberDensity } from "../analysis/energy-spectrum.js";
import {
  core,
  type Division,
  divide,
  footEnd,
  norm,
  type Shares,
  shares,
  tails,
} from "../analysis/probabilities.js";
import type { Grid } from "../grid/grid.js";
import type { Departure } from "../grid/journey.js";
import { type GaussianPacket, sampleGaussian, wavenumberWeight } from "../packets/gaussian.js";
import type { Potential } from "../potentials/potential.js";
import { propagate } from "../propagate.js";
import type { Stepper } from "../steppers/stepper.js";
import type { StudyOptions } from "./calculation.js";

/** Where one whole calculation ended. Shares of the final norm. */
export interface Outcome {
  readonly transmitted: number;
  readonly reflected: number;
  /** Probability between the foot of the near flank and the far end of the structure. */
  readonly inside: number;
  /** `inside` when nine tenths of the time were over. */
  readonly insideBefore: number;
  /** Bound on the error of `transmitted` that the end leaves: inside, in its tails beside the structure, and on its way. */
  readonly unfinished: number;
  /** Change of the norm over the whole calculation. */
  readonly drift: number;
  /** Norm of the sampled packet minus one: how well the grid holds it. */
  readonly sampling: number;
  /** T at a total energy (eV) from the final state's own plane waves; undefined where the packet has no weight or no wave. */
  readonly transmissionAt: (energy: number) => number | undefined;
}

/**
 * What arrives after the end is judged from the growth over the last tenth of the time: an arrival that falls like
 * 1/t^(n+1), n >= 1, leaves at most 9 times as much (0.9^-n - 1 >= n/9); n = 3 is the rule for slow components behind a barrier,
 * and an exponential leaves less.
 */
export const LAST_PART = 0.1;
const TAIL_FACTOR = (1 - LAST_PART) / LAST_PART;

/** Runs a stepper from the packet's start for `steps` steps and measures what got through. */
export async function runToEnd(
  stepper: Stepper,
  from: Departure,
  steps: number,
  seam: number | undefined,
  options: StudyOptions,
): Promise<Outcome> {
  const { grid, potential } = stepper.system;
  const psi = new Float64Array(2 * grid.x.length);
  const packet = packetOnGrid(from, grid);
  sampleGaussian(psi, grid.x, packet);
  const start = norm(psi, grid.weight);
  const division = divide(grid, core(potential), seam);
  const foot = divide(grid, footOf(potential, from.direction), seam);
  const through = (s: Shares) => (from.direction > 0 ? s.right : s.left);
  const insideOf = (state: Float64Array) => norm(state, grid.weight, foot.first, foot.end);
  let earlier = 0;
  let insideBefore = 0;
  const mark = Math.max(1, Math.floor(steps * (1 - LAST_PART)));
  const watch = {
    every: mark,
    record(time: number, state: Float64Array) {
      if (Math.abs(time - mark * stepper.timeStep) > 0.5 * Math.abs(stepper.timeStep)) return;
      const parts = shares(state, grid, division);
      earlier = through(parts);
      insideBefore = insideOf(state);
    },
  };
  await propagate({ stepper, psi, steps }, [watch], {
    signal: options.signal,
    onProgress: options.onProgress && ((done, total) => options.onProgress?.("propagating", done / total)),
  });
  const parts = shares(psi, grid, division);
  const beside = tails(psi, grid, division);
  const besides =
    (holdsBelow(potential, potential.levelLeft) ? beside.left : 0) +
    (holdsBelow(potential, potential.levelRight) ? beside.right : 0);
  const total = parts.left + parts.inside + parts.right;
  const inside = insideOf(psi);
  const transmitted = through(parts);
  return {
    transmitted: transmitted / total,
    // What is still on the foot of the near flank is on its way back.
    reflected: ((from.direction > 0 ? parts.left : parts.right) + parts.inside - inside) / total,
    inside: inside / total,
    insideBefore: insideBefore / total,
    unfinished: (inside + besides + TAIL_FACTOR * Math.abs(transmitted - earlier)) / total,
    drift: Math.abs(total - start) / start,
    sampling: Math.abs(start - 1),
    transmissionAt: (energy) => transmissionAt(energy, psi, stepper, from, packet, division),
  };
}

/** Whether something can be held that decays towards a side of that level: V lies below it somewhere, or a point may hold it. */
function holdsBelow({ lowest, highest }: Potential, level: number): boolean {
  return lowest < level || lowest === highest;
}

/** The structure without the foot of its near flank, nm. */
function footOf(potential: Potential, direction: 1 | -1): readonly [number, number] {
  const [left, right] = core(potential);
  const end = footEnd(potential, direction);
  return direction > 0 ? [end, right] : [left, end];
}

/**
 * The packet as a grid holds it best: with the wavenumber and width whose energy and spread of energy, by the grid's own dispersion
 * relation, are those of the design. Both tend to the design's own as the spacing vanishes, with an error of second order.
 */
export function packetOnGrid(
  { packet, direction, mass, energy, near }: Departure,
  grid: Grid,
): GaussianPacket {
  if (grid.ends === "periodic") return packet;
  const step = direction > 0 ? grid.spacing[0] : grid.spacing[grid.spacing.length - 1];
  const wave = gridWave(energy - near, mass, step);
  const free = gridWave(energy - near, mass, 0);
  if (!wave || !free) return packet;
  return {
    center: packet.center,
    wavenumber: direction * wave.k,
    width: (packet.width * wave.slope) / free.slope,
  };
}

/**
 * T(E) = (rho_far(k) / slope_far) / (rho_near(k) / slope_near): probability per energy of what got through over that of what came, each
 * on the plane waves of the grid at that very energy. rho_near is the Gaussian's own closed form.
 */
function transmissionAt(
  energy: number,
  psi: Float64Array,
  { system }: Stepper,
  from: Departure,
  packet: GaussianPacket,
  division: Division,
): number | undefined {
  const { grid } = system;
  const spectral = grid.ends === "periodic";
  const [left, right] = [grid.spacing[0], grid.spacing[grid.spacing.length - 1]];
  const [nearStep, farStep] = spectral ? [0, 0] : from.direction > 0 ? [left, right] : [right, left];
  const near = gridWave(energy - from.near, from.mass, nearStep);
  const far = gridWave(energy - from.far, from.mass, farStep);
  if (!near || !far) return undefined;
  const came = wavenumberWeight(near.k, Math.abs(packet.wavenumber), packet.width) / near.slope;
  const [a, b] = from.direction > 0 ? [division.end, division.seam] : [0, division.first];
  const wall = from.direction > 0 ? grid.x[grid.x.length - 1] + right : grid.x[0] - left;
  const density = spectral
    ? wavenumberDensity(psi, grid, a, b, from.direction * far.k)
    : wallDensity(psi, grid, a, b, far.k, wall);
  const got = density / far.slope;
  return came > 0 ? got / came : undefined;
}
