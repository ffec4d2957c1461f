import type { DrawnPacket, Structure } from "./drawn-design.js";
import { rounded } from "./drawn-design.js";
import type { MixingGenerator } from "./mixing-generator.js";
import { wavenumberOf } from "./packet-guess.js";

/** Where the mean energy lies: of the highest V above the packet's own level, or, over wells alone, in eV. */
const ENERGY_OF_TOP = { below: [0.1, 0.9], near: [0.9, 1.1], above: [1.1, 8] } as const;
/** Widths of the packet in units of the structure's length, log-even ... */
const WIDTH_OF_LENGTH = [0.3, 15] as const;
/**
 * ... as far as k0 in units of its spread, 2 sigma k0, stays between these: 3.3 puts 5e-4 of the packet on its way backward, which is rare but
 * legitimate; above 250 nothing but the cost of a long box changes. A width beyond an end is drawn again, log-even, beside that end.
 */
const FEWEST_SPREADS = 5;
const RARELY_FEWEST_SPREADS = 3.3;
const RARELY = 0.08;
const MOST_SPREADS = 250;
const BESIDE = 8;

export type Height = keyof typeof ENERGY_OF_TOP;

/** A packet from either side, its energy at a given height of the structure. */
export function drawPacket(random: MixingGenerator, structure: Structure, height: Height): DrawnPacket {
  const from = random.chance(0.5) ? "left" : "right";
  return packetFrom(random, structure, from, drawEnergy(random, structure, height, from));
}

/** Kinetic energy on the packet's own side, eV. */
export function drawEnergy(
  random: MixingGenerator,
  structure: Structure,
  height: Height,
  from: "left" | "right",
): number {
  const near = from === "left" ? 0 : structure.levelRight;
  const top = structure.top - near;
  const [low, high] = ENERGY_OF_TOP[height];
  const energy = top > 0.02 ? Math.min(3, top * random.decades(low, high)) : random.decades(0.02, 1);
  // A design's mean energy lies above both levels, or it is refused: one below is drawn again between the higher level and the top.
  const least = 1.02 * Math.max(0, levelAcross(structure, from) - near);
  return energy > least ? energy : random.decades(least, Math.max(2 * least, top));
}

const levelAcross = ({ levelRight }: Structure, from: "left" | "right") => (from === "left" ? levelRight : 0);

export function packetFrom(
  random: MixingGenerator,
  { mass, length }: Structure,
  from: "left" | "right",
  energy: number,
): DrawnPacket {
  const k0 = wavenumberOf(energy, mass);
  const fewest = random.chance(RARELY) ? RARELY_FEWEST_SPREADS : FEWEST_SPREADS;
  const wanted = 2 * k0 * length * random.decades(...WIDTH_OF_LENGTH);
  const spreads =
    wanted < fewest
      ? random.decades(fewest, BESIDE * fewest)
      : wanted > MOST_SPREADS
        ? random.decades(MOST_SPREADS / BESIDE, MOST_SPREADS)
        : wanted;
  const width = spreads / (2 * k0);
  return { energy: rounded(energy), width: rounded(width), from };
}

/**
 * A packet that meets the top of a barrier with its tail: the top lies so many spreads of k above the mean, so that either what tunnels or
 * what passes over it carries most, or both.
 */
export function tailPacket(
  random: MixingGenerator,
  structure: Structure,
  from: "left" | "right",
): DrawnPacket {
  const { mass } = structure;
  const near = from === "left" ? 0 : structure.levelRight;
  const top = structure.top - near;
  const least = Math.max(0.3 * top, 1.02 * (levelAcross(structure, from) - near));
  const energy = random.between(least, Math.max(least, 0.9 * top));
  const k0 = wavenumberOf(energy, mass);
  const gap = wavenumberOf(top, mass) - k0;
  const spreads = random.between(1, 9);
  const width = Math.min(MOST_SPREADS / (2 * k0), Math.max(FEWEST_SPREADS / (2 * k0), spreads / (2 * gap)));
  return { energy: rounded(energy), width: rounded(width), from };
}
