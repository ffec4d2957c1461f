import { normalTail } from "../numerics/erfc.js";
import { type GaussianPacket, kineticEnergy, wavenumberOf, wavenumberSpread } from "../packets/gaussian.js";
import type { Design } from "../problem/design.js";
import { HBAR } from "../units/constants.js";

/** Distance of the packet's centre from the structure, in its own widths: |psi| at the face is exp(-42) of its peak. */
export const CLEARANCE_WIDTHS = 13;
/** Spreads of k to either side that a box must have room for; the weight beyond is 3e-14. */
const FOLLOWED_SPREADS = 7.5;
/** Spreads of k to either side that must travel at a good speed; the weight beyond is 1e-9 and arrives later. */
const PROMPT_SPREADS = 6;
/** Widths of the packet kept free between it and what may come back from an end of the box. */
const FREE_WIDTHS = 9;
/** Decay lengths of the front of a dispersing packet (an Airy function) kept free likewise: its square is 1e-16 there. */
const FRONT_LENGTHS = 9;

/** The packet's start and the energies that it carries, all sides named from its own point of view. */
export interface Departure {
  readonly packet: GaussianPacket;
  /** +1 when it travels to the right. */
  readonly direction: 1 | -1;
  /** |k0|, 1/nm, and the spread of k. */
  readonly k0: number;
  readonly spread: number;
  readonly mass: number;
  /** Levels of V on the packet's side and on the far side, eV. */
  readonly near: number;
  readonly far: number;
  /** Greatest V anywhere, eV. */
  readonly top: number;
  /** Total mean energy, eV: kinetic energy plus the near level. */
  readonly energy: number;
  /** Energies (eV, total) between which all but 2e-9 of the packet lies. */
  readonly lowest: number;
  readonly highest: number;
  /** Distance from the centre to the face it meets, nm. */
  readonly distance: number;
  /** Probability carried by components that move away from the structure. */
  readonly backward: number;
}

/** Places the packet clear of the structure, unless the design says where it starts. */
export function departure(design: Design, clearance = CLEARANCE_WIDTHS): Departure {
  const { potential, packet, particleMass: mass } = design;
  const fromLeft = packet.from === "left";
  const direction = fromLeft ? 1 : -1;
  const [faceLeft, faceRight] = potential.faces;
  const face = fromLeft ? faceLeft : faceRight;
  const center = packet.start ?? face - direction * clearance * packet.width;
  const k0 = wavenumberOf(packet.energy, mass);
  const spread = wavenumberSpread(packet.width);
  const near = fromLeft ? potential.levelLeft : potential.levelRight;
  const far = fromLeft ? potential.levelRight : potential.levelLeft;
  return {
    packet: { center, width: packet.width, wavenumber: direction * k0 },
    direction,
    k0,
    spread,
    mass,
    near,
    far,
    top: potential.highest,
    energy: near + packet.energy,
    lowest: near + kineticEnergy(Math.max(0, k0 - PROMPT_SPREADS * spread), mass),
    highest: near + kineticEnergy(k0 + PROMPT_SPREADS * spread, mass),
    distance: direction * (face - center),
    backward: normalTail(k0 / spread),
  };
}

/**
 * Angular frequency of the exact evolution ("exact") or of a Crank-Nicolson step dt with reference energy E_ref, whose
 * frequency is (2/dt) arctan((E - E_ref) dt / 2 hbar): a group at energy E then travels at
 * v(E) / (1 + ((E - E_ref)/E_c)^2) with E_c = 2 hbar / dt, so that no group outruns a fixed speed.
 */
export type Clock = ExactClock | CayleyClock;
export interface ExactClock {
  readonly kind: "exact";
}
export interface CayleyClock {
  readonly kind: "cayley";
  /** E_ref, eV, total energy. */
  readonly reference: number;
  /** E_c, eV. */
  readonly cutoff: number;
}

/** Factor by which the clock slows a group of total energy E down. */
export function slowing(clock: Clock, energy: number): number {
  return clock.kind === "exact" ? 1 : 1 / (1 + ((energy - clock.reference) / clock.cutoff) ** 2);
}

/** Slowest prompt wavenumber, relative to the fastest, below which a packet counts as one with a slow tail. */
const SLOW_EDGE = 0.1;
/** A barrier that covers so much of the packet's energies above the levels keeps slow components from getting through. */
const BARRIER_SHARE = 0.3;
/** How much narrower the fast passage is made then, see `cayleyClock`. */
const TAIL_NARROWING = 7;

