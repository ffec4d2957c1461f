import { scaleLinear } from "d3-scale";
import { departure } from "../grid/journey.js";
import { kineticEnergy } from "../packets/gaussian.js";
import type { Design } from "../problem/design.js";
import { resonancesBetween } from "../stationary/resonances-between.js";
import { formatQuantity } from "../units/quantity.js";
import { DesignLimitError } from "./limits.js";

/** Most energies of one spectrum. A row is some hundred bytes, and a figure shows some thousand: this many is beyond any use. */
export const MOST_ENERGIES = 100_000;
/** Energies of a spectrum for which nothing else was asked, about. */
export const DEFAULT_ENERGIES = 101;
/** Spreads of k to either side of the mean that such a spectrum covers; the packet has e^-8 of its peak there. */
const COVERED_SPREADS = 4;

/**
 * The energy (eV above the left level) below which nothing is transmitted: that of the higher level.
 * @throws DesignLimitError for a potential that rises without limit on one side or on both
 */
export function threshold({ potential }: Design): number {
  const { shape, levelLeft, levelRight, confining } = potential;
  if (confining)
    throw new DesignLimitError(
      "potential",
      `the ${shape} potential confines the particle on both sides, so nothing is transmitted; use "postern map" to see the packet move`,
    );
  if (!Number.isFinite(levelLeft) || !Number.isFinite(levelRight))
    throw new DesignLimitError(
      "potential",
      `the ${shape} potential has no level on one of its sides, so no energy is transmitted`,
    );
  return Math.max(levelLeft, levelRight) - levelLeft;
}

/** Refuses an energy (eV above the left level) at which nothing can be transmitted. @throws RangeError */
export function checkEnergy(design: Design, energy: number): void {
  const least = threshold(design);
  if (energy > least && Number.isFinite(energy)) return;
  const got = Number.isFinite(energy) ? `"${formatQuantity(energy, "energy")}"` : String(energy);
  const why = `because the right level of the potential lies ${formatQuantity(least, "energy")} above the left one`;
  throw new RangeError(
    least > 0
      ? `an energy above ${formatQuantity(least, "energy")} is needed, ${why}; got ${got}`
      : `an energy above zero, the level on the left, is needed; got ${got}`,
  );
}

/** Refuses energies that are not ascending, repeated, too many, or such that nothing can be transmitted. @throws RangeError */
export function checkEnergies(design: Design, energies: readonly number[]): void {
  if (energies.length === 0) throw new RangeError("at least one energy is needed; got none");
  if (energies.length > MOST_ENERGIES)
    throw new RangeError(`at most ${MOST_ENERGIES} energies are needed; got ${energies.length}`);
  for (const [n, energy] of energies.entries()) {
    checkEnergy(design, energy);
    if (n > 0 && !(energy > energies[n - 1])) {
      const [before, after] = [energies[n - 1], energy].map((each) => formatQuantity(each, "energy"));
      throw new RangeError(`ascending energies are needed, each once; "${after}" comes after "${before}"`);
    }
  }
}

/** `count` evenly spaced energies from `low` to `high`, both of them included exactly. */
export function evenEnergies(low: number, high: number, count: number): number[] {
  return Array.from({ length: count }, (_, n) =>
    n === count - 1 ? high : low + ((high - low) * n) / (count - 1),
  );
}

/** The energies (eV above the left level) that the design's packet has, from end to end, above both levels. */
export function packetRange(design: Design): readonly [low: number, high: number] {
  const least = threshold(design);
  const { k0, spread, mass, near } = departure(design);
  const energyOf = (k: number) => near - design.potential.levelLeft + kineticEnergy(Math.max(0, k), mass);
  return [Math.max(least, energyOf(k0 - COVERED_SPREADS * spread)), energyOf(k0 + COVERED_SPREADS * spread)];
}

/** Offsets from a resonance, in its widths, at which a spectrum of our own choice looks at it too: a peak is else drawn through its neighbours. */
const ON_RESONANCE = [-1, -0.5, -0.25, 0, 0.25, 0.5, 1];
/** A resonance narrower than this share of the distance between two energies is marked, but not drawn: it would take packets of its own. */
const DRAWN_WIDTH = 0.25;

/** About a hundred round energies over the packet's own, and more where a resonance rises and falls between them, for whoever asks for none. */
export function packetEnergies(design: Design): number[] {
  const { potential, particleMass } = design;
  const [low, high] = packetRange(design);
  const least = threshold(design);
  const even = scaleLinear()
    .domain([low, high])
    .ticks(DEFAULT_ENERGIES - 1)
    .filter((energy) => energy > least);
  const step = even[1] - even[0];
  const [first, last] = [even[0], even[even.length - 1]];
  const level = potential.levelLeft;
  const onPeaks = resonancesBetween(potential, particleMass, first + level, last + level)
    .filter(({ width }) => width > DRAWN_WIDTH * step && width < step / DRAWN_WIDTH)
    .flatMap(({ energy, width }) => ON_RESONANCE.map((offset) => energy - level + offset * width))
    .filter((energy) => energy > first && energy < last);
  return [...new Set([...even, ...onPeaks])].sort((a, b) => a - b);
}
