import type { Departure } from "../grid/journey.js";
import type { Design } from "../problem/design.js";
import { stepperNamed } from "../steppers/registry.js";
import { amplitudeAtFace, beyondFace, CLEAR_AMPLITUDE } from "./common-checks.js";
import { isForced } from "./forced.js";

/** Share of the packet that moves away from the structure from the start, above which it is worth a warning. */
const BACKWARD_LIMIT = 1e-6;
/** Spread of the energy relative to its mean above which the mean says little. */
const BROAD = 0.25;
/** Probability beyond the face from the start above which it is worth a warning. */
const BEYOND_LIMIT = 1e-12;
/** Distance, in spreads of the energy, of what carried most from the mean above which it is worth a note. */
const FAR_FROM_MEAN = 1.5;

/** What a design gives reason to watch, in sentences, before anything is computed. */
export function warningsFor(design: Design, from: Departure): string[] {
  const warnings: string[] = [];
  const { packet, numerics, potential } = design;
  const relative = (2 * from.spread) / from.k0;
  if (relative > BROAD)
    warnings.push(
      `The packet's energies spread by ${Math.round(100 * relative)} % of their mean: its transmission is an average over them, not that of the mean energy.`,
    );
  if (from.backward > BACKWARD_LIMIT)
    warnings.push(
      `A share of ${from.backward.toPrecision(1)} of the packet moves away from the structure from the start and counts as reflected.`,
    );
  const atFace = amplitudeAtFace(from);
  if (atFace > CLEAR_AMPLITUDE)
    warnings.push(
      `The packet does not start clear of the structure: its amplitude at the face is ${atFace.toPrecision(1)} of its peak. Start it ${(10 * packet.width).toPrecision(3)} nm away or more.`,
    );
  const beyond = beyondFace(from);
  if (beyond > BEYOND_LIMIT)
    warnings.push(
      `A probability of ${beyond.toPrecision(1)} lies beyond the structure's face from the start.`,
    );
  if (isForced(numerics))
    warnings.push("Numerics are forced: the bound is measured against an automatic calculation.");
  if (
    from.highest < potential.highest &&
    potential.highest > 4 * from.energy &&
    stepperNamed(numerics.stepper ?? "")?.grid === "periodic"
  )
    warnings.push(
      "Behind a barrier this high the transmission may lie below the rounding of a Fourier transform; crank-nicolson keeps small amplitudes right.",
    );
  return warnings;
}

/** Says so when another energy than the mean carried most of what got through. Energies are total, eV. */
export function tailNote(from: Departure, carryingEnergy: number): string | undefined {
  const { k0, spread, energy, near } = from;
  const energySpread = (2 * spread * (energy - near)) / k0;
  const away = Math.abs(carryingEnergy - energy);
  if (!(away > FAR_FROM_MEAN * energySpread)) return undefined;
  return `Most of what got through came at about ${carryingEnergy.toPrecision(3)} eV, not at the packet's mean of ${energy.toPrecision(3)} eV: its transmission is that of a tail.`;
}
