import type { Potential } from "../potentials/potential.js";
import { UNIT_ROUNDOFF as U } from "./chain.js";
import { coreOf } from "./core.js";
import { EnergyAxis } from "./energy-axis.js";
import { divideByPhase } from "./phase-division.js";
import { type Resonance, resonancesAmong } from "./resonances.js";
import { prepareScattering } from "./scattering.js";

/** Phase k L that a wave gathers over the structure may change by so much in a first panel; fewest and most of them. */
const PANEL_PHASE = 1;
const FEWEST_PANELS = 32;
const MOST_PANELS = 6000;
/** At a threshold itself no wave can be made; the phase is taken at this part of the first panel instead. */
const LEAST_PLACE = 1e-9;

/**
 * The resonances of a structure within a range of energies, however narrow, by the steps that the phase of the transmitted wave makes.
 *
 * @param potential static, with a finite level on both sides
 * @param particleMass eV fs^2/nm^2
 * @param from @param to total energies, eV, ascending
 * @throws RangeError for a potential without a stationary answer
 * Cost: 1000 to 20,000 energies. Limit: two of them closer to each other than their widths may be taken for one.
 */
export function resonancesBetween(
  potential: Potential,
  particleMass: number,
  from: number,
  to: number,
): Resonance[] {
  const scatterer = prepareScattering(potential, particleMass);
  const axis = new EnergyAxis(scatterer);
  const core = coreOf(potential);
  const length = core[1] - core[0];
  const [low, high] = [axis.ofEnergy(from), axis.ofEnergy(to)];
  if (!(high > low)) return [];
  const count = Math.ceil(
    Math.min(MOST_PANELS, Math.max(FEWEST_PANELS, ((high - low) * length) / PANEL_PHASE)),
  );
  const places = Array.from({ length: count + 1 }, (_, n) => low + ((high - low) * n) / count);
  const least = LEAST_PLACE * places[1];
  const { steps } = divideByPhase(
    {
      phase: (s) => scatterer.sweep(axis.at(Math.max(s, least))).phase,
      indivisible(a, b) {
        const [first, last] = [axis.at(a).energy, axis.at(b).energy];
        return last - first <= 8 * U * Math.max(Math.abs(first), Math.abs(last));
      },
    },
    places,
  );
  const inEnergy = steps.map((step) => ({ ...step, a: axis.at(step.a).energy, b: axis.at(step.b).energy }));
  return resonancesAmong(inEnergy, scatterer, length);
}
