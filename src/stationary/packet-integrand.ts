import { normalTail } from "../numerics/erfc.js";
import { wavenumberOf, wavenumberSpread, wavenumberWeight } from "../packets/gaussian.js";
import { UNIT_ROUNDOFF as U } from "./chain.js";
import type { EnergyAxis } from "./energy-axis.js";
import type { Integrand } from "./panel-integral.js";
import { probabilities, type Scatterer } from "./scattering.js";

/** Spreads of k beyond which the weight of a packet underflows. */
const MOST_SPREADS = 38;
/** Spreads of k that are followed whatever the transmission. */
const LEAST_SPREADS = 6;
/** What is cut off must lie below this part of the whole. */
const CUT = 1e-17;
/** Phase k L that a wave gathers over the structure may change by so much in a first panel; and the most first panels. */
const PANEL_PHASE = 1;
const MOST_PANELS = 6000;
const LEAST_PANELS = 8;
/** First panels next to a threshold halve towards it so many times. */
const THRESHOLD_HALVINGS = 4;
/** At a threshold itself no wave can be made; the phase is taken at this part of the first panel instead. */
const LEAST_PLACE = 1e-9;
/** Relative rounding of v_far/v_near when both kinetic energies are exact. */
const VELOCITY_ROUNDING = 6 * U;

/** |k0| (1/nm) and sigma (nm) of a packet. */
export interface Spectrum {
  readonly k0: number;
  readonly width: number;
}

/** Range of k that counts, and a bound on what is cut off: T <= 1, so that the normal tails bound it. */
export function rangeOf(
  scatterer: Scatterer,
  axis: EnergyAxis,
  { k0, width }: Spectrum,
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
  let z = LEAST_SPREADS;
  while (z < MOST_SPREADS && normalTail(z) > CUT * estimate) z += 0.5;
  const low = Math.max(axis.leastK, k0 - z * spread);
  return { low, high: Math.max(k0, low) + z * spread, cut: 2 * normalTail(z) };
}

/** Ends of the first panels in s, for k from low to high: even in k, finer towards a threshold. `length` of the structure in nm. */
export function firstPlaces(
  axis: EnergyAxis,
  low: number,
  high: number,
  { width }: Spectrum,
  length: number,
): number[] {
  const step = Math.min(wavenumberSpread(width), PANEL_PHASE / length);
  const count = Math.min(MOST_PANELS, Math.max(LEAST_PANELS, Math.ceil((high - low) / step)));
  const places: number[] = [];
  for (let i = 0; i <= count; i++) places.push(axis.of(low + ((high - low) * i) / count));
  if (low === axis.leastK) {
    places[0] = 0;
    for (let j = 0; j < THRESHOLD_HALVINGS; j++) places.splice(1, 0, places[1] / 2);
  }
  return places;
}

/**
 * |phi(k)|^2 T(E_k) dk/ds and its bound.
 * @param margins lengths (nm) near and far between a face and the core of a smooth structure, whose free phases are left out of `phase`
 * @param first the end of the first panel
 */
export function packetIntegrand(
  scatterer: Scatterer,
  axis: EnergyAxis,
  { k0, width }: Spectrum,
  margins: readonly [near: number, far: number],
  first: number,
): Integrand {
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
    phase(s) {
      const point = axis.at(Math.max(s, LEAST_PLACE * first));
      const kFar = wavenumberOf(point.far, scatterer.farMass);
      return scatterer.sweep(point).phase - point.k * margins[0] - kFar * margins[1];
    },
    unresolved(a, b) {
      const [from, to] = [axis.at(a), axis.at(b)];
      return Math.max(density(from.k), density(to.k)) * Math.max(from.slope, to.slope) * (b - a) * 2;
    },
    indivisible(a, b) {
      const [from, to] = [axis.at(a).energy, axis.at(b).energy];
      return to - from <= 8 * U * Math.max(Math.abs(from), Math.abs(to));
    },
  };
}
