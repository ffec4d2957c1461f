import type { Crosscheck } from "../studies/crosscheck.js";
import type { CrosscheckCheck } from "../studies/crosscheck-checks.js";
import type { MeasuredOrder } from "../studies/measured-order.js";
import { stateError } from "../studies/motion.js";
import type { Bounded } from "../units/bounded.js";
import { concise } from "../units/concise.js";
import { formatQuantity } from "../units/quantity.js";
import { short } from "./checks-text.js";
import { bold, COLUMNS, table, wrap } from "./terminal.js";

/** The answer of `postern crosscheck` as text. */
export function crosscheckText(answer: Crosscheck): string {
  return [
    bold(answer.design.title),
    probabilities(answer),
    matched(answer),
    `differences\n${table([["", "", "differs by", "bounds together"], ...answer.checks.filter(({ kind }) => kind === "comparison").map(checkRow)], "  ")}`,
    `measured orders: the power that the error falls with\n${table([["", "of", "declared", "measured"], ...answer.orders.map(orderRow)], "  ")}`,
    `conservation\n${table([["", "", "value", "limit"], ...answer.checks.filter(({ kind }) => kind === "basic").map(checkRow)], "  ")}`,
    ...answer.notes.map((note) => wrap(`note: ${note}`, COLUMNS, "      ")),
    verdict(answer),
  ].join("\n\n");
}

/** Methods side by side, each with its own best numbers. */
function probabilities({ steppers, witness, refused }: Crosscheck): string {
  const rows = [
    ["each on its own grid", "transmission", "reflection", "norm drift", "grid and time"],
    ...steppers.map(({ stepper, order, transmission, reflection, normDrift, grid, time }) => [
      `${stepper}, order ${order}`,
      bounded(transmission),
      bounded(reflection),
      short(normDrift),
      `${grid.points} points, ${time.steps} steps`,
    ]),
    [
      `${witness.name} witness`,
      bounded(witness.transmission),
      bounded(witness.reflection),
      "",
      `${witness.energies} energies, no time`,
    ],
  ];
  const unable = refused.map(({ name, reason }) => wrap(`${name} cannot do this design: ${reason}`));
  return [table(rows), ...unable].join("\n");
}

/** What every method made of the same motion. */
function matched({ matched: { end_fs, instants, motions, composed } }: Crosscheck): string {
  const end = formatQuantity(end_fs, "time", undefined, 3);
  const rows = [
    ...motions.map((motion) => [motion.name, `state within ${short(stateError(motion))}`, motion.method]),
    ["stationary witness", `state within ${short(composed.error)}`, `${composed.waves} waves added up`],
  ];
  return `on matched settings: the same start, followed in true time to ${end}, ${instants} common instants\n${table(rows, "  ")}`;
}

function orderRow({ stepper, of, order, declared, measured, roundOff, passed }: MeasuredOrder): string[] {
  const name = of === "time step" ? `${stepper}, order ${order}` : stepper;
  const found = [measured?.toFixed(2), roundOff ? "at round-off" : undefined].filter(Boolean).join(", ");
  return [`${mark(passed)}  ${name}`, of, declared === undefined ? "spectral" : String(declared), found];
}

function checkRow({ name, value, limit, passed }: CrosscheckCheck): string[] {
  return [mark(passed), name, short(value), short(limit)];
}

const mark = (passed: boolean): string => (passed ? "passed" : "FAILED");

function verdict({ agree, firstDisagreement, checks, steppers, witness, difference }: Crosscheck): string {
  const others = checks.filter(({ kind, passed }) => kind !== "comparison" && !passed);
  const beside = others.map(({ name, explanation }) =>
    wrap(`  beside that, ${name} does not pass: ${explanation}`, COLUMNS, "    "),
  );
  if (agree) {
    const methods = [...steppers.map(({ stepper }) => stepper), `the ${witness.name} witness`];
    const list = `${methods.slice(0, -1).join(", ")} and ${methods[methods.length - 1]}`;
    const relative = difference.transmission / witness.transmission.value;
    const close = `${difference.between.join(" and ")} differ by ${short(relative)} of the transmission`;
    return [wrap(`${bold("agree")}: ${list}, within their bounds; ${close}`), ...beside].join("\n");
  }
  const failed = checks.filter(({ kind, passed }) => kind === "comparison" && !passed);
  return [
    wrap(`${bold("do not agree")}: the first check to break is ${firstDisagreement}`, COLUMNS, "  "),
    ...failed.map(({ name, value, limit }) => `  ${name}: ${short(value)}, bounds together ${short(limit)}`),
  ].join("\n");
}

const bounded = ({ value, error }: Bounded): string => concise(value, error);
