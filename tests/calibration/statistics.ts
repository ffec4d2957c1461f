import { type Comparison, hasEscaped, type Part, type Row } from "./row.js";

/** The value below which the share `p` of the sorted values lies, interpolated; NaN of none. */
export function quantile(values: readonly number[], p: number): number {
  if (values.length === 0) return Number.NaN;
  const sorted = [...values].sort((a, b) => a - b);
  const place = p * (sorted.length - 1);
  const [below, above] = [sorted[Math.floor(place)], sorted[Math.ceil(place)]];
  // Equal neighbours may both be infinite.
  return below === above ? below : below + (above - below) * (place - Math.floor(place));
}

export interface Spread {
  readonly count: number;
  readonly median: number;
  readonly most95: number;
}

export const spread = (values: readonly number[]): Spread => ({
  count: values.length,
  median: quantile(values, 0.5),
  most95: quantile(values, 0.95),
});

export interface Held {
  readonly compared: number;
  readonly escaped: number;
  readonly ratio: Spread;
  /** Differences too small for the reference to tell: their ratios count as the least that they can be. */
  readonly floored: number;
  /** Differences within 1e-6 of the reference's value. */
  readonly accurate: number;
}

export const ACCURACY = 1e-6;
/** Lifetime (fs) above which a design counts as one that holds its packet for long. */
export const LONG_LIFETIME = 1000;

export function held(comparisons: readonly Comparison[]): Held {
  return {
    compared: comparisons.length,
    escaped: comparisons.filter(({ escaped }) => escaped).length,
    ratio: spread(comparisons.map(({ ratio }) => ratio)),
    floored: comparisons.filter(({ floored }) => floored).length,
    accurate: comparisons.filter(({ difference, reference }) => difference <= ACCURACY * reference).length,
  };
}

/** How designs were served. */
export interface Served {
  readonly count: number;
  readonly trusted: number;
  readonly ratio: Spread;
  readonly seconds: Spread;
  readonly processor: Spread;
}

export interface EstimateFigures {
  readonly transmission: Held;
  readonly reflection: Held;
  /** Of all that were answered or stopped. */
  readonly all: Served;
  /** Of those that hold their packet for no more than a picosecond. */
  readonly prompt: Served;
  readonly byPart: readonly { readonly part: Part; readonly ratio: Spread }[];
  readonly doubtful: readonly {
    readonly failed: string;
    readonly count: number;
    readonly why: string;
    readonly designs: readonly number[];
  }[];
}

export interface SpectrumFigures {
  readonly transmission: Held;
  readonly reflection: Held;
  /** Of the transmissions down to a depth, those within a relative distance of the witness. */
  readonly depths: readonly {
    readonly least: number;
    readonly within: number;
    readonly compared: number;
    readonly met: number;
  }[];
  readonly seconds: Spread;
}

/** What is asked of a spectrum by packet: within the second number of the witness from T = 1 down to the first. */
const DEPTHS = [
  [1e-18, 1e-6],
  [1e-24, 1e-3],
] as const;

/** All figures of a run. */
export interface Figures {
  readonly designs: number;
  readonly outcomes: Readonly<Record<Row["outcome"], number>>;
  readonly escapes: readonly number[];
  /** How many of the compared transmissions lie in each decade, from 1 downward. */
  readonly decades: readonly number[];
  readonly estimate?: EstimateFigures;
  readonly spectrum?: SpectrumFigures;
}

export function figuresOf(rows: readonly Row[]): Figures {
  const count = (outcome: Row["outcome"]) => rows.filter((row) => row.outcome === outcome).length;
  const estimated = rows.filter((row) => row.estimate !== undefined);
  const spectra = rows.flatMap(({ spectrum }) => (spectrum ? [spectrum] : []));
  return {
    designs: rows.length,
    outcomes: {
      answered: count("answered"),
      refused: count("refused"),
      stopped: count("stopped"),
      crashed: count("crashed"),
    },
    escapes: rows.filter(hasEscaped).map(({ index }) => index),
    decades: decadesOf(rows),
    estimate: estimated.length > 0 ? estimateFigures(rows) : undefined,
    spectrum: spectra.length > 0 ? spectrumFigures(spectra) : undefined,
  };
}

