import { DesignError, DesignLimitError, type Estimate, estimate, readDesign } from "../../src/index.js";
import type { Design } from "../../src/problem/design.js";
import type { DrawnDesign } from "./drawn-design.js";
import { compare, type EstimateRow, hasEscaped, PARTS, type Part, type Row } from "./row.js";
import { sampleEnergies, spectrumRow } from "./spectrum-samples.js";
import { closedFormReference, type Reference, witnessReference } from "./witness.js";

export type Study = "estimate" | "spectrum" | "both";

export interface MeasureOptions {
  readonly study: Study;
  /** Seconds after which a calculation is stopped. */
  readonly patience: number;
}

/** Takes a drawn design through the library from its text, and holds the answers against the witness. Whatever goes wrong is part of the row. */
export async function measure(drawn: DrawnDesign, options: MeasureOptions): Promise<Row> {
  const { index, family, theme, text } = drawn;
  const about = { index, family, theme, text };
  let answered: Partial<Row> = {};
  try {
    const design = readDesign(text);
    for await (const more of answers(drawn, design, options)) answered = { ...answered, ...more };
    const row: Row = { ...about, outcome: "answered", ...answered };
    return hasEscaped(row) ? { ...row, arbiter: closedFormReference(drawn, design) } : row;
  } catch (cause) {
    return { ...about, ...answered, outcome: outcomeOf(cause), message: sentence(cause) };
  }
}

/** One answer after the other, so that the earlier ones stand when a later one fails. */
async function* answers(
  { seed, index }: DrawnDesign,
  design: Design,
  { study, patience }: MeasureOptions,
): AsyncGenerator<Partial<Row>> {
  const signal = () => AbortSignal.timeout(1000 * patience);
  if (study !== "spectrum") {
    const reference = witnessReference(design);
    yield { reference };
    const begin = performance.now();
    const used = process.cpuUsage();
    const answer = await estimate(design, { signal: signal() });
    const { user, system } = process.cpuUsage(used);
    const times = { seconds: (performance.now() - begin) / 1000, processor: (user + system) / 1e6 };
    yield { estimate: estimateRow(answer, reference, times) };
  }
  if (study !== "estimate")
    yield { spectrum: await spectrumRow(design, sampleEnergies(seed, index, design), signal()) };
}

function estimateRow(
  answer: Estimate,
  reference: Reference,
  times: Pick<EstimateRow, "seconds" | "processor">,
): EstimateRow {
  const { parts } = answer;
  return {
    verdict: answer.verdict,
    failed: answer.checks
      .filter(({ passed }) => !passed)
      .map(({ name, value, explanation }) => ({ name, value, why: explanation })),
    stepper: answer.stepper,
    points: answer.grid.points,
    steps: answer.time.steps,
    runs: answer.runs.map(({ transmission }) => transmission),
    ...times,
    parts,
    dominant: PARTS.reduce((most: Part, part) => (parts[part] > parts[most] ? part : most), PARTS[0]),
    transmission: compare(answer.transmission, reference.transmission),
    reflection: compare(answer.reflection, reference.reflection),
  };
}

function outcomeOf(cause: unknown): Row["outcome"] {
  if (cause instanceof DesignError || cause instanceof DesignLimitError) return "refused";
  return cause instanceof DOMException && cause.name === "TimeoutError" ? "stopped" : "crashed";
}

const sentence = (cause: unknown) =>
  cause instanceof Error ? `${cause.name}: ${cause.message}` : String(cause);