/**
 * The clock that lets a packet pass with least work, since the transmission does not depend on it. A packet whose
 * groups are all prompt: E_ref its mean energy, E_c the distance to its fast edge, so that every group keeps half its speed or better.
 * A packet with a slow tail that gets through (its slow edge, or a level on the far side, lies among its energies, and no barrier stands well above it): E_ref is where groups
 * are slow and E_c a seventh of the rest, so that the fast groups, which would need a long box, are slowed to the
 * pace of the slow ones, which decide the end anyway.
 */
export function cayleyClock(from: Departure): CayleyClock {
  const slowEdge = from.k0 - PROMPT_SPREADS * from.spread;
  const fastEdge = from.k0 + PROMPT_SPREADS * from.spread;
  const threshold =
    from.far > from.lowest ? from.far : slowEdge < SLOW_EDGE * fastEdge ? from.near : undefined;
  const level = Math.max(from.near, from.far);
  const barred = from.top - level > BARRIER_SHARE * (from.highest - level);
  if (threshold === undefined || threshold >= from.energy || barred)
    return { kind: "cayley", reference: from.energy, cutoff: from.highest - from.energy };
  return { kind: "cayley", reference: threshold, cutoff: (from.highest - threshold) / TAIL_NARROWING };
}

/** Room needed left and right of the structure, nm. */
export interface Room {
  readonly near: number;
  readonly far: number;
}

/**
 * The room on either side of the structure so that until `end` (fs) nothing which an end of the box sends back gets to the
 * structure ("closed" ends, where probabilities alone matter and a reflected group may still be on its way back),
 * or so that nothing reaches an end at all ("untouched").
 */
export function roomFor(from: Departure, end: number, clock: Clock, rule: "closed" | "untouched"): Room {
  const { distance, packet } = from;
  const free = FREE_WIDTHS * packet.width;
  const share = rule === "closed" ? 0.5 : 1;
  const nearFront = front(from, from.near, end, clock);
  const farFront = front(from, from.far, end, clock);
  const backwardFront = front(from, from.near, end, clock, true);
  const returned = share * (nearFront - distance + free);
  const retreated =
    rule === "closed" ? 0.5 * (backwardFront + distance + free) : distance + backwardFront + free;
  return {
    near: Math.max(distance + free, returned, backwardFront > 0 ? retreated : 0),
    far: Math.max(2 * packet.width, share * (farFront - distance + free)),
  };
}

/** How far (nm) the fastest followed group gets in `end` fs at level `level`, with the width of its front. */
function front(from: Departure, level: number, end: number, clock: Clock, backward = false): number {
  const { k0, spread, mass, near } = from;
  const top = backward ? FOLLOWED_SPREADS * spread - k0 : k0 + FOLLOWED_SPREADS * spread;
  if (top <= 0) return 0;
  const speedAt = (k: number): number => {
    const total = near + kineticEnergy(k, mass);
    if (total <= level) return 0;
    return (HBAR * wavenumberOf(total - level, mass) * slowing(clock, total)) / mass;
  };
  const samples = 600;
  const dk = top / samples;
  let best = 0;
  let fastest = 0;
  for (let i = 1; i <= samples; i++) {
    const speed = speedAt(i * dk);
    if (speed > fastest) {
      fastest = speed;
      best = i;
    }
  }
  // Curvature of the speed at its maximum sets the front's decay length (|v''| t / 2)^(1/3).
  const curvature =
    best < samples
      ? Math.abs(speedAt((best + 1) * dk) - 2 * fastest + speedAt((best - 1) * dk)) / (dk * dk)
      : 0;
  return fastest * end + FRONT_LENGTHS * Math.cbrt((curvature * end) / 2);
}

/** Time (fs) in which all promptly moving groups have covered `length` nm on the near side's level. */
export function passage(from: Departure, length: number, clock: Clock, spreads = PROMPT_SPREADS): number {
  const { k0, spread, mass, near } = from;
  const slowest = Math.max(k0 - spreads * spread, k0 / 4);
  const fastest = k0 + spreads * spread;
  let time = 0;
  for (const k of [slowest, k0, fastest]) {
    const speed = ((HBAR * k) / mass) * slowing(clock, near + kineticEnergy(k, mass));
    time = Math.max(time, length / speed);
  }
  return time;
}
