import { type Grid, periodicGrid, uniformClosedGrid } from "../../src/grid/grid.js";
import { sampleGaussian } from "../../src/packets/gaussian.js";
import type { Potential } from "../../src/potentials/potential.js";
import { smooth } from "../../src/potentials/smooth.js";
import type { StepperDefinition } from "../../src/steppers/stepper.js";

/** V the same everywhere. */
export function uniform(level: number, particleMass: number): Potential {
  return smooth(
    {
      shape: "uniform",
      value: () => level,
      cellAverage: () => level,
      faces: [0, 0],
      levelLeft: level,
      levelRight: level,
      lowest: level,
      highest: level,
      scale: Number.POSITIVE_INFINITY,
    },
    particleMass,
  );
}

/** n equal spacings from `first` on, with the ends that a stepper needs. */
export function gridFor(definition: StepperDefinition, first: number, step: number, n: number): Grid {
  return definition.grid === "periodic" ? periodicGrid(first, step, n) : uniformClosedGrid(first, step, n);
}

/** A Gaussian packet on the nodes of a grid. */
export function packetOn(grid: Grid, center: number, width: number, wavenumber: number): Float64Array {
  const psi = new Float64Array(2 * grid.x.length);
  sampleGaussian(psi, grid.x, { center, width, wavenumber });
  return psi;
}

/** sum_j w_j |psi_j|^2, over the nodes that `where` picks. */
export function probability(grid: Grid, psi: Float64Array, where = (_x: number): boolean => true): number {
  let sum = 0;
  grid.x.forEach((x, j) => {
    if (where(x)) sum += grid.weight[j] * (psi[2 * j] ** 2 + psi[2 * j + 1] ** 2);
  });
  return sum;
}

/** <a|b>, with the weights of the grid. */
export function overlap(grid: Grid, a: Float64Array, b: Float64Array): [re: number, im: number] {
  let re = 0;
  let im = 0;
  for (let j = 0; j < grid.x.length; j++) {
    const w = grid.weight[j];
    re += w * (a[2 * j] * b[2 * j] + a[2 * j + 1] * b[2 * j + 1]);
    im += w * (a[2 * j] * b[2 * j + 1] - a[2 * j + 1] * b[2 * j]);
  }
  return [re, im];
}

/** L2 distance of two states, with the weights of the grid. */
export function distance(grid: Grid, a: Float64Array, b: Float64Array): number {
  return Math.sqrt(
    probability(
      grid,
      a.map((value, i) => value - b[i]),
    ),
  );
}
