import type { Potential } from "../potentials/potential.js";
import type { Bounded } from "../units/bounded.js";
import { UNIT_ROUNDOFF as U } from "./chain.js";
import { stationaryRefusal } from "./refusal.js";
import { structureOf } from "./structure.js";
import { type Incidence, type Sweep, Sweeper } from "./sweep.js";

/** Agreement asked of the particle's mass and that of the leads. */
const SAME_MASS = 1e-12;

/** What a wave of one energy does at a structure. */
export interface Scattering {
  /** Total energy, eV. */
  readonly energy: number;
  readonly transmission: Bounded;
  readonly reflection: Bounded;
  /**
   * With the wave exp(i k (x - near face)) coming in, the reflected one is r exp(-i k (x - near face)) and the transmitted one
   * t exp(i k' (x - far face)), for a wave from the right with both x mirrored. At or below the far level nothing is transmitted; t is then
   * the amplitude at the far face of the wave that decays beyond it.
   */
  readonly transmittedAmplitude: readonly [re: number, im: number];
  readonly reflectedAmplitude: readonly [re: number, im: number];
}

/** One energy as `Scatterer.at` takes it: total, and kinetic on both sides where they are known better than by differences. */
export interface ScatteringEnergy {
  readonly energy: number;
  readonly near: number;
  readonly far: number;
}

/** A potential prepared once for many energies. */
export interface Scatterer {
  /** Levels on the side of the incoming wave and on the other side, eV. */
  readonly near: number;
  readonly far: number;
  readonly nearMass: number;
  readonly farMass: number;
  /** T, R and amplitudes at a total energy (eV) above the near level. */
  at(energy: number): Scattering;
  /** The same for exact kinetic energies on both sides, and with them what the quadratures need. */
  sweep(energy: ScatteringEnergy): Sweep;
  /** Number of bound states, all below the lower level. */
  boundStates(): number;
}

/**
 * Prepares the exact scattering of stationary waves at a potential. Cost of preparing: O(panels); of one energy: O(layers), or for a smooth
 * shape O(panels + k times its length).
 * @throws RangeError for a potential that has no stationary answer, or a mass that is that of neither side
 */
export function prepareScattering(
  potential: Potential,
  particleMass: number,
  from: "left" | "right" = "left",
): Scatterer {
  const refusal = stationaryRefusal(potential);
  if (refusal !== undefined) throw new RangeError(refusal);
  const structure = structureOf(potential);
  const side = from === "left" ? 0 : 1;
  const [nearMass, farMass] = [structure.masses[side], structure.masses[1 - side]];
  if (![nearMass, farMass].some((mass) => Math.abs(mass - particleMass) <= SAME_MASS * particleMass))
    throw new RangeError(
      `the potential was built for a particle of another mass: ${particleMass} eV fs^2/nm^2 is asked for, it has ${nearMass}`,
    );
  const [near, far] = [structure.levels[side], structure.levels[1 - side]];
  const sweeper = new Sweeper(structure);
  // Written out, since spreading `at` costs twenty times what three layers do.
  const sweep = (at: ScatteringEnergy) =>
    sweeper.run({
      energy: at.energy,
      near: at.near,
      far: at.far,
      from,
      slack: U * Math.abs(at.energy),
      nearSlack: 0,
      farSlack: 0,
    });
  const at = (energy: number) => {
    if (!(energy > near) || !Number.isFinite(energy))
      throw new RangeError(
        `an energy above the level that the wave comes from, ${near} eV, is needed; got ${energy} eV`,
      );
    const incidence: Incidence = {
      energy,
      near: energy - near,
      far: energy - far,
      from,
      slack: U * Math.abs(energy),
      nearSlack: U * (Math.abs(energy) + Math.abs(near)),
      farSlack: U * (Math.abs(energy) + Math.abs(far)),
    };
    return scatteringOf(incidence, sweeper.run(incidence));
  };
  const boundStates = () => {
    const lower = Math.min(near, far);
    return sweeper.statesBelow({ energy: lower, near: lower - near, far: lower - far, from });
  };
  return { near, far, nearMass, farMass, at, sweep, boundStates };
}

