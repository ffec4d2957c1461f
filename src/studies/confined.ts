import type { Stretch } from "../grid/aligned.js";
import { BASE_PHASE } from "../grid/aligned.js";
import type { Circle } from "../grid/circle.js";
import type { Departure } from "../grid/journey.js";
import { kineticEnergy, wavenumberOf, wavenumberSpread } from "../packets/gaussian.js";
import type { Design } from "../problem/design.js";
import { HBAR } from "../units/constants.js";
import { DesignLimitError } from "./limits.js";

/** Decay lengths beyond the turning points of the fastest component at which the box ends. */
const DECAY_LENGTHS = 10;
/** Spreads of k that the box holds. */
const HELD_SPREADS = 8;
/** Round trips of the mean energy that an automatic run follows. */
const ROUND_TRIPS = 2;

/** Packet, box and duration of a motion in a potential that confines the particle. */
export interface ConfinedMotion {
  readonly from: Departure;
  readonly end: number;
  readonly stretches: readonly Stretch[];
  /** The circle of so many points (raised to a power of two), or of at most this spacing, or an automatic one. */
  circle(points?: number, step?: number): Circle;
}

/** The packet starts at `packet.start`, or in the middle; the box reaches beyond where its fastest component turns. */
export function confinedMotion(design: Design): ConfinedMotion {
  const { potential, packet, numerics, particleMass: mass } = design;
  if (numerics.length !== undefined)
    throw new DesignLimitError(
      "numerics.length",
      "where the potential confines the packet it sets the length itself; leave this out",
    );
  const direction = packet.from === "left" ? 1 : -1;
  const center = packet.start ?? lowestPlace(design);
  const k0 = wavenumberOf(packet.energy, mass);
  const spread = wavenumberSpread(packet.width);
  const base = potential.value(center);
  const top = (at: number, spreads: number) =>
    potential.value(at) + kineticEnergy(k0 + spreads * spread, mass);
  // The far side of the packet starts higher up the slope.
  const reach = HELD_SPREADS * packet.width;
  const highest = Math.max(top(center - reach, 0), top(center + reach, 0), top(center, HELD_SPREADS));
  const left = edge(design, center, -1, highest);
  const right = edge(design, center, 1, highest);
  const k = wavenumberOf(highest - potential.lowest, mass);
  const energy = base + packet.energy;
  const from: Departure = {
    packet: { center, width: packet.width, wavenumber: direction * k0 },
    direction,
    k0,
    spread,
    mass,
    near: 0,
    far: 0,
    top: Number.POSITIVE_INFINITY,
    energy,
    lowest: potential.lowest,
    highest,
    distance: 0,
    backward: 0,
  };
  const cells = Math.ceil(((right - left) * k) / BASE_PHASE);
  return {
    from,
    end:
      ROUND_TRIPS *
      roundTrip(
        design,
        // A packet at rest at the bottom has no round trip of its own: that of its fast parts stands for it.
        energy > potential.lowest ? energy : highest,
        left,
        right,
      ),
    stretches: [{ from: left, to: right, cells }],
    circle: (points, step) => {
      const wanted = points ?? (step === undefined ? 2 * cells : (right - left) / step);
      const n = 2 ** Math.max(4, Math.ceil(Math.log2(wanted)));
      return { first: left, step: (right - left) / n, points: n };
    },
  };
}

/** A place where V is lowest, by a search over the middle of the box: harmonic shapes have it at their centre. */
function lowestPlace({ potential }: Design): number {
  let step = potential.scale;
  let x = 0;
  for (let i = 0; i < 200 && step > 1e-12 * potential.scale; i++) {
    const [a, b, c] = [potential.value(x - step), potential.value(x), potential.value(x + step)];
    if (b <= a && b <= c) step /= 2;
    else x += a < c ? -step : step;
  }
  return x;
}

/** Where V has risen so far above `energy` that the wave has died away. */
function edge({ potential, particleMass }: Design, center: number, side: 1 | -1, energy: number): number {
  let x = center;
  const step = potential.scale / 8;
  while (potential.value(x) < energy) x += side * step;
  // sum kappa dx until DECAY_LENGTHS are gathered.
  for (let decay = 0; decay < DECAY_LENGTHS; x += side * step)
    decay += wavenumberOf(Math.max(0, potential.value(x) - energy), particleMass) * step;
  return x;
}

/** Classical round trip 2 integral dx / v at an energy, fs, over the midpoints of a fine division. */
function roundTrip({ potential, particleMass }: Design, energy: number, left: number, right: number): number {
  const n = 20000;
  const dx = (right - left) / n;
  let time = 0;
  for (let i = 0; i < n; i++) {
    const kinetic = energy - potential.value(left + (i + 0.5) * dx);
    if (kinetic > 0) time += dx / ((HBAR * wavenumberOf(kinetic, particleMass)) / particleMass);
  }
  return 2 * time;
}
