import type * as Grids from "../../src/grid/grid.js";
import type * as Rectangular from "../../src/potentials/rectangular.js";
import type * as CrankNicolson from "../../src/steppers/crank-nicolson.js";
import type * as SplitOperator from "../../src/steppers/split-operator.js";
import type { Stepper } from "../../src/steppers/stepper.js";
import type * as Constants from "../../src/units/constants.js";
import { PythonReference } from "./python.js";
import { type Comparison, type Contestant, compare } from "./rounds.js";

/** Nodes of the grid, and what stands on it: the first example's order of size, in nm, eV, fs. */
export const POINTS = 4096;
const STEP_NM = 0.15;
const TIME_STEP_FS = 0.05;
const BARRIER = { height: 0.3, width: 5 };
const PACKET = { energy: 0.15, width: 10, start: -100 };
/** Steps in one turn: some ms, far above the clock's grain, short beside the time slices of a busy machine. */
const COUNT = 100;
/** Both sides do the same arithmetic in another order; after some 4000 steps their means still agree to this, in nm. */
const SAME_NM = 1e-7;

export interface StepRow {
  readonly kind: "cn" | "fft";
  readonly comparison: Comparison;
  /** Distance between the two mean positions at the end, nm. */
  readonly apartNm: number;
}

/** A module of the built package, typed by its source. */
async function built<T>(path: string): Promise<T> {
  return (await import(new URL(`../../dist/${path}`, import.meta.url).href)) as T;
}

/** Both steppers of the built package, ready, and the packet that they start from. */
async function prepared() {
  const { uniformClosedGrid, periodicGrid } = await built<typeof Grids>("grid/grid.js");
  const { rectangular } = await built<typeof Rectangular>("potentials/rectangular.js");
  const { crankNicolson } = await built<typeof CrankNicolson>("steppers/crank-nicolson.js");
  const { splitOperator } = await built<typeof SplitOperator>("steppers/split-operator.js");
  const { ELECTRON_MASS, HBAR } = await built<typeof Constants>("units/constants.js");
  const particleMass = 0.067 * ELECTRON_MASS;
  const potential = rectangular.build(BARRIER, particleMass);
  const first = (-POINTS / 2) * STEP_NM;
  const closed = uniformClosedGrid(first, STEP_NM, POINTS);
  const periodic = periodicGrid(first, STEP_NM, POINTS);
  const steppers = {
    cn: crankNicolson.prepare({ grid: closed, potential, particleMass }, TIME_STEP_FS, 2),
    fft: splitOperator.prepare({ grid: periodic, potential, particleMass }, TIME_STEP_FS, 2),
  };
  const k0 = Math.sqrt(2 * particleMass * PACKET.energy) / HBAR;
  const psi = new Float64Array(2 * POINTS);
  closed.x.forEach((x, j) => {
    const amplitude = Math.exp(-(((x - PACKET.start) / (2 * PACKET.width)) ** 2));
    psi[2 * j] = amplitude * Math.cos(k0 * x);
    psi[2 * j + 1] = amplitude * Math.sin(k0 * x);
  });
  return { steppers, x: closed.x, psi, hbar: HBAR, mass: particleMass };
}

/** One of our steppers on a state of its own. */
function ours(stepper: Stepper, start: Float64Array): Contestant & { meanNm(): number } {
  const psi = start.slice();
  let time = 0;
  return {
    name: stepper.definition.name,
    step(count) {
      const begin = performance.now();
      for (let i = 0; i < count; i++) {
        stepper.advance(psi, time);
        time += stepper.timeStep;
      }
      return (performance.now() - begin) / 1000;
    },
    meanNm() {
      let moment = 0;
      let norm = 0;
      stepper.system.grid.x.forEach((x, j) => {
        const density = psi[2 * j] ** 2 + psi[2 * j + 1] ** 2;
        moment += density * x;
        norm += density;
      });
      return moment / norm;
    },
  };
}

/**
 * Steps of both kinds against those of NumPy and SciPy, which propagate the same packet; throws when they do not end
 * in the same place, because then they did not do the same work.
 */
export async function compareSteps(): Promise<
  { rows: StepRow[]; python: PythonReference["versions"] } | undefined
> {
  const { steppers, x, psi, hbar, mass } = await prepared();
  const reference = await PythonReference.start({
    x: Array.from(x),
    psi: Array.from(psi),
    potential: { cn: Array.from(steppers.cn.potentialOnGrid), fft: Array.from(steppers.fft.potentialOnGrid) },
    hbar,
    mass,
    timeStep: TIME_STEP_FS,
  });
  if (reference === undefined) return undefined;
  const rows: StepRow[] = [];
  for (const kind of ["cn", "fft"] as const) {
    let theirMean = Number.NaN;
    const mine = ours(steppers[kind], psi);
    const comparison = await compare(
      mine,
      {
        name: "Python",
        async step(count) {
          const { seconds, meanNm } = await reference.advance(kind, count);
          theirMean = meanNm;
          return seconds;
        },
      },
      COUNT,
    );
    const apartNm = Math.abs(mine.meanNm() - theirMean);
    if (!(apartNm < SAME_NM))
      throw new Error(
        `${mine.name}: the two sides end ${apartNm} nm apart, so they did not do the same steps`,
      );
    rows.push({ kind, comparison, apartNm });
  }
  reference.stop();
  return { rows, python: reference.versions };
}