/**
 * Transmission, reflection and both amplitudes of a wave of one energy, without any time step.
 *
 * psi and psi'/m are carried from the far face to the near face: exactly through flat layers, by power series of converged
 * order through smooth parts. T = (v_far/v_near) / |A|^2 and R = |B/A|^2 for the amplitudes A, B of the incoming and the reflected wave.
 *
 * @param potential static, with a finite level on both sides
 * @param particleMass eV fs^2/nm^2
 * @param energy total energy, eV, above the level of the side that the wave comes from
 * @param from side that the wave comes from
 * @returns T and R with bounds on every rounding and truncation, the rounding of `energy` and of the layers' places included. Close to a
 *   resonance of width Gamma that uncertainty of the energy alone leaves a relative error of about 1e-16 E / Gamma in T.
 *   At or below the far level T = 0 and R = 1, exactly.
 * @throws RangeError for an energy at or below the near level, a potential without a stationary answer, or a mass that is not its own
 *
 * Cost as `prepareScattering` and one energy. Source: L. D. Landau and E. M. Lifshitz, Quantum Mechanics, par. 25 (citation from memory);
 * D. J. BenDaniel and C. B. Duke, Phys. Rev. 152, 683 (1966) for psi'/m.
 */
export function scatter(
  potential: Potential,
  particleMass: number,
  energy: number,
  from: "left" | "right" = "left",
): Scattering {
  return prepareScattering(potential, particleMass, from).at(energy);
}

function scatteringOf({ energy, near, far, nearSlack, farSlack }: Incidence, sweep: Sweep): Scattering {
  const transmittedAmplitude = inverse(sweep.incoming, sweep.exponent);
  const reflectedAmplitude = quotient(sweep.reflected, sweep.incoming);
  if (!(far > 0)) {
    return {
      energy,
      transmission: { value: 0, error: 0 },
      reflection: { value: 1, error: 0 },
      transmittedAmplitude,
      reflectedAmplitude,
    };
  }
  const velocities = nearSlack / (2 * near) + farSlack / (2 * far) + 6 * U;
  return { energy, ...probabilities(sweep, velocities), transmittedAmplitude, reflectedAmplitude };
}

/**
 * T and R of a sweep with an open far side. Each is computed by itself and, with its bound, from the other one; T + R = 1 is exact, so the
 * narrower bound of the two is taken.
 * @param velocities relative uncertainty of v_far/v_near
 */
export function probabilities(
  sweep: Sweep,
  velocities: number,
): { transmission: Bounded; reflection: Bounded } {
  const size = Math.hypot(sweep.incoming[0], sweep.incoming[1]);
  const relative = sweep.error / size;
  if (!(relative < 0.5)) {
    // Rounding covers the whole amplitude: nothing is known, and the bound says it.
    const half = { value: 0.5, error: 0.5 };
    return { transmission: half, reflection: half };
  }
  const bare = sweep.farVelocity / sweep.nearVelocity / (size * size);
  // In two factors, since 2^(-2 exponent) may underflow before the product does.
  const transmitted = bare * 2 ** -sweep.exponent * 2 ** -sweep.exponent;
  const spread = 1 / (1 - relative) ** 2 - 1;
  const transmission = {
    value: transmitted,
    error: transmitted * (spread + velocities) * (1 + velocities) + Number.MIN_VALUE,
  };
  const r = Math.hypot(sweep.reflected[0], sweep.reflected[1]) / size;
  const rError = (relative * (1 + r)) / (1 - relative) + 4 * U * r;
  const reflection = { value: r * r, error: rError * (2 * r + rError) + 2 * U * r * r };
  return {
    transmission: narrower(transmission, reflection),
    reflection: narrower(reflection, transmission),
  };
}

/** A probability, or one minus the other one, whichever is known better. */
function narrower(own: Bounded, other: Bounded): Bounded {
  const rest = { value: 1 - other.value, error: other.error + U };
  const best = rest.error < own.error ? rest : own;
  return { value: Math.min(Math.max(best.value, 0), 1), error: best.error };
}

function inverse([re, im]: readonly [number, number], exponent: number): readonly [number, number] {
  const scale = 2 ** -exponent / (re * re + im * im);
  return [re * scale, -im * scale];
}

function quotient(
  [ar, ai]: readonly [number, number],
  [br, bi]: readonly [number, number],
): readonly [number, number] {
  const square = br * br + bi * bi;
  return [(ar * br + ai * bi) / square, (ai * br - ar * bi) / square];
}
