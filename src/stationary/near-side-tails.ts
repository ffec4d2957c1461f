import { wavenumberOf } from "../packets/gaussian.js";
import type { Potential } from "../potentials/potential.js";
import { UNIT_ROUNDOFF as U } from "./chain.js";
import { type Integrand, integratePanels } from "./panel-integral.js";
import { divideByPhase } from "./phase-division.js";
import { prepareScattering, type Scatterer } from "./scattering.js";

/** A packet as seen from its face: |k0| and sigma, and how far its centre stands from the face. nm. */
export interface Start {
  readonly k0: number;
  readonly width: number;
  readonly distance: number;
}

/** Shares below this part of the transmission are bounded, not computed. */
const NEGLIGIBLE = 1e-20;
/** Panels of the first division. */
const PANELS = 24;

/**
 * |phi(i kappa)|^2, nm: the squared overlap of the packet with exp(-kappa |x - face|) on its side, over 2 pi:
 * sqrt(2/pi) sigma exp(-2 kappa d + 2 sigma^2 kappa^2 - 2 sigma^2 k0^2), from integral exp(kappa s + i k0 s - s^2/(4 sigma^2)) ds.
 */
function overlap(kappa: number, { k0, width, distance }: Start): number {
  const exponent = 2 * (width * width * (kappa * kappa - k0 * k0) - kappa * distance);
  return Math.sqrt(2 / Math.PI) * width * Math.exp(exponent);
}

/**
 * Largest 4 pi kappa |phi(i kappa)|^2 for kappa from `low` up: the most that one state which decays on the near side can hold of the packet.
 * Its wave there is N exp(-kappa |x - face|) with N^2 / (2 kappa) <= 1, being normalised. Up to kappa = d/(2 sigma^2) the
 * maximum lies at the end or where 1/kappa = 2 d - 4 sigma^2 kappa. Beyond, the overlap comes from the face itself, where the packet has all but
 * vanished: with |psi(face - t)| <= |psi(face)| exp(d t/(2 sigma^2) - t^2/(4 sigma^2)) it is below 2 pi (d + sigma) |psi(face)|^2.
 */
function mostHeld(low: number, start: Start, high = Number.POSITIVE_INFINITY): number {
  const { width, distance } = start;
  if (!(distance > 2 * width)) return 1;
  const last = Math.min(high, deepest(start));
  const peak = (distance - Math.sqrt(distance * distance - 4 * width * width)) / (4 * width * width);
  const kappa = Math.min(Math.max(peak, low), last);
  const shallow = low <= last ? 4 * Math.PI * kappa * overlap(kappa, start) : 0;
  return Math.max(shallow, high > last ? heldAtFace(start) : 0);
}

/** kappa from which on the face itself has most of the overlap. */
const deepest = ({ width, distance }: Start) => distance / (2 * width * width);

const heldAtFace = ({ width, distance }: Start) =>
  Math.sqrt(2 * Math.PI) * (distance / width + 1) * Math.exp((-distance * distance) / (2 * width * width));

/**
 * Share of the packet that leaves through the far side at energies between a far level and a higher near level. A state of such an energy comes in and goes
 * out on the far side, c exp(-kappa |x - face|) being its tail on the near side for an incident wave of amplitude 1; projected on them,
 * P = integral dq |c|^2 |phi(i kappa)|^2 over far wavenumbers q with q^2/m_far + kappa^2/m_near fixed by the levels.
 * In q = q_max cos(t), kappa = kappa_max sin(t) everything is smooth at both ends.
 */
export function evanescentShare(
  potential: Potential,
  particleMass: number,
  from: "left" | "right",
  start: Start,
  transmission: number,
): { value: number; error: number; evaluations: number } {
  const back = prepareScattering(potential, particleMass, from === "left" ? "right" : "left");
  // Seen from behind, near and far change places.
  const drop = back.far - back.near;
  if (!(drop > 0)) return { value: 0, error: 0, evaluations: 0 };
  const most = wavenumberOf(drop, back.farMass);
  const held = mostHeld(0, start, most);
  // A few resonances at most could each hold that much; a hundred is beyond doubt.
  if (held <= NEGLIGIBLE * transmission) return { value: 0, error: 100 * held, evaluations: 0 };
  const at = (t: number) => {
    const near = drop * Math.cos(t) ** 2;
    return { energy: back.near + near, near, far: near - drop };
  };
  const qMost = wavenumberOf(drop, back.nearMass);
  const integrand: Integrand = {
    sample(t) {
      const sweep = back.sweep(at(t));
      const size = Math.hypot(sweep.incoming[0], sweep.incoming[1]);
      const kappa = most * Math.sin(t);
      const exponent = 2 * start.width ** 2 * (kappa ** 2 + start.k0 ** 2) + 2 * kappa * start.distance;
      const amplitude = 2 ** -sweep.exponent / size;
      const value = amplitude * amplitude * overlap(kappa, start) * qMost * Math.sin(t);
      return { value, error: value * (2.2 * (sweep.error / size) + 4 * U * (4 + exponent)) };
    },
    // Energy falls as t grows.
    phase: (t) => -back.sweep(at(t)).phase,
    unresolved: (a, b) => mostHeld(most * Math.sin(a), start, most * Math.sin(b)),
    indivisible: (a, b) => b - a <= 8 * U * b,
  };
  // The ends themselves are the levels, where no wave can be made.
  const last = Math.asin(Math.min(1, deepest(start) / most));
  const places = Array.from({ length: PANELS + 1 }, (_, i) =>
    Math.min(Math.max(last * (i / PANELS), 1e-12), Math.PI / 2 - 1e-12),
  );
  const division = divideByPhase(integrand, places);
  const { value, error, evaluations } = integratePanels(integrand, division.steps);
  const rest = last < Math.PI / 2 ? 100 * heldAtFace(start) : 0;
  return { value, error: error + rest, evaluations: evaluations + division.evaluations };
}

/** Bound on the share that bound states keep: each at most `mostHeld`. */
export function boundShare(scatterer: Scatterer, start: Start): number {
  const shallowest = wavenumberOf(Math.max(0, scatterer.near - scatterer.far), scatterer.nearMass);
  return scatterer.boundStates() * mostHeld(shallowest, start);
}
