import type { Grid } from "../grid/grid.js";
import { HBAR } from "../units/constants.js";

/**
 * Probability current through the place between node j and node j + 1, in 1/fs:
 *
 *   J_(j+1/2) = hbar / (m h) Im(psi_j* psi_(j+1)),
 *
 * the very flux whose differences change the cell probabilities of the finite-volume Hamiltonian; on a circle its
 * error is of second order in the spacing. Positive to the right. Source: continuity equation, common practice, no source.
 */
export function currentAt(psi: Float64Array, grid: Grid, j: number, mass: number): number {
  const im = psi[2 * j] * psi[2 * j + 3] - psi[2 * j + 1] * psi[2 * j + 2];
  return (HBAR / (mass * grid.spacing[j])) * im;
}
