import type { Design } from "../problem/design.js";
import { naming, UsageError } from "./usage-error.js";

/** How a command is told which energies a spectrum is to have. */
export interface EnergyFlags {
  readonly low?: string;
  readonly high?: string;
  readonly points?: string;
  readonly energies?: string;
}

const RANGE_HELP = 'Energies are measured from the left level: --low "0.05 eV" --high "0.3 eV" --points 101.';
const LIST_HELP = 'Energies are measured from the left level: --energies "0.1 eV,0.15 eV,0.2 eV".';

/** The energies asked for, eV above the left level; those of the packet where none are. @throws UsageError */
export async function energiesOf(flags: EnergyFlags, design: Design): Promise<readonly number[]> {
  const { low, high, points, energies } = flags;
  if (energies !== undefined) {
    const other = low !== undefined ? "--low" : high !== undefined ? "--high" : points && "--points";
    if (other) throw new UsageError(`${other}: no range is needed beside --energies`, LIST_HELP);
    return listed(energies, design);
  }
  const studies = await import("../studies/spectrum-energies.js");
  if (low === undefined && high === undefined && points === undefined) return studies.packetEnergies(design);
  const count = countOf(points, studies.DEFAULT_ENERGIES, studies.MOST_ENERGIES);
  const own = studies.packetRange(design);
  const from = await energyOf("--low", low, design);
  const to = await energyOf("--high", high, design);
  // The packet's own range may begin at a level, where nothing is transmitted yet.
  const least = studies.threshold(design);
  const last = to ?? own[1];
  const first = from ?? (own[0] > least ? own[0] : least + (last - least) / count);
  if (!(last > first)) throw rangeFault(flags, first, last);
  const even = studies.evenEnergies(first, last, count);
  const options = [low && `--low ${low}`, high && `--high ${high}`, `--points ${count}`].filter(Boolean);
  return naming(options.join(" "), RANGE_HELP, () => {
    studies.checkEnergies(design, even);
    return even;
  });
}

/** The energies of --energies. */
async function listed(text: string, design: Design): Promise<readonly number[]> {
  const [{ parseQuantity }, studies] = await Promise.all([
    import("../units/quantity.js"),
    import("../studies/spectrum-energies.js"),
  ]);
  const parts = text.split(",");
  if (parts.length > studies.MOST_ENERGIES)
    throw new UsageError(
      `--energies: at most ${studies.MOST_ENERGIES} energies are needed; got ${parts.length}`,
      LIST_HELP,
    );
  const energies = parts.map((part) =>
    naming(`--energies ${part.trim()}`, LIST_HELP, () => {
      const energy = parseQuantity(part, "energy", { range: "positive", example: "0.15 eV" });
      studies.checkEnergy(design, energy);
      return energy;
    }),
  );
  naming("--energies", LIST_HELP, () => studies.checkEnergies(design, energies));
  return energies;
}

/** An end of the range. */
async function energyOf(
  option: string,
  text: string | undefined,
  design: Design,
): Promise<number | undefined> {
  if (text === undefined) return undefined;
  const [{ parseQuantity }, { checkEnergy }] = await Promise.all([
    import("../units/quantity.js"),
    import("../studies/spectrum-energies.js"),
  ]);
  return naming(`${option} ${text}`, RANGE_HELP, () => {
    const energy = parseQuantity(text, "energy", { range: "positive", example: "0.15 eV" });
    checkEnergy(design, energy);
    return energy;
  });
}

function countOf(text: string | undefined, fallback: number, most: number): number {
  if (text === undefined) return fallback;
  const count = /^\d+$/.test(text) ? Number(text) : Number.NaN;
  if (count >= 2 && count <= most) return count;
  throw new UsageError(
    `--points ${text}: a whole number from 2 to ${most} is needed; got "${text}"`,
    RANGE_HELP,
  );
}

/** Says which end is to blame; an end that was not given was taken from the packet's energies. */
function rangeFault({ low, high }: EnergyFlags, first: number, last: number): UsageError {
  if (low !== undefined && high !== undefined)
    return new UsageError(
      `--high ${high}: an energy above that of --low is needed; got "${high}"`,
      RANGE_HELP,
    );
  const [given, other, end, value] =
    low !== undefined
      ? [`--low ${low}`, "--high", "above", last]
      : [`--high ${high}`, "--low", "below", first];
  return new UsageError(
    `${given}: the packet's own energies end at ${Number(value.toPrecision(3))} eV, so ${other} is needed as well`,
    `${RANGE_HELP.replace(/:.*/, ":")} ${other} is an energy ${end} that of ${given.split(" ")[0]}.`,
  );
}
