import { normalTail } from "../numerics/erfc.js";
import { type GaussianPacket, wavenumberSpread, wavenumberWeight } from "../packets/gaussian.js";
import type { Potential } from "../potentials/potential.js";
import type { Bounded } from "../units/bounded.js";
import { HBAR } from "../units/constants.js";
import { UNIT_ROUNDOFF as U } from "./chain.js";
import { EnergyAxis } from "./energy-axis.js";
import { boundShare, evanescentShare } from "./near-side-tails.js";
import { type Integrand, resolvedIntegral } from "./resolved-quadrature.js";
import { type Resonance, resonancesAmong } from "./resonances.js";
import { prepareScattering, probabilities, type Scatterer } from "./scattering.js";

/** Spreads of k beyond which the weight of a packet underflows. */
const MOST_SPREADS = 38;
/** What is cut off must lie below this part of the whole. */
const CUT = 1e-17;
/** Phase k L that a wave gathers over the structure may change by so much in a first panel; and the most first panels. */
const PANEL_PHASE = 0.5;
const MOST_PANELS = 6000;
/** First panels next to a threshold halve towards it so many times. */
const THRESHOLD_HALVINGS = 4;
/** Relative rounding of v_far/v_near when both kinetic energies are exact. */
const VELOCITY_ROUNDING = 6 * U;

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
  const k0 = Math.abs(wavenumber);
  const face = potential.faces[from === "left" ? 0 : 1];
  const distance = from === "left" ? face - center : center - face;
  const axis = new EnergyAxis(scatterer);
  const length = potential.faces[1] - potential.faces[0];
  const reach = reachOf(scatterer, axis, k0, width);
  const integrand = averagedTransmission(scatterer, axis, k0, width);
  const places = firstPlaces(
    axis,
    reach.low,
    reach.high,
    Math.min(wavenumberSpread(width), PANEL_PHASE / length),
  );
  const integral = resolvedIntegral(integrand, places, options.onProgress);

  const start = { k0, width, distance };
  const evanescent = evanescentShare(potential, particleMass, from, start, integral.value);
  const kept = boundShare(scatterer, start);
  const beyond = normalTail(distance / width);
  const value = integral.value + evanescent.value;
  const overlap = 4 * (beyond + Math.sqrt(value * beyond));
  const error = integral.error + evanescent.error + reach.cut + overlap + 4 * U * value;
  return {
    transmission: { value: Math.min(value, 1), error },
    reflection: { value: Math.max(0, 1 - value), error: error + kept + overlap + U },
    energies: integral.evaluations + evanescent.evaluations,
    resonances: resonancesOf(scatterer, axis, integral.steps, length),
  };
}

/** Range of k that counts, and a bound on what is cut off: T <= 1, so that the normal tails bound it. */
function reachOf(
  scatterer: Scatterer,
  axis: EnergyAxis,
  k0: number,
  width: number,
): { low: number; high: number; cut: number } {
  const spread = wavenumberSpread(width);
  let estimate = 0;
  for (let z = -MOST_SPREADS; z <= MOST_SPREADS; z += 0.25) {
    const k = k0 + z * spread;
    if (k <= axis.leastK) continue;
    const point = axis.at(axis.of(k));
    if (!(point.near > 0 && point.far > 0)) continue;
    const { transmission } = probabilities(scatterer.sweep(point), 0);
    estimate += 0.25 * spread * wavenumberWeight(k, k0, width) * transmission.value;
  }
  let z = 6;
  while (z < MOST_SPREADS && normalTail(z) > CUT * estimate) z += 0.5;
  const low = Math.max(axis.leastK, k0 - z * spread);
  return { low, high: Math.max(k0, low) + z * spread, cut: 2 * normalTail(z) };
}

/** Ends of the first panels in s: even in k, finer towards a threshold. */
function firstPlaces(axis: EnergyAxis, low: number, high: number, step: number): number[] {
  const count = Math.min(MOST_PANELS, Math.max(8, Math.ceil((high - low) / step)));
  const places: number[] = [];
  for (let i = 0; i <= count; i++) places.push(axis.of(low + ((high - low) * i) / count));
  if (low === axis.leastK) {
    places[0] = 0;
    for (let j = 0; j < THRESHOLD_HALVINGS; j++) places.splice(1, 0, places[1] / 2);
  }
  return places;
}

function averagedTransmission(scatterer: Scatterer, axis: EnergyAxis, k0: number, width: number): Integrand {
  const density = (k: number) => wavenumberWeight(k, k0, width);
  return {
    sample(s) {
      const point = axis.at(s);
      const { transmission } = probabilities(scatterer.sweep(point), VELOCITY_ROUNDING);
      const weight = density(point.k) * point.slope;
      const off = Math.abs(point.k - k0);
      // Rounding of the exponent 2 (sigma (k - k0))^2, and of k and k0 in it.
      const rounding = U * (8 + 6 * (width * off) ** 2 + 8 * width * width * off * Math.max(point.k, k0));
      const value = weight * transmission.value;
      return { value, error: weight * transmission.error + rounding * value };
    },
    phase: (s) => scatterer.sweep(axis.at(Math.max(s, Number.MIN_VALUE))).phase,
    unresolved(a, b) {
      const [first, last] = [axis.at(a), axis.at(b)];
      return Math.max(density(first.k), density(last.k)) * Math.max(first.slope, last.slope) * (b - a) * 2;
    },
    indivisible(a, b) {
      const [first, last] = [axis.at(a).energy, axis.at(b).energy];
      return last - first <= 8 * U * Math.max(Math.abs(first), Math.abs(last));
    },
  };
}

function resonancesOf(
  scatterer: Scatterer,
  axis: EnergyAxis,
  steps: readonly { readonly a: number; readonly b: number; readonly turn: number }[],
  length: number,
): Resonance[] {
  const { near, far, nearMass, farMass } = scatterer;
  const top = Math.max(near, far);
  const mass = near >= far ? nearMass : farMass;
  // d(kL)/dE of a free wave; near the threshold its own curvature sets the pace as well.
  const pace = (energy: number) =>
    (Math.sqrt(mass / (2 * Math.max(energy - top, Number.MIN_VALUE))) / HBAR) * length +
    1 / Math.max(energy - top, Number.MIN_VALUE);
  const incoming = (energy: number): readonly [number, number, number] => {
    const sweep = scatterer.sweep({ energy, near: energy - near, far: energy - far });
    return [sweep.incoming[0], sweep.incoming[1], sweep.exponent];
  };
  const inEnergy = steps.map(({ a, b, turn }) => ({ a: axis.at(a).energy, b: axis.at(b).energy, turn }));
  return resonancesAmong(inEnergy, incoming, pace);
}
