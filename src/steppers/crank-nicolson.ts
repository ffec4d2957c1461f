import { applyFiniteVolume, finiteVolume } from "../grid/finite-volume.js";
import { type Complex, TwoEndedFactors } from "../numerics/tridiagonal.js";
import { HBAR } from "../units/constants.js";
import { checkPrepare, type Stepper, type StepperDefinition } from "./stepper.js";

/**
 * Poles z of the diagonal Pade approximant of exp of order 2M, which is the product over them of
 *   (z_k + x) / (z_k - x) = -1 + 2 z_k / (z_k - x).
 * Source: zeros computed for check-values (5.6); van Dijk and Toyama, Phys. Rev. E 75, 036707 (2007) for their use.
 */
const POLES: Readonly<Record<number, readonly Complex[]>> = {
  2: [[2, 0]],
  4: [
    [3, Math.sqrt(3)],
    [3, -Math.sqrt(3)],
  ],
  6: [
    [4.644370709252171, 0],
    [3.6778146453739144, 3.5087619195674433],
    [3.6778146453739144, -3.5087619195674433],
  ],
};

/**
 * Crank-Nicolson (the Cayley form of the step) and its generalisations to order 4 and 6 in the time step:
 *
 *   psi(t + dt) = exp(-i E_ref dt / hbar) R(-i (H - E_ref) dt / hbar) psi(t),
 *
 * with R the diagonal Pade approximant of exp as a product (one tridiagonal solution a pole), H the
 * flux-conserving discrete Hamiltonian of grid/finite-volume.ts and E_ref the system's reference energy, at which the
 * step is exact. R(-i y) has modulus one for real y, so norm and <H> are kept to round-off, and since the step is a
 * function of H alone the asymptotic probabilities do not depend on dt at all. Closed ends. Cost O(n M) a step for order 2M.
 * Source: Crank and Nicolson, Proc. Camb. Phil. Soc. 43, 50 (1947); Goldberg, Schey, Schwartz, Am. J. Phys. 35, 177
 * (1967); orders 4 and 6: van Dijk and Toyama, Phys. Rev. E 75, 036707 (2007).
 */
export const crankNicolson: StepperDefinition<number> = {
  name: "crank-nicolson",
  summary:
    "implicit, tridiagonal, interfaces on nodes, mass may vary; transmission independent of the time step",
  orders: [2, 4, 6],
  defaultOrder: 2,
  grid: "closed",
  conserves: ["norm", "energy"],
  source:
    "Crank and Nicolson, Proc. Camb. Phil. Soc. 43, 50 (1947); orders 4 and 6: van Dijk and Toyama, Phys. Rev. E 75, 036707 (2007)",
  refusal: () => undefined,
  prepare(system, timeStep, order) {
    const chosen = checkPrepare(crankNicolson, system, timeStep, order);
    const { weight } = system.grid;
    const hamiltonian = finiteVolume(system.grid, system.potential);
    const { diagonal, coupling, potential } = hamiltonian;
    const n = weight.length;
    const tau = timeStep / HBAR;
    const below = new Float64Array(n);
    const above = new Float64Array(n);
    for (let j = 0; j < n; j++) {
      below[j] = (-tau * coupling[j]) / weight[j];
      above[j] = (-tau * coupling[j + 1]) / weight[j];
    }
    // Pole z: psi <- -psi + 2 z phi with (z + i tau (H - E_ref)) phi = psi; the last one brings the phase along.
    const reference = system.referenceEnergy ?? 0;
    const poles = POLES[chosen].map(([re, im], k, all) => {
      const modulus = Math.hypot(re, im);
      return {
        factors: new TwoEndedFactors(
          new Float64Array(n).fill(re),
          diagonal.map((d) => im + tau * (d - reference)),
          below,
          above,
          2 * modulus,
        ),
        turn: im === 0 ? undefined : ([re / modulus, im / modulus] as Complex),
        phase: (k < all.length - 1
          ? [1, 0]
          : [Math.cos(tau * reference), -Math.sin(tau * reference)]) as Complex,
      };
    });
    const stepper: Stepper = {
      definition: crankNicolson,
      system,
      order: chosen,
      timeStep,
      potentialOnGrid: potential,
      advance(psi) {
        for (const { factors, phase, turn } of poles) factors.step(psi, phase, turn);
      },
      applyHamiltonian(out, psi) {
        applyFiniteVolume(out, psi, hamiltonian, weight);
      },
    };
    return stepper;
  },
};
