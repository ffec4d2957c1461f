import { FourierHamiltonian } from "../grid/fourier-hamiltonian.js";
import { PhasedFftPair } from "../numerics/phased-fft.js";
import { HBAR } from "../units/constants.js";
import { splittingOfOrder, splittings } from "./splittings.js";
import { checkPrepare, type Stepper, type StepperDefinition } from "./stepper.js";

/**
 * Split operator on a circle: kicks exp(-i b V dt / hbar) in x and drifts exp(-i a hbar k^2 dt / 2m) in k, between
 * them a fast Fourier transform each way.
 *
 *   psi(t + dt) = K(b_1) D(a_1) K(b_2) ... D(a_s) K(b_(s+1)) psi(t)
 *
 * Unitary; the drift is exact, so smooth potentials converge faster than any power of the spacing. Needs one mass everywhere.
 * Every stage's kinetic phase |a| hbar k_max^2 dt / 2m should stay below pi, or high momenta are folded onto low ones.
 * Cost: 2 s transforms of O(n log n) a step, s = 1, 6, 11 for order 2, 4, 6.
 * Source: Feit, Fleck, Steiger, J. Comput. Phys. 47, 412 (1982); splittings: see splittings.ts.
 */
export const splitOperator: StepperDefinition<number> = {
  name: "split-operator",
  summary: "fast Fourier transform, spectral in space, best for smooth potentials; one mass everywhere",
  orders: splittings.map((splitting) => splitting.order),
  defaultOrder: 2,
  grid: "periodic",
  conserves: ["norm"],
  source:
    "Feit, Fleck, Steiger, J. Comput. Phys. 47, 412 (1982); orders 4 and 6: Blanes and Moan, J. Comput. Appl. Math. 142, 313 (2002)",
  refusal: (potential) =>
    potential.uniformMass
      ? undefined
      : "the split operator needs one mass everywhere, and the mass of this structure varies; use crank-nicolson",
  prepare(system, timeStep, order) {
    const chosen = checkPrepare(splitOperator, system, timeStep, order);
    const splitting = splittingOfOrder(chosen) as NonNullable<ReturnType<typeof splittingOfOrder>>;
    const hamiltonian = new FourierHamiltonian(system.grid, system.potential, system.particleMass);
    const { kinetic, potential } = hamiltonian;
    // Every stage is a kick, a drift and a kick: an inner kick is halved between the two stages that it stands between.
    const last = splitting.a.length - 1;
    const pair = new PhasedFftPair(kinetic.length);
    const kick = remembered((b) => phases(potential, (b * timeStep) / HBAR));
    const drift = remembered((a) => pair.spectrumTable(phases(kinetic, (a * timeStep) / HBAR)));
    const stages = splitting.a.map((a, s) => ({
      before: kick(s === 0 ? splitting.b[0] : splitting.b[s] / 2),
      drift: drift(a),
      after: kick(s === last ? splitting.b[s + 1] : splitting.b[s + 1] / 2),
    }));
    const stepper: Stepper = {
      definition: splitOperator,
      system,
      order: chosen,
      timeStep,
      potentialOnGrid: potential,
      advance(psi) {
        for (const { before, drift, after } of stages) pair.apply(psi, before, drift, after);
      },
      applyHamiltonian(out, psi) {
        hamiltonian.apply(out, psi);
      },
    };
    return stepper;
  },
};

/** One table a distinct coefficient: symmetric splittings use each of theirs twice. */
function remembered<T>(make: (coefficient: number) => T): (coefficient: number) => T {
  const known = new Map<number, T>();
  return (coefficient) => {
    const table = known.get(coefficient) ?? make(coefficient);
    known.set(coefficient, table);
    return table;
  };
}

/** exp(-i energy_j t), interleaved. */
function phases(energies: Float64Array, t: number): Float64Array {
  const table = new Float64Array(2 * energies.length);
  for (let j = 0; j < energies.length; j++) {
    table[2 * j] = Math.cos(energies[j] * t);
    table[2 * j + 1] = -Math.sin(energies[j] * t);
  }
  return table;
}