function spectrumFigures(spectra: readonly NonNullable<Row["spectrum"]>[]): SpectrumFigures {
  const transmissions = spectra.flatMap(({ samples }) => samples.map((s) => s.transmission));
  return {
    transmission: held(transmissions),
    reflection: held(spectra.flatMap(({ samples }) => samples.map((s) => s.reflection))),
    depths: DEPTHS.map(([least, within]) => {
      const deep = transmissions.filter(({ reference }) => reference >= least);
      const met = deep.filter(({ difference, reference }) => difference <= within * reference).length;
      return { least, within, compared: deep.length, met };
    }),
    seconds: spread(spectra.map(({ seconds }) => seconds)),
  };
}

function decadesOf(rows: readonly Row[]): number[] {
  const decades: number[] = [];
  for (const { reference } of rows) {
    if (reference === undefined) continue;
    const decade = Math.max(0, Math.floor(-Math.log10(Math.max(reference.transmission.value, 1e-300))));
    while (decades.length <= decade) decades.push(0);
    decades[decade]++;
  }
  return decades;
}

type Estimated = Row & { readonly estimate: NonNullable<Row["estimate"]> };

function estimateFigures(rows: readonly Row[]): EstimateFigures {
  const estimated = rows.filter((row): row is Estimated => row.estimate !== undefined);
  const isPrompt = ({ reference }: Row) => (reference?.lifetime ?? 0) <= LONG_LIFETIME;
  const due = (some: readonly Row[]) =>
    some.filter(({ outcome, estimate }) => estimate !== undefined || outcome === "stopped").length;
  const parts = [...new Set(estimated.map(({ estimate }) => estimate.dominant))];
  return {
    transmission: held(estimated.map(({ estimate }) => estimate.transmission)),
    reflection: held(estimated.map(({ estimate }) => estimate.reflection)),
    all: served(estimated, due(rows)),
    prompt: served(estimated.filter(isPrompt), due(rows.filter(isPrompt))),
    byPart: parts.map((part) => ({
      part,
      ratio: spread(
        estimated
          .filter(({ estimate }) => estimate.dominant === part)
          .map(({ estimate }) => estimate.transmission.ratio),
      ),
    })),
    doubtful: doubtfulGroups(estimated),
  };
}

function served(rows: readonly Estimated[], count: number): Served {
  return {
    count,
    trusted: rows.filter(({ estimate }) => estimate.verdict === "trusted").length,
    ratio: spread(rows.map(({ estimate }) => estimate.transmission.ratio)),
    seconds: spread(rows.map(({ estimate }) => estimate.seconds)),
    processor: spread(rows.map(({ estimate }) => estimate.processor)),
  };
}

/** The doubtful ones by the checks that failed, the most frequent first. The check of the accuracy follows from the others and is named only alone. */
function doubtfulGroups(rows: readonly Estimated[]): EstimateFigures["doubtful"] {
  const groups = new Map<string, { why: string; designs: number[] }>();
  for (const { index, estimate } of rows) {
    if (estimate.verdict === "trusted") continue;
    const causes = estimate.failed.filter(({ name }) => name !== "accuracy");
    const named = causes.length > 0 ? causes : estimate.failed;
    const name = named.map((check) => check.name).join(" + ");
    const group = groups.get(name) ?? { why: named.map(({ why }) => why).join("; "), designs: [] };
    group.designs.push(index);
    groups.set(name, group);
  }
  return [...groups]
    .map(([failed, { why, designs }]) => ({ failed, why, designs, count: designs.length }))
    .sort((a, b) => b.count - a.count);
}
