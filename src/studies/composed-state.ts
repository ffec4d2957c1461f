import type { Grid } from "../grid/grid.js";
import type { Departure } from "../grid/journey.js";
import { normalTail } from "../numerics/erfc.js";
import { gaussLegendre } from "../numerics/quadrature.js";
import { kineticEnergy, wavenumberOf } from "../packets/gaussian.js";
import { hasPoint } from "../potentials/points.js";
import type { Design } from "../problem/design.js";
import { prepareScattering, type Scatterer } from "../stationary/scattering.js";
import { HBAR } from "../units/constants.js";
import type { StudyOptions } from "./calculation.js";
import { beyondFace } from "./common-checks.js";
import type { MatchedPlan } from "./matched-plan.js";
import { distance } from "./motion.js";

/** Spreads of k to either side that are added up: a probability of 1.5e-23 lies beyond. */
const SPREADS = 10;
/** Change of the state on doubling the panels at which no more waves are added: well below what the steppers aim at. */
const GOAL = 2e-8;
/** Waves of one sum beyond which no more are added; a resonance too narrow for them shows as a change that stays. */
const MOST_WAVES = 20_000;
/** Points of the rule in a panel, and the phase that a first panel may span over one and a half lengths of the box. */
const PANEL_POINTS = 16;
const PANEL_PHASE = 16;

/** The state outside the structure as the witness has it, on the nodes of a grid; zero from face to face. */
export interface ComposedState {
  readonly state: Float64Array;
  /** L2 distance that it may lie from the true one. */
  readonly error: number;
  readonly waves: number;
}

/**
 * The state at the plan's end put together from stationary waves, without any step in time and any grid: with xi and eta the distances
 * past the near and the far face in the direction of travel, xi_0 that of the packet's start,
 *
 *   psi(xi < 0)  = integral dk phi(k) exp(-i E t / hbar) (exp(i k xi) + r(k) exp(-i k xi)),
 *   psi(eta > 0) = integral dk phi(k) exp(-i E t / hbar) t(k) exp(i k' eta), below the far level exp(-kappa eta),
 *   phi(k) = (2 sigma^2 / pi)^(1/4) (2 pi)^(-1/2) exp(-sigma^2 (k - k0)^2 - i k xi_0),
 *
 * by Gauss-Legendre panels, halved until nothing changes. A wave with k < 0 is the time-reversed one with |k|, so that r(-k) = r(k)* and
 * t(-k) = t(k)*, smoothly through k = 0. Next to the far level k' or kappa is the variable, in which the integrand is smooth. Left out are bound states and, above
 * a lower far level, waves that decay on the near side: `unreached` bounds their amplitude in the start. Cost O(waves times nodes). Source: superposition of stationary states, common practice, no source.
 */
export async function composedState(
  design: Design,
  plan: MatchedPlan,
  common: Grid,
  options: StudyOptions,
): Promise<ComposedState> {
  const { from } = plan;
  const scatterer = prepareScattering(design.potential, design.particleMass, design.packet.from);
  const length = 1.5 * (common.x[common.x.length - 1] - common.x[0]);
  let waves = wavesOf(from, PANEL_PHASE / length);
  let state = sumOf(waves, plan, scatterer, design, common);
  for (let finer = 2; ; finer *= 2) {
    waves = wavesOf(from, PANEL_PHASE / length / finer);
    options.onProgress?.(`witness, ${waves.length} stationary waves`);
    await new Promise((resolve) => setTimeout(resolve));
    options.signal?.throwIfAborted();
    const next = sumOf(waves, plan, scatterer, design, common);
    const change = distance(common, next, state);
    state = next;
    if (change <= GOAL || waves.length > MOST_WAVES)
      return { state, error: change + unreached(design, from), waves: waves.length };
  }
}

/**
 * Bound on the amplitude of what is no sum of these waves: what lies beyond the face from the start, or beyond SPREADS; and what decays on the near side
 * like exp(kappa xi), whose overlap with the packet is (8 pi sigma^2)^(1/4) (2 kappa)^(1/2) exp(-sigma^2 (k0^2 - kappa^2) - kappa |xi_0|), at most
 * 0.5 exp(-sigma^2 k0^2) for a packet that starts ten widths away, and shrinks with the distance.
 */
function unreached({ potential }: Design, from: Departure): number {
  const { near, far, k0, packet } = from;
  const decaying = far < near || potential.lowest < Math.min(near, far) || hasPoint(potential);
  return (
    2 * Math.sqrt(beyondFace(from)) +
    Math.sqrt(2 * normalTail(SPREADS)) +
    (decaying ? 0.5 * Math.exp(-((packet.width * k0) ** 2)) : 0)
  );
}

interface Wave {
  readonly k: number;
  readonly weight: number;
}

