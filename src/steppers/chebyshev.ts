import { FourierHamiltonian } from "../grid/fourier-hamiltonian.js";
import { besselSeries } from "../numerics/bessel.js";
import { PhasedFftPair } from "../numerics/phased-fft.js";
import { HBAR } from "../units/constants.js";
import { checkPrepareExact, type Stepper, type StepperDefinition } from "./stepper.js";

/** Most terms of one step: their coefficients take 134 MB, and the step minutes. */
const MOST_TERMS = 2 ** 24;

/**
 * Chebyshev expansion of the evolution on a circle, exact in time at any step:
 *
 *   psi(t + dt) = exp(-i c dt / hbar) sum_n (2 - delta_n0) (-i)^n J_n(R) T_n((H - c) / r) psi(t),   R = r dt / hbar,
 *
 * with T_n by its recurrence and c, r the middle and half the width of [min V, max V + E_max], in which all levels of the discrete H lie
 * (E_max: kinetic energy of the fastest plane wave of the grid). J_n(R) falls faster than exponentially once n > R; the series is
 * cut where it has fallen below round-off, after about R + 11 R^(1/3) terms. Needs one mass everywhere; circle as for the split
 * operator. Norm is kept to round-off, not by construction. Cost: one pair of transforms of O(n log n) a term.
 * Source: Tal-Ezer and Kosloff, J. Chem. Phys. 81, 3967 (1984), citation from memory.
 */
export const chebyshev: StepperDefinition = {
  name: "chebyshev",
  summary:
    "expansion in Chebyshev polynomials of H, exact in time, spectral in space; one mass everywhere; a reference for smooth potentials",
  orders: [],
  defaultOrder: "exact",
  grid: "periodic",
  conserves: ["norm", "energy"],
  source: "Tal-Ezer and Kosloff, J. Chem. Phys. 81, 3967 (1984), citation from memory",
  refusal: (potential) =>
    potential.uniformMass
      ? undefined
      : "chebyshev needs one mass everywhere, and the mass of this structure varies; use crank-nicolson",
  prepare(system, timeStep, order) {
    checkPrepareExact(chebyshev, system, timeStep, order);
    const hamiltonian = new FourierHamiltonian(system.grid, system.potential, system.particleMass);
    const { kinetic, potential } = hamiltonian;
    const n = kinetic.length;
    const { middle, radius } = levelRange(kinetic, potential);
    const terms = chebyshevTerms(2 * radius, timeStep);
    if (!(terms <= MOST_TERMS))
      throw new RangeError(
        `chebyshev: a step of ${timeStep} fs needs about ${terms} terms, more than ${MOST_TERMS}; take shorter ones`,
      );
    const coefficients = besselSeries((radius * timeStep) / HBAR);
    const phase = (-middle * timeStep) / HBAR;
    const [turnRe, turnIm] = [Math.cos(phase), Math.sin(phase)];
    const pair = new PhasedFftPair(n);
    const ones = Float64Array.from({ length: 2 * n }, (_, i) => 1 - (i & 1));
    const doubled = pair.spectrumTable(ones.map((one, i) => (2 * one * kinetic[i >> 1]) / radius));
    const offset = potential.map((v) => (2 * (v - middle)) / radius);
    const work = [0, 1, 2, 3].map(() => new Float64Array(2 * n));
    const stepper: Stepper = {
      definition: chebyshev,
      system,
      order: "exact",
      timeStep,
      potentialOnGrid: potential,
      advance(psi) {
        let [sum, before, here, image] = work;
        here.set(psi);
        for (let i = 0; i < 2 * n; i++) sum[i] = coefficients[0] * psi[i];
        for (let term = 1; term < coefficients.length; term++) {
          // image <- 2 (T / r) here
          image.set(here);
          pair.apply(image, ones, doubled, ones);
          // T_1 = X T_0 is half of what the recurrence T_(k+1) = 2 X T_k - T_(k-1) gives without its last part.
          recur(image, here, before, offset, term === 1);
          addTerm(sum, image, term % 4, 2 * coefficients[term]);
          [before, here, image] = [here, image, before];
        }
        for (let i = 0; i < 2 * n; i += 2) {
          psi[i] = turnRe * sum[i] - turnIm * sum[i + 1];
          psi[i + 1] = turnRe * sum[i + 1] + turnIm * sum[i];
        }
      },
      applyHamiltonian(out, psi) {
        hamiltonian.apply(out, psi);
      },
    };
    return stepper;
  },
};

/**
 * Terms of the series for one step (fs) when all levels lie within `range` (eV), a few more than are taken: R + 11.5 R^(1/3) + 8 with
 * R = range dt / 2 hbar, fitted to the counts for R from 0.1 to 4000.
 */
export function chebyshevTerms(range: number, timeStep: number): number {
  const r = Math.abs((range * timeStep) / (2 * HBAR));
  return Math.ceil(r + 11.5 * Math.cbrt(r) + 8);
}

/** Middle and half-width (eV) of a range that holds all levels of T + V. */
function levelRange(kinetic: Float64Array, potential: Float64Array): { middle: number; radius: number } {
  const low = potential.reduce((a, b) => Math.min(a, b));
  const high = potential.reduce((a, b) => Math.max(a, b)) + kinetic.reduce((a, b) => Math.max(a, b));
  return { middle: 0.5 * (low + high), radius: 0.5 * (high - low) };
}

/** image <- image + offset here - before, or half of image + offset here for the first term. */
function recur(
  image: Float64Array,
  here: Float64Array,
  before: Float64Array,
  offset: Float64Array,
  first: boolean,
): void {
  if (first) for (let i = 0; i < image.length; i++) image[i] = 0.5 * (image[i] + offset[i >> 1] * here[i]);
  else for (let i = 0; i < image.length; i++) image[i] += offset[i >> 1] * here[i] - before[i];
}

/** sum <- sum + coefficient (-i)^quarter state, quarter 0 ... 3. */
function addTerm(sum: Float64Array, state: Float64Array, quarter: number, coefficient: number): void {
  const c = quarter === 1 || quarter === 2 ? -coefficient : coefficient;
  if (quarter % 2 === 0) for (let i = 0; i < sum.length; i++) sum[i] += c * state[i];
  else
    for (let i = 0; i < sum.length; i += 2) {
      // i c (re + i im) = -c im + i c re
      sum[i] -= c * state[i + 1];
      sum[i + 1] += c * state[i];
    }
}
