import { kineticEnergy, wavenumberOf } from "../packets/gaussian.js";
import type { Design } from "../problem/design.js";
import { HBAR } from "../units/constants.js";
import { ENERGY_LINE, INK, RESONANCE_LINE } from "./theme.js";

/** An energy that is marked by a line through both panels. */
export interface EnergyMark {
  /** eV above the left level. */
  readonly energy: number;
  /** What it is, for the legend; nothing for a resonance, which has a label of its own. */
  readonly name?: string;
  readonly colour: string;
  /** Lengths of dashes and gaps, in ems. */
  readonly dashes: readonly number[];
  readonly opacity?: number;
}

/** What a figure needs to know of a design. */
export type SpectrumDesign = Pick<Design, "packet" | "particleMass"> & {
  readonly potential: Pick<Design["potential"], "levelLeft" | "levelRight" | "highest">;
};

/** Levels, the top of the potential and the packet's mean energy, as far as they lie from `from` to `to` (eV above the left level). */
export function energyMarks(design: SpectrumDesign, from: number, to: number): EnergyMark[] {
  const { potential, packet } = design;
  const right = potential.levelRight - potential.levelLeft;
  const top = potential.highest - potential.levelLeft;
  const near = packet.from === "left" ? 0 : right;
  const levels =
    right === 0
      ? [{ energy: 0, name: "both levels" }]
      : [
          { energy: 0, name: "left level" },
          { energy: right, name: "right level" },
        ];
  const marks: EnergyMark[] = [
    ...levels.map((level) => ({ ...level, colour: INK, dashes: [0.6, 0.25, 0.1, 0.25] })),
    ...(top > Math.max(0, right)
      ? [{ energy: top, name: "top of the potential", colour: INK, dashes: [0.1, 0.22] }]
      : []),
    { energy: near + packet.energy, name: "mean energy", colour: ENERGY_LINE, dashes: [0.5, 0.32] },
  ];
  return marks.filter(({ energy }) => energy >= from && energy <= to);
}

/** The line of a resonance. */
export const resonanceMark = (energy: number): EnergyMark => ({
  energy,
  colour: RESONANCE_LINE,
  dashes: [0.14, 0.2],
  opacity: 0.8,
});

/**
 * The packet's probability per energy, |phi(k)|^2 / (dE/dk), relative to its greatest value; by energy in eV above the left level.
 */
export function packetWeight({
  packet,
  particleMass,
  potential,
}: SpectrumDesign): (energy: number) => number {
  const { width, energy: mean } = packet;
  const near = packet.from === "left" ? 0 : potential.levelRight - potential.levelLeft;
  const k0 = wavenumberOf(mean, particleMass);
  const density = (k: number) =>
    k > 0 ? (Math.exp(-2 * width * width * (k - k0) ** 2) * particleMass) / (HBAR * HBAR * k) : 0;
  // The maximum of exp(-2 s^2 (k - k0)^2) / k, where 4 s^2 k (k0 - k) = 1; a packet this broad has its peak at k = 0.
  const root = k0 * k0 - 1 / (width * width);
  const peakAt = root > 0 ? (k0 + Math.sqrt(root)) / 2 : k0;
  const peak = density(peakAt);
  return (energy) => {
    const kinetic = energy - near;
    return kinetic > kineticEnergy(0, particleMass)
      ? Math.min(1, density(wavenumberOf(kinetic, particleMass)) / peak)
      : 0;
  };
}
