import { applyFiniteVolume, finiteVolume } from "../grid/finite-volume.js";
import { tridiagonalEigen } from "../numerics/tridiagonal-eigen.js";
import { HBAR } from "../units/constants.js";
import { checkPrepareExact, type Stepper, type StepperDefinition } from "./stepper.js";

/**
 * Most nodes of a grid: its eigenstates take n^2 numbers, 134 MB here, and finding them as much again for a while (measured: 330 MB in all).
 * Time grows as n^3 besides: half a second at 1000 nodes, some 25 here.
 */
export const MOST_EIGENSTATES = 4096;

/**
 * Expansion in the eigenstates of the discrete Hamiltonian, H phi_k = E_k phi_k:
 *
 *   psi(t + dt) = sum_k exp(-i E_k dt / hbar) <phi_k|psi(t)> phi_k,
 *
 * exact in time at any step. H is the flux-conserving Hamiltonian of grid/finite-volume.ts; sqrt(w) H / sqrt(w) is symmetric and
 * tridiagonal, and its eigenvectors are orthogonal to round-off, so norm and <H> are kept and steps compose exactly. Closed ends.
 * Cost O(n^3) to prepare and 8 n^2 operations a step, memory n^2 numbers: a reference, and a way to take one long step.
 * Amplitudes carry a rounding relative to the whole packet: probabilities below some 1e-28 are lost in it.
 * Source: textbook quantum mechanics (common practice, no source); for the eigenstates see numerics/tridiagonal-eigen.ts.
 */
export const eigenstates: StepperDefinition = {
  name: "eigenstates",
  summary: `expansion in the grid's own eigenstates, exact in time; interfaces on nodes, mass may vary; at most ${MOST_EIGENSTATES} points`,
  orders: [],
  defaultOrder: "exact",
  grid: "closed",
  conserves: ["norm", "energy"],
  source:
    "textbook quantum mechanics (common practice); eigenstates by division: Cuppen, Numer. Math. 36, 177 (1981); Gu and Eisenstat, SIAM J. Matrix Anal. Appl. 16, 172 (1995)",
  refusal: () => undefined,
  prepare(system, timeStep, order) {
    checkPrepareExact(eigenstates, system, timeStep, order);
    const { weight } = system.grid;
    const n = weight.length;
    if (n > MOST_EIGENSTATES)
      throw new RangeError(
        `eigenstates: at most ${MOST_EIGENSTATES} grid points, because their eigenstates take n^2 numbers; got ${n}; use crank-nicolson`,
      );
    const hamiltonian = finiteVolume(system.grid, system.potential);
    const { diagonal, coupling, potential } = hamiltonian;
    const root = weight.map(Math.sqrt);
    const offDiagonal = Float64Array.from(
      { length: n - 1 },
      (_, j) => -coupling[j + 1] / (root[j] * root[j + 1]),
    );
    const { values, vectors } = tridiagonalEigen(diagonal, offDiagonal);
    const turns = new Float64Array(2 * n);
    values.forEach((energy, k) => {
      turns[2 * k] = Math.cos((energy * timeStep) / HBAR);
      turns[2 * k + 1] = -Math.sin((energy * timeStep) / HBAR);
    });
    const before = new Float64Array(2 * n);
    const after = new Float64Array(2 * n);
    const stepper: Stepper = {
      definition: eigenstates,
      system,
      order: "exact",
      timeStep,
      potentialOnGrid: potential,
      advance(psi) {
        for (let i = 0; i < 2 * n; i++) before[i] = root[i >> 1] * psi[i];
        after.fill(0);
        turnEigenstates(after, before, vectors, turns);
        for (let i = 0; i < 2 * n; i++) psi[i] = after[i] / root[i >> 1];
      },
      applyHamiltonian(out, psi) {
        applyFiniteVolume(out, psi, hamiltonian, weight);
      },
    };
    return stepper;
  },
};

/**
 * out += sum_k turn_k (v_k . psi) v_k over the rows v_k. A row is used twice while it is at hand, so that the matrix is read
 * once a step, and two rows go together (measured at 1000 and 4000 nodes: a third faster than one by one).
 */
function turnEigenstates(
  out: Float64Array,
  psi: Float64Array,
  rows: Float64Array,
  turns: Float64Array,
): void {
  const n = psi.length >> 1;
  const paired = n - (n % 2);
  for (let k = 0; k < n; k += 2) {
    const first = (k * n) | 0;
    // The last row of an odd number stands alone: paired with itself, its partner left out.
    const second = (k < paired ? first + n : first) | 0;
    let aRe = 0;
    let aIm = 0;
    let bRe = 0;
    let bIm = 0;
    for (let j = 0; j < n; j = (j + 1) | 0) {
      const re = psi[(2 * j) | 0];
      const im = psi[(2 * j + 1) | 0];
      const u = rows[(first + j) | 0];
      const v = rows[(second + j) | 0];
      aRe += u * re;
      aIm += u * im;
      bRe += v * re;
      bIm += v * im;
    }
    const a = 2 * k;
    const cRe = turns[a] * aRe - turns[a + 1] * aIm;
    const cIm = turns[a] * aIm + turns[a + 1] * aRe;
    let dRe = 0;
    let dIm = 0;
    if (k < paired) {
      dRe = turns[a + 2] * bRe - turns[a + 3] * bIm;
      dIm = turns[a + 2] * bIm + turns[a + 3] * bRe;
    }
    for (let j = 0; j < n; j = (j + 1) | 0) {
      const u = rows[(first + j) | 0];
      const v = rows[(second + j) | 0];
      out[(2 * j) | 0] += u * cRe + v * dRe;
      out[(2 * j + 1) | 0] += u * cIm + v * dIm;
    }
  }
}
