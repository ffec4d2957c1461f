import type { Grid } from "../grid/grid.js";
import type { Potential } from "../potentials/potential.js";
import { currentAt } from "./current.js";
import { meanEnergy, positionMoments, wavenumberMoments } from "./moments.js";
import { core, divide, shares } from "./probabilities.js";
import type { Recorder } from "./recorder.js";
import type { Series } from "./results.js";

/** Columns in the order of the file, with their units. */
const COLUMNS = [
  ["time", "fs"],
  ["transmission", ""],
  ["reflection", ""],
  ["inside", ""],
  ["norm_drift", ""],
  ["x_mean", "nm"],
  ["x_spread", "nm"],
  ["k_mean", "per_nm"],
  ["k_spread", "per_nm"],
  ["energy", "eV"],
  ["energy_drift", "eV"],
  ["current", "per_fs"],
] as const;

/** What is observed: a grid, the potential on it, and the Hamiltonian that moves the state (out <- H psi, eV). */
export interface Observed {
  readonly system: { readonly grid: Grid; readonly potential: Potential };
  applyHamiltonian(out: Float64Array, psi: Float64Array): void;
}

/** Records what a run does over time: shares, norm, moments, energy and the current at a detector. */
export class SeriesRecorder implements Recorder {
  private readonly rows: number[][] = [];
  private readonly look: (time: number, psi: Float64Array) => number[];

  /**
   * @param every steps between two rows
   * @param direction +1 when the packet came from the left: transmission is then what is right of the structure
   * @param detector where the current is measured, nm; default the far end of the structure
   */
  constructor(
    observed: Observed,
    readonly every: number,
    direction: 1 | -1,
    detector?: number,
  ) {
    const { grid, potential } = observed.system;
    const places = core(potential);
    const division = divide(grid, places);
    const k = wavenumberMoments(grid);
    const scratch = new Float64Array(2 * grid.x.length);
    const place = detector ?? (direction > 0 ? places[1] : places[0]);
    const node = Math.min(Math.max(0, nodeBelow(grid.x, place)), grid.x.length - 2);
    const mass = potential.massAverage(grid.x[node], grid.x[node + 1]);
    let first: { norm: number; energy: number } | undefined;
    this.look = (time, psi) => {
      const part = shares(psi, grid, division);
      const norm = part.left + part.inside + part.right;
      const energy = meanEnergy(psi, grid, observed.applyHamiltonian, scratch);
      first ??= { norm, energy };
      const x = positionMoments(psi, grid);
      const wave = k(psi);
      const [through, back] = direction > 0 ? [part.right, part.left] : [part.left, part.right];
      const drift = norm / first.norm - 1;
      const current = currentAt(psi, grid, node, mass);
      return [
        time,
        through,
        back,
        part.inside,
        drift,
        x.mean,
        x.spread,
        wave.mean,
        wave.spread,
        energy,
        energy - first.energy,
        current,
      ];
    };
  }

  record(time: number, psi: Float64Array): void {
    this.rows.push(this.look(time, psi));
  }

  /** The columns recorded so far. */
  get series(): Series {
    return COLUMNS.map(([name, unit], i) => ({
      name,
      unit,
      values: Float64Array.from(this.rows, (row) => row[i]),
    }));
  }
}

/** Largest j with x_j <= place. */
function nodeBelow(x: Float64Array, place: number): number {
  let low = 0;
  let high = x.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (x[middle] <= place) low = middle;
    else high = middle - 1;
  }
  return low;
}
