import { normalTail } from "../numerics/erfc.js";
import type { GaussianPacket } from "../packets/gaussian.js";
import type { Potential } from "../potentials/potential.js";
import type { Bounded } from "../units/bounded.js";
import { UNIT_ROUNDOFF as U } from "./chain.js";
import { coreOf } from "./core.js";
import { EnergyAxis } from "./energy-axis.js";
import { type NarrowPeak, narrowPeaks } from "./narrow-peaks.js";
import { boundShare, evanescentShare } from "./near-side-tails.js";
import { firstPlaces, packetIntegrand, rangeOf } from "./packet-integrand.js";
import { integratePanels } from "./panel-integral.js";
import { divideByPhase, type PhaseStep } from "./phase-division.js";
import { type Resonance, resonancesAmong } from "./resonances.js";
import { prepareScattering, type Scatterer } from "./scattering.js";

/** The transmitted and reflected share of a packet, once everything has left. */
export interface PacketAverage {
  readonly transmission: Bounded;
  readonly reflection: Bounded;
  /** How many energies were computed. */
  readonly energies: number;
  /** Resonances among the packet's energies that are narrow beside what a free wave of that length would show; total energies, eV. */
  readonly resonances: readonly Resonance[];
}

/**
 * What of a Gaussian packet is transmitted in the end, as the average of stationary waves.
 *
 * T = integral over k > 0 (towards the structure) of |phi(k)|^2 T(E_k) dk, exact for a packet that starts wholly on its side; components that move away
 * are never transmitted. Two things are added to it. Where the far level lies below the near one, energies between them reach into the near side as
 * decaying waves, of which a packet with slow components holds a little: `evanescentShare`. And bound states keep their share
 * of it for ever: `boundShare`, taken into the bound of R = 1 - T - bound. A packet that is not clear of its face has the
 * probability P beyond it, which changes either number by at most 4 (P + sqrt(T P)).
 *
 * @param potential static, with a finite level on both sides
 * @param particleMass eV fs^2/nm^2
 * @param packet with its wavenumber positive when it comes from the left
 * @param options.onProgress called now and then with the number of energies done
 * @returns T and R with bounds: quadrature, rounding at each energy, cut tails, resonances too narrow for double precision
 * @throws RangeError for a potential without a stationary answer, or a packet at rest
 *
 * Cost: 500 to 5000 energies; more with many narrow resonances. Source: scattering theory, in every text (asymptotic completeness); the two
 * additions are derived in near-side-tails.ts.
 */
export function packetAverage(
  potential: Potential,
  particleMass: number,
  packet: GaussianPacket,
  options: { readonly onProgress?: (energies: number) => void } = {},
): PacketAverage {
  const { wavenumber, width, center } = packet;
  if (wavenumber === 0)
    throw new RangeError("a packet that moves towards the structure is needed; got a wavenumber of 0");
  const from = wavenumber > 0 ? "left" : "right";
  const scatterer = prepareScattering(potential, particleMass, from);
  const [left, right] = potential.faces;
  const distance = from === "left" ? left - center : center - right;
  const start = { k0: Math.abs(wavenumber), width, distance };
  const moving = movingShare(scatterer, start, potential, from, options.onProgress);
  const evanescent = evanescentShare(potential, particleMass, from, start, moving.value);
  const value = moving.value + evanescent.value;
  const beyond = normalTail(distance / width);
  const overlap = 4 * (beyond + Math.sqrt(value * beyond));
  const error = moving.error + evanescent.error + overlap + 4 * U * value;
  return {
    transmission: { value: Math.min(value, 1), error },
    reflection: { value: Math.max(0, 1 - value), error: error + boundShare(scatterer, start) + overlap + U },
    energies: moving.evaluations + evanescent.evaluations,
    resonances: moving.resonances,
  };
}

/** integral over k > 0 of |phi(k)|^2 T(E_k) dk: narrow peaks in closed form, the rest panel by panel. */
function movingShare(
  scatterer: Scatterer,
  spectrum: { readonly k0: number; readonly width: number },
  potential: Potential,
  from: "left" | "right",
  onProgress?: (energies: number) => void,
) {
  const axis = new EnergyAxis(scatterer);
  const core = coreOf(potential);
  const length = core[1] - core[0];
  const margins = [core[0] - potential.faces[0], potential.faces[1] - core[1]] as const;
  const range = rangeOf(scatterer, axis, spectrum);
  const places = firstPlaces(axis, range.low, range.high, spectrum, length);
  const ordered = from === "left" ? margins : ([margins[1], margins[0]] as const);
  const integrand = packetIntegrand(scatterer, axis, spectrum, ordered, places[1]);
  const { steps, evaluations } = divideByPhase(integrand, places);
  const inEnergy = steps.map((step) => ({ ...step, a: axis.at(step.a).energy, b: axis.at(step.b).energy }));
  const resonances = resonancesAmong(inEnergy, scatterer, length);
  const peaks = narrowPeaks(resonances, scatterer, axis, spectrum, length, [
    inEnergy[0].a,
    inEnergy[inEnergy.length - 1].b,
  ]);
  const panels = integratePanels(integrand, besidePeaks(steps, peaks, axis), onProgress);
  return {
    value: peaks.reduce((sum, peak) => sum + peak.value, panels.value),
    error: peaks.reduce((sum, peak) => sum + peak.error, panels.error + range.cut),
    evaluations: evaluations + panels.evaluations,
    resonances,
  };
}

/** What the windows of the narrow peaks leave of the panels. */
function besidePeaks(
  steps: readonly PhaseStep[],
  peaks: readonly NarrowPeak[],
  axis: EnergyAxis,
): PhaseStep[] {
  const windows = peaks.map(({ low, high }) => [axis.ofEnergy(low), axis.ofEnergy(high)] as const);
  return steps.flatMap((step) => {
    let rest = [step];
    for (const [low, high] of windows) {
      rest = rest.flatMap((part) => {
        if (part.b <= low || part.a >= high) return [part];
        const pieces: PhaseStep[] = [];
        if (part.a < low) pieces.push({ ...part, b: low });
        if (part.b > high) pieces.push({ ...part, a: high });
        return pieces;
      });
    }
    return rest;
  });
}