/** Wavenumbers and weights (1/nm) of the whole packet, in panels of at most this width in k (or k', kappa). */
function wavesOf(from: Departure, panel: number): Wave[] {
  const low = from.k0 - SPREADS * from.spread;
  const high = from.k0 + SPREADS * from.spread;
  const threshold = wavenumberOf(Math.max(0, from.far - from.near), from.mass);
  const same = (k: number) => [k, 1] as const;
  if (threshold <= Math.max(0, low) || threshold >= high)
    return [...panels(low, Math.min(0, high), panel, same), ...panels(Math.max(0, low), high, panel, same)];
  const below = (kappa: number) => {
    const k = Math.sqrt(threshold ** 2 - kappa ** 2);
    return [k, kappa / k] as const;
  };
  const above = (far: number) => {
    const k = Math.sqrt(threshold ** 2 + far ** 2);
    return [k, far / k] as const;
  };
  // From the middle down to nothing k itself is the smooth one again.
  const middle = Math.max(low, threshold / 2);
  return [
    ...panels(low, Math.min(0, middle), panel, same),
    ...panels(Math.max(0, low), middle, panel, same),
    ...panels(0, Math.sqrt(threshold ** 2 - middle ** 2), panel, below),
    ...panels(0, Math.sqrt(high ** 2 - threshold ** 2), panel, above),
  ];
}

/** Points of Gauss-Legendre panels in a variable u from a to b; `map` gives k(u) and |dk/du|. */
function panels(a: number, b: number, width: number, map: (u: number) => readonly [number, number]): Wave[] {
  if (!(b > a)) return [];
  const { nodes, weights } = gaussLegendre(PANEL_POINTS);
  const count = Math.ceil((b - a) / width);
  const half = (b - a) / (2 * count);
  return Array.from({ length: count * PANEL_POINTS }, (_, i) => {
    const place = i % PANEL_POINTS;
    const [k, slope] = map(a + (2 * Math.floor(i / PANEL_POINTS) + 1 + nodes[place]) * half);
    return { k, weight: weights[place] * half * slope };
  });
}

/** The sum over a set of waves. */
function sumOf(
  waves: readonly Wave[],
  plan: MatchedPlan,
  scatterer: Scatterer,
  { potential }: Design,
  { x }: Grid,
): Float64Array {
  const { from, end } = plan;
  const { direction, distance: away, packet, k0, mass } = from;
  const [faceNear, faceFar] = direction > 0 ? potential.faces : [potential.faces[1], potential.faces[0]];
  const near = indices(x, (place) => direction * (place - faceNear) < 0);
  const far = indices(x, (place) => direction * (place - faceFar) > 0);
  const peak = ((2 * packet.width ** 2) / Math.PI) ** 0.25 * (2 * Math.PI) ** -0.5;
  const out = new Float64Array(2 * x.length);
  for (const { k, weight } of waves) {
    const energy = from.near + kineticEnergy(k, mass);
    const size = weight * peak * Math.exp(-((packet.width * (k - k0)) ** 2));
    const phase = k * away - (energy * end) / HBAR;
    const came = [size * Math.cos(phase), size * Math.sin(phase)] as const;
    addWave(out, x, near, direction * k, faceNear, came);
    const sign = Math.sign(k);
    const { reflectedAmplitude, transmittedAmplitude } = scatterer.at(energy);
    addWave(out, x, near, -direction * k, faceNear, times(came, reversed(reflectedAmplitude, sign)));
    const kFar = wavenumberOf(Math.abs(energy - from.far), scatterer.farMass);
    const through = times(came, reversed(transmittedAmplitude, sign));
    if (energy > from.far) addWave(out, x, far, direction * sign * kFar, faceFar, through);
    else addDecay(out, x, far, kFar, faceFar, through);
  }
  return out;
}

type Complex = readonly [re: number, im: number];
type Span = readonly [from: number, to: number];

const times = ([a, b]: Complex, [c, d]: Complex): Complex => [a * c - b * d, a * d + b * c];

/** An amplitude, or for sign -1 that of the time-reversed wave. */
const reversed = ([re, im]: Complex, sign: number): Complex => [re, sign * im];

/** First and end index of the nodes, which are neighbours, that a condition holds for. */
function indices(x: Float64Array, holds: (place: number) => boolean): Span {
  const from = x.findIndex(holds);
  let to = Math.max(from, 0);
  while (to < x.length && from >= 0 && holds(x[to])) to++;
  return [Math.max(from, 0), to];
}

/** out_j += amplitude exp(i k (x_j - face)) over a span of nodes. */
function addWave(
  out: Float64Array,
  x: Float64Array,
  [from, to]: Span,
  k: number,
  face: number,
  [re, im]: Complex,
): void {
  for (let j = from; j < to; j++) {
    const angle = k * (x[j] - face);
    const cos = Math.cos(angle);
    const sin = Math.sin(angle);
    out[2 * j] += re * cos - im * sin;
    out[2 * j + 1] += re * sin + im * cos;
  }
}

/** out_j += amplitude exp(-kappa |x_j - face|) over a span of nodes. */
function addDecay(
  out: Float64Array,
  x: Float64Array,
  [from, to]: Span,
  kappa: number,
  face: number,
  [re, im]: Complex,
): void {
  for (let j = from; j < to; j++) {
    const left = Math.exp(-kappa * Math.abs(x[j] - face));
    out[2 * j] += left * re;
    out[2 * j + 1] += left * im;
  }
}
