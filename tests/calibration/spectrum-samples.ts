import { DEFAULT_ACCURACY, type Design } from "../../src/problem/design.js";
import { scatter } from "../../src/stationary/scattering.js";
import { packetSpectrum } from "../../src/studies/packet-spectrum.js";
import { MixingGenerator } from "./mixing-generator.js";
import { compare, type Row, type SpectrumSample } from "./row.js";

/** Energies asked of each design. */
const ENERGIES = 6;
/** They lie between these heights above the higher level, of that of the packet's energy or the structure's top, whichever is more; log-even. */
const HEIGHTS = [0.02, 2] as const;

/** Total energies (eV) at which a design's spectrum is held against the witness, ascending. */
export function sampleEnergies(seed: number, index: number, { potential, packet }: Design): number[] {
  const random = new MixingGenerator(seed, index, 3);
  const threshold = Math.max(potential.levelLeft, potential.levelRight);
  const near = packet.from === "left" ? potential.levelLeft : potential.levelRight;
  const height = Math.max(near + packet.energy, potential.highest) - threshold;
  return Array.from({ length: ENERGIES }, () => threshold + height * random.decades(...HEIGHTS)).sort(
    (a, b) => a - b,
  );
}

/** The spectrum by packet beside the witness. */
export async function spectrumRow(
  design: Design,
  energies: readonly number[],
  signal: AbortSignal,
): Promise<NonNullable<Row["spectrum"]>> {
  const begin = performance.now();
  const accuracy = design.numerics.accuracy ?? DEFAULT_ACCURACY;
  const { rows, floor } = await packetSpectrum(design, energies, accuracy, { signal });
  const seconds = (performance.now() - begin) / 1000;
  const samples = rows.map(({ energy, transmission, reflection }): SpectrumSample => {
    const truth = scatter(design.potential, design.particleMass, energy, design.packet.from);
    return {
      energy,
      transmission: compare(transmission, truth.transmission),
      reflection: compare(reflection, truth.reflection),
    };
  });
  return { seconds, floor, samples };
}
