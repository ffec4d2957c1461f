import type { Estimate } from "../studies/estimate.js";
import { concise } from "../units/concise.js";
import { formatQuantity } from "../units/quantity.js";
import { checkRow, short, verdictText } from "./checks-text.js";
import { bold, COLUMNS, table, wrap } from "./terminal.js";

/** A share of the packet that moves away from the start is told from here on: it is part of the reflection. */
const NOTABLE_BACKWARD = 1e-6;

/** The answer of `postern estimate` as text. */
export function estimateText(answer: Estimate): string {
  const parts = [
    bold(answer.design.title),
    probabilities(answer),
    energies(answer),
    numerics(answer),
    `checks\n${table(answer.checks.map(checkRow), "  ")}`,
    ...answer.notes.map((note) => wrap(`note: ${note}`, COLUMNS, "      ")),
    verdictText(
      answer.verdict,
      answer.checks,
      `the bound is ${short(answer.accuracy.reached)} of the transmission, ${short(answer.accuracy.asked)} was asked for`,
    ),
  ];
  return parts.join("\n\n");
}

function probabilities({ transmission, reflection, backward }: Estimate): string {
  const rows = [
    ["transmission", bounded(transmission)],
    ["reflection", bounded(reflection)],
  ];
  if (backward > NOTABLE_BACKWARD) {
    rows.push(["  of which", `${short(backward)} moves away from the structure from the start`]);
  }
  const brackets = /\([^)]*\)/.exec(bounded(transmission))?.[0];
  const meaning = `${brackets}: a bound on the error, in units of the last digits; the true value of the model lies within it`;
  return `${table(rows)}\n\n${wrap(meaning)}`;
}

/** People take the transmission at the mean energy for that of the packet: both are shown, with their names. */
function energies({ transmission, atMeanEnergy, meanEnergy, carryingEnergy }: Estimate): string {
  const rows = [
    ["transmission of the packet", bounded(transmission), "all its energies, each with its weight"],
    ["transmission at its mean energy", bounded(atMeanEnergy), `a plane wave of ${energy(meanEnergy, 4)}`],
    [
      "energy that carried most through",
      energy(carryingEnergy, 3),
      "the peak of the energies of what got through",
    ],
  ];
  return `a packet is not its mean energy\n${table(rows, "  ")}`;
}

function numerics(answer: Estimate): string {
  const { grid, time } = answer;
  const length = (value: number) => formatQuantity(value, "length", undefined, 3);
  const duration = (value: number) => formatQuantity(value, "time", undefined, 3);
  const finest = grid.finest_nm < 0.999 * grid.step_nm ? `, finest ${length(grid.finest_nm)}` : "";
  return table([
    ["remaining", `${short(answer.remaining)} of the packet, inside the structure or on its way at the end`],
    ["norm drift", short(answer.normDrift)],
    ["stepper", `${answer.stepper}, ${timeOrder(answer)}`],
    ["grid", `${grid.points} points, step ${length(grid.step_nm)}${finest}`],
    ["time", `${time.steps} steps of ${duration(time.step_fs)}, end ${duration(time.end_fs)}`],
  ]);
}

const timeOrder = ({ order }: Estimate) => (order === "exact" ? "exact in time" : `order ${order}`);

const bounded = ({ value, error }: { value: number; error: number }): string => concise(value, error);

const energy = (value: number, digits: number): string => formatQuantity(value, "energy", undefined, digits);
