import type { Check } from "../studies/calculation.js";
import { bold, COLUMNS, wrap } from "./terminal.js";

/** Two significant digits: enough for a size. */
export function short(value: number): string {
  const rounded = Number(value.toPrecision(2));
  return rounded !== 0 && Math.abs(rounded) < 1e-3 ? rounded.toExponential() : String(rounded);
}

/** One check as cells of a table. */
export function checkRow({ name, value, limit, passed }: Check): string[] {
  return [passed ? "passed" : "FAILED", name, short(value), `limit ${short(limit)}`];
}

/** The verdict in words: `reached` when trusted, else the failed checks with what they mean. */
export function verdictText(
  verdict: "trusted" | "doubtful",
  checks: readonly Check[],
  reached: string,
): string {
  if (verdict === "trusted") return wrap(`${bold("trusted")}: all checks passed; ${reached}`);
  const reasons = checks
    .filter(({ passed }) => !passed)
    .map(({ name, value, limit, explanation }) =>
      wrap(`  ${name} is ${short(value)}, above its limit ${short(limit)}: ${explanation}`, COLUMNS, "    "),
    );
  return [`${bold("doubtful")}:`, ...reasons].join("\n");
}
