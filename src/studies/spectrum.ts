import { DEFAULT_ACCURACY, type Design } from "../problem/design.js";
import { stationaryRefusal } from "../stationary/refusal.js";
import type { Resonance } from "../stationary/resonances.js";
import { resonancesBetween } from "../stationary/resonances-between.js";
import { prepareScattering, type Scatterer } from "../stationary/scattering.js";
import { stepperNamed } from "../steppers/registry.js";
import type { Check, StudyOptions } from "./calculation.js";
import { DesignLimitError } from "./limits.js";
import { packetSpectrum, type SpectrumPacket } from "./packet-spectrum.js";
import { spectrumChecks } from "./spectrum-checks.js";
import { checkEnergies, threshold } from "./spectrum-energies.js";
import { spectrumNotes } from "./spectrum-notes.js";
import { SPECTRUM_METHODS, type SpectrumMethod, type SpectrumRow } from "./spectrum-row.js";

export interface SpectrumOptions extends StudyOptions {
  /** Default "packet". */
  readonly method?: SpectrumMethod;
}

/** Transmission against energy, and what the verdict rests on. */
export interface Spectrum {
  readonly design: { readonly title: string; readonly sha256: string };
  readonly method: SpectrumMethod;
  /** At exactly the energies asked for, ascending. */
  readonly rows: readonly SpectrumRow[];
  /** The packets that the rows were read from; none for the stationary method. */
  readonly packets: readonly SpectrumPacket[];
  /** Transmission below which round-off may hide it. */
  readonly floor: number;
  /** Relative accuracy of the transmission: what was asked for and what the widest bound says was reached. */
  readonly accuracy: { readonly asked: number; readonly reached: number };
  /** Resonances within the range, however narrow, by the witness: energy (eV above the left level) and full width at half height, eV. */
  readonly resonances: readonly Resonance[];
  readonly checks: readonly Check[];
  readonly verdict: "trusted" | "doubtful";
  /** What a reader should know, in sentences. */
  readonly notes: readonly string[];
}

/**
 * Transmission and reflection of plane waves against energy, each with a bound, for the potential of a design.
 *
 * @param energies eV above the left level, ascending, each once, above both levels; at most MOST_ENERGIES
 * @param options.method "packet" (default): read from wavepackets of the program's own choice, which pass the structure in time;
 *   "stationary": by the witness, without time
 * @returns one row for each energy; `verdict` is "trusted" when every bound is within the accuracy asked for
 * @throws RangeError for energies that are refused; DesignLimitError when the design cannot be computed as written; rejects with the
 *   signal's reason when stopped
 */
export async function spectrum(
  design: Design,
  energies: readonly number[],
  options: SpectrumOptions = {},
): Promise<Spectrum> {
  const { method = "packet" } = options;
  if (!SPECTRUM_METHODS.includes(method))
    throw new TypeError(`the method must be ${SPECTRUM_METHODS.join(" or ")}; got "${method}"`);
  // Says in its own words why nothing is transmitted, where that is so.
  threshold(design);
  const { potential, numerics } = design;
  const refusal = stationaryRefusal(potential);
  if (refusal) throw new DesignLimitError("potential", refusal);
  const unable = numerics.stepper && stepperNamed(numerics.stepper)?.refusal(potential);
  if (unable) throw new DesignLimitError("numerics.stepper", unable);
  checkEnergies(design, energies);
  const asked = numerics.accuracy ?? DEFAULT_ACCURACY;
  const totals = energies.map((energy) => potential.levelLeft + energy);
  const witness = prepareScattering(potential, design.particleMass);
  const { points, packets, floor } =
    method === "packet"
      ? await byPacket(design, totals, asked, options)
      : await byWitness(witness, totals, options);
  const rows = points.map(({ transmission, reflection }, n) => ({
    energy: energies[n],
    transmission,
    reflection,
  }));
  const checks = spectrumChecks(rows, asked, floor);
  return {
    design: { title: design.title, sha256: design.sha256 },
    method,
    rows,
    packets,
    floor,
    accuracy: { asked, reached: checks[0].value },
    resonances: resonancesOf(design, totals),
    checks,
    verdict: checks.every((check) => check.passed) ? "trusted" : "doubtful",
    notes: spectrumNotes(design, method, rows, floor),
  };
}

/** The resonances from the first energy to the last. */
function resonancesOf({ potential, particleMass }: Design, totals: readonly number[]): Resonance[] {
  const [from, to] = [totals[0], totals[totals.length - 1]];
  return resonancesBetween(potential, particleMass, from, to).map(({ energy, width }) => ({
    energy: energy - potential.levelLeft,
    width,
  }));
}

type Point = Pick<SpectrumRow, "transmission" | "reflection">;

interface Answers {
  readonly points: readonly Point[];
  readonly packets: readonly SpectrumPacket[];
  readonly floor: number;
}

async function byPacket(
  design: Design,
  totals: readonly number[],
  accuracy: number,
  options: StudyOptions,
): Promise<Answers> {
  const { rows, packets, floor } = await packetSpectrum(design, totals, accuracy, options);
  return { points: rows, packets, floor };
}

/** Wall time (ms) between two returns to the event loop: signals and progress are seen that often. */
const BREATH_MS = 40;
/** The witness keeps every T right relative to itself, down to the least normal double: 2^-1022. */
const LEAST_NORMAL = 2 ** -1022;

async function byWitness(
  witness: Scatterer,
  totals: readonly number[],
  { signal, onProgress }: StudyOptions,
): Promise<Answers> {
  signal?.throwIfAborted();
  const points: Point[] = [];
  let lastBreath = performance.now();
  for (const [n, energy] of totals.entries()) {
    points.push(witness.at(energy));
    if (performance.now() - lastBreath < BREATH_MS) continue;
    onProgress?.("spectrum, energy by energy", (n + 1) / totals.length);
    await new Promise((resolve) => setTimeout(resolve));
    signal?.throwIfAborted();
    lastBreath = performance.now();
  }
  return { points, packets: [], floor: LEAST_NORMAL };
}
