import type { EstimateFigures, Figures, Held, Served, SpectrumFigures, Spread } from "./statistics.js";
import { LONG_LIFETIME } from "./statistics.js";

const percent = (part: number, whole: number) => `${((100 * part) / Math.max(1, whole)).toFixed(1)} %`;
const short = (x: number) => (x >= 1000 || x < 0.01 ? x.toExponential(1) : x.toPrecision(3));
const milliseconds = ({ median, most95 }: Spread) =>
  `median ${(1000 * median).toFixed(0)} ms, 95th percentile ${(1000 * most95).toFixed(0)} ms`;
const ratio = ({ median, most95 }: Spread) => `median ${short(median)}, 95th percentile ${short(most95)}`;
/** Designs named beside a reason. */
const NAMED = 8;

/** The figures as lines for a terminal. */
export function figuresText(figures: Figures, seed: number): string {
  const { designs, outcomes, decades, escapes } = figures;
  const lines = [
    `${designs} designs of seed ${seed}: ${outcomes.answered} answered, ${outcomes.refused} refused, ${outcomes.stopped} stopped, ${outcomes.crashed} crashed`,
    `transmissions by decade, from 1 down: ${decades.join(" ")}`,
    ...(figures.estimate ? estimateLines(figures.estimate) : []),
    ...(figures.spectrum ? spectrumLines(figures.spectrum) : []),
  ];
  if (escapes.length > 0) lines.push("", `ESCAPED: designs ${escapes.join(", ")}`);
  return `${lines.join("\n")}\n`;
}

function spectrumLines({ transmission, reflection, depths, seconds }: SpectrumFigures): string[] {
  return [
    "",
    "spectrum by packet",
    ...heldLines("transmission", transmission),
    ...depths.map(
      ({ least, within, compared, met }) =>
        `    from T = 1 to ${least.toExponential()}: within ${within.toExponential()} of the witness ${met} of ${compared}, ${percent(met, compared)}`,
    ),
    ...heldLines("reflection", reflection),
    `  time a design        ${milliseconds(seconds)}`,
  ];
}

function heldLines(what: string, { compared, escaped, ratio: r, floored, accurate }: Held): string[] {
  return [
    `  ${what.padEnd(20)} truth within the bound ${compared - escaped} of ${compared}; within 1e-6 of it ${percent(accurate, compared)}`,
    `  bound / actual error ${ratio(r)} (${floored} differences below what the witness can tell count as its own error)`,
  ];
}

function estimateLines(figures: EstimateFigures): string[] {
  const { transmission, all, prompt } = figures;
  const groups = figures.doubtful.flatMap(({ failed, count, why, designs }) => [
    `    ${count} x ${failed}: ${why}`,
    `        designs ${designs.slice(0, NAMED).join(", ")}${designs.length > NAMED ? " ..." : ""}`,
  ]);
  return [
    "",
    "estimate",
    ...heldLines("transmission", transmission),
    ...figures.byPart.map(
      ({ part, ratio: r }) => `    where ${part.padEnd(9)} leads ${ratio(r)} (${r.count} designs)`,
    ),
    ...heldLines("reflection", figures.reflection),
    ...servedLines("all", all),
    ...servedLines(`without resonances that live longer than ${LONG_LIFETIME / 1000} ps`, prompt),
    ...(groups.length > 0 ? ["  doubtful, by the checks that failed", ...groups] : []),
  ];
}

function servedLines(which: string, { count, trusted, ratio: r, seconds, processor }: Served): string[] {
  return [
    `  ${which}: ${count} designs`,
    `    trusted at 1e-6    ${trusted}, ${percent(trusted, count)}`,
    `    time a design      ${milliseconds(seconds)}`,
    `    processor time     ${milliseconds(processor)}`,
    `    bound / actual     ${ratio(r)}`,
  ];
}
