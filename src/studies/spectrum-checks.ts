import { formatQuantity } from "../units/quantity.js";
import { atMost, type Check } from "./calculation.js";
import { relativeError } from "./common-checks.js";
import type { SpectrumRow } from "./spectrum-row.js";

/** What T + R may miss of 1 beyond the bounds of both: rounding of the sum itself. */
const SUM_ROUNDING = 4 * Number.EPSILON;
/** Energies that a sentence names. */
const NAMED = 3;

/** The checks of a spectrum's rows: each bound against the accuracy asked for, and T + R = 1 within the bounds. */
export function spectrumChecks(rows: readonly SpectrumRow[], accuracy: number, floor: number): Check[] {
  const relative = rows.map(({ transmission: { value, error } }) => relativeError(error, value));
  const worst = relative.indexOf(Math.max(...relative));
  const missed = rows.map((_, n) => n).filter((n) => !(relative[n] <= accuracy));
  return [
    atMost("accuracy", relative[worst], accuracy, accuracyText(rows, relative, worst, missed, floor)),
    atMost(
      "sum",
      Math.max(0, ...rows.map(excess)),
      SUM_ROUNDING,
      "what transmission and reflection together miss of 1, beyond their bounds",
    ),
  ];
}

/** |T + R - 1| beyond the bounds of both. */
function excess({ transmission, reflection }: SpectrumRow): number {
  const gap = Math.abs(transmission.value + reflection.value - 1);
  return gap - transmission.error - reflection.error;
}

function accuracyText(
  rows: readonly SpectrumRow[],
  relative: readonly number[],
  worst: number,
  missed: readonly number[],
  floor: number,
): string {
  const meaning = "bound of the transmission relative to its value, against the accuracy asked for";
  if (missed.length === 0) return `${meaning}; the greatest is that at ${energyText(rows[worst])}`;
  const worstFirst = [...missed].sort((a, b) => relative[b] - relative[a] || a - b);
  const names = worstFirst.slice(0, NAMED).map((n) => energyText(rows[n]));
  const more = missed.length > NAMED ? ` and ${missed.length - NAMED} more` : "";
  const below = missed.filter((n) => rows[n].transmission.value < floor).length;
  const hidden =
    below === 0
      ? ""
      : `; ${below === missed.length ? "all" : below} of these lie below ${floor.toPrecision(2)}, where round-off hides the transmission`;
  const count = `${missed.length} of ${rows.length} energies miss it`;
  return `${meaning}: ${count}, worst ${names.join(", ")}${more}${hidden}`;
}

const energyText = ({ energy }: SpectrumRow): string => formatQuantity(energy, "energy", undefined, 8);
