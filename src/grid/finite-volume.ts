import type { Potential } from "../potentials/potential.js";
import { HBAR } from "../units/constants.js";
import type { Grid } from "./grid.js";

/**
 * The Hamiltonian -(hbar^2/2) d/dx (1/m) d/dx + V on the nodes of a closed grid, as fluxes between cells:
 *
 *   w_j (H psi)_j = coupling_(j-1/2) (psi_j - psi_(j-1)) - coupling_(j+1/2) (psi_(j+1) - psi_j) + w_j V_j psi_j,
 *   coupling_(j+1/2) = hbar^2 / (2 m_(j+1/2) h_(j+1/2)),
 *
 * with V_j the exact mean of V over the cell and m_(j+1/2) the mean mass between the nodes (psi'/m is constant across
 * a short interval, so masses add as resistances in series do). Symmetric in the weights w, hence it conserves
 * probability; with every interface on a node its errors go like h^2, h^4, ... also where the mass jumps.
 * Source: BenDaniel and Duke, Phys. Rev. 152, 683 (1966) for the operator; finite volumes are common practice, no source.
 */
export interface FiniteVolume {
  /** H_jj in eV. */
  readonly diagonal: Float64Array;
  /** coupling_(j+1/2) in eV nm, length n + 1: entry j joins node j - 1 to node j; the first and last lead to the closed ends. */
  readonly coupling: Float64Array;
  /** V_j in eV. */
  readonly potential: Float64Array;
}

/** Discretises a potential on a closed grid. Cost O(n), plus the cell averages inside the structure. */
export function finiteVolume(grid: Grid, potential: Potential): FiniteVolume {
  const { x, spacing, weight } = grid;
  const n = x.length;
  const coupling = new Float64Array(n + 1);
  const v = new Float64Array(n);
  const diagonal = new Float64Array(n);
  const [faceLeft, faceRight] = potential.faces;
  for (let j = 0; j <= n; j++) {
    const h = spacing[Math.min(Math.max(j - 1, 0), n - 2)];
    const a = j === 0 ? x[0] - h : x[j - 1];
    coupling[j] = (HBAR * HBAR) / (2 * potential.massAverage(a, a + h) * h);
  }
  for (let j = 0; j < n; j++) {
    const a = x[j] - 0.5 * spacing[Math.max(j - 1, 0)];
    const b = x[j] + 0.5 * spacing[Math.min(j, n - 2)];
    v[j] =
      b <= faceLeft
        ? potential.levelLeft
        : a >= faceRight
          ? potential.levelRight
          : potential.cellAverage(a, b);
    diagonal[j] = (coupling[j] + coupling[j + 1]) / weight[j] + v[j];
  }
  return { diagonal, coupling, potential: v };
}

/** out <- H psi (interleaved states), zero beyond the ends. @throws RangeError when out is psi */
export function applyFiniteVolume(
  out: Float64Array,
  psi: Float64Array,
  { diagonal, coupling }: FiniteVolume,
  weight: Float64Array,
): void {
  if (out === psi) throw new RangeError("applyHamiltonian: the output must not be the state itself");
  const n = weight.length;
  for (let c = 0; c < 2; c++) {
    for (let j = 0; j < n; j++) {
      const left = j > 0 ? coupling[j] * psi[2 * (j - 1) + c] : 0;
      const right = j < n - 1 ? coupling[j + 1] * psi[2 * (j + 1) + c] : 0;
      out[2 * j + c] = diagonal[j] * psi[2 * j + c] - (left + right) / weight[j];
    }
  }
}
