import type { Potential } from "../../src/potentials/potential.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { integrateBetween } from "../potentials/tanh-sinh.js";
import { shape } from "../stationary/helpers.js";

// Potentials with a closed form that no shape of the program expresses.

/** Two points of equal strength (eV nm) a distance (nm) apart; mass in m_e. */
export function twoPoints(strength: number, distance: number, massInElectrons: number): Potential {
  const share = (x: number, a: number, b: number) => (x < a || x > b ? 0 : x === a || x === b ? 0.5 : 1);
  return {
    ...shape("delta", { strength }, massInElectrons),
    shape: "two points",
    cellAverage: (a, b) => (strength * (share(0, a, b) + share(distance, a, b))) / (b - a),
    slopeTransform: undefined,
    interfaces: [0, distance],
    faces: [0, distance],
  };
}

/** V and mass given between interfaces, flat outside: nm, eV, m_e. */
export function between(
  places: readonly number[],
  value: (x: number) => number,
  mass: (x: number) => number,
  scale: number,
  levelRight = 0,
): Potential {
  const [left, right] = [places[0], places[places.length - 1]];
  const besides = (x: number) => (x < left ? 0 : x > right ? levelRight : value(x));
  // At a jump the mean of both sides, as the contract of a potential has it.
  const tiny = 1e-13;
  const levelled = (x: number) =>
    places.includes(x) ? (besides(x - tiny) + besides(x + tiny)) / 2 : besides(x);
  const samples = Array.from({ length: 101 }, (_, i) => value(left + ((right - left) * i) / 100));
  return {
    shape: "between",
    value: levelled,
    cellAverage: (a, b) => integrateBetween(levelled, a, b, places, b - a) / (b - a),
    mass: (x) => mass(x) * ELECTRON_MASS,
    massAverage: (a, b) => (integrateBetween(mass, a, b, places, b - a) / (b - a)) * ELECTRON_MASS,
    interfaces: places,
    faces: [left, right],
    levelLeft: 0,
    levelRight,
    lowest: Math.min(0, levelRight, ...samples),
    highest: Math.max(0, levelRight, ...samples),
    scale,
    uniformMass: false,
    confining: false,
  };
}

interface Trapezoid {
  /** V at the first and at the last interface, and the level beyond, eV. */
  readonly first: number;
  readonly last: number;
  readonly levelRight: number;
  /** nm. */
  readonly width: number;
  /** Masses of the particle and inside, m_e. */
  readonly mass: number;
  readonly own: number;
}

/** A barrier whose top slopes. */
export function trapezoid({ first, last, levelRight, width, mass, own }: Trapezoid): Potential {
  const slope = (last - first) / width;
  // Lengths of [a, b] inside and behind.
  const inside = (a: number, b: number) => Math.max(0, Math.min(b, width) - Math.max(a, 0));
  const behind = (a: number, b: number) => Math.max(0, b - Math.max(a, width));
  const middle = (a: number, b: number) => (Math.max(a, 0) + Math.min(b, width)) / 2;
  return {
    ...between(
      [0, width],
      (x) => first + slope * x,
      (x) => (x > 0 && x < width ? own : mass),
      width,
      levelRight,
    ),
    shape: "trapezoid",
    cellAverage: (a, b) =>
      (inside(a, b) * (first + slope * middle(a, b)) + behind(a, b) * levelRight) / (b - a),
    massAverage: (a, b) => (mass + ((own - mass) * inside(a, b)) / (b - a)) * ELECTRON_MASS,
  };
}

/**
 * A profile that falls without end, bent smoothly into a level: max(V, L) + w ln(1 + exp(-|V - L|/w)), which is V to round-off from 37 w above
 * the level on. What a wave of energy E that falls with slope F is reflected by in the bend has an amplitude of exp(-2 pi k w/F), where hbar k is
 * its momentum there: the singularities nearest to the real axis lie where (V - L)/w = i pi.
 */
const bent = (value: (x: number) => number, level: number, softness: number) => (x: number) => {
  const v = value(x);
  return Math.max(v, level) + softness * Math.log1p(Math.exp(-Math.abs(v - level) / softness));
};

/** exp(-40) = 4e-18 of the amplitude may come back from a bend, and show of it 20 softnesses above where a wave still tunnels. */
const BEND = 40;
/** Softnesses from the level up to what must not notice the bend. */
const ABOVE = 45;

interface Profile {
  readonly value: (x: number) => number;
  readonly interfaces: readonly number[];
  readonly faces: readonly [left: number, right: number];
  readonly levels: readonly [left: number, right: number];
  readonly top: number;
  readonly scale: number;
  readonly mass: number;
}

function profile({ value, interfaces, faces, levels, top, scale, mass }: Profile): Potential {
  return {
    ...between(faces, value, () => mass, scale, levels[1]),
    shape: "profile",
    value,
    cellAverage: (a, b) => integrateBetween(value, a, b, interfaces, b - a) / (b - a),
    interfaces,
    levelLeft: levels[0],
    lowest: Math.min(...levels),
    highest: top,
    uniformMass: true,
  };
}

/** The parabola V0 - m omega^2 x^2/2, bent into levels so far below that it does not show; eV, m_e. */
export function parabola({
  top,
  quantum,
  mass,
  bend = BEND,
}: {
  readonly top: number;
  readonly quantum: number;
  readonly mass: number;
  /** Exponent of what comes back. */
  readonly bend?: number;
}): Potential {
  const stiffness = mass * ELECTRON_MASS * (quantum / HBAR) ** 2;
  // k w/F in the bend is w/(hbar omega), whatever the depth.
  const softness = (bend * quantum) / (2 * Math.PI);
  const level = top - ABOVE * softness;
  const place = (v: number) => Math.sqrt((2 * (top - v)) / stiffness);
  const end = place(level - 45 * softness);
  return profile({
    value: bent((x) => top - 0.5 * stiffness * x * x, level, softness),
    interfaces: [],
    faces: [-end, end],
    levels: [level, level],
    top,
    scale: softness / (stiffness * place(level)),
    mass,
  });
}

/** V = 0 before x = 0, then V0 - F x, bent into a level so far below that it does not show; eV, eV/nm, m_e. */
export function triangle({
  top,
  force,
  mass,
  bend = BEND,
}: {
  readonly top: number;
  readonly force: number;
  readonly mass: number;
  readonly bend?: number;
}): Potential {
  // 2 pi k w/F = bend with (hbar k)^2/2m = ABOVE w.
  const softness =
    ((bend * force) / (2 * Math.PI)) ** (2 / 3) * (HBAR ** 2 / (2 * mass * ELECTRON_MASS * ABOVE)) ** (1 / 3);
  const level = -ABOVE * softness;
  const slope = bent((x) => top - force * x, level, softness);
  return profile({
    value: (x) => (x < 0 ? 0 : x === 0 ? top / 2 : slope(x)),
    interfaces: [0],
    faces: [0, (top - level + 45 * softness) / force],
    levels: [0, level],
    top,
    scale: softness / force,
    mass,
  });
}
