import type { Spectrum } from "../studies/spectrum.js";
import type { SpectrumRow } from "../studies/spectrum-row.js";
import { concise } from "../units/concise.js";
import { formatQuantity } from "../units/quantity.js";
import { checkRow, short, verdictText } from "./checks-text.js";
import { bold, COLUMNS, table, wrap } from "./terminal.js";

/** Most rows of the table in a terminal: as many as are read rather than searched. */
const MOST_ROWS = 40;
/** Most resonances and packets that are listed. */
const MOST_LISTED = 12;

/** The answer of `postern spectrum` as text. `filed`: whether all rows were written to a file as well. */
export function spectrumText(answer: Spectrum, filed: boolean): string {
  const how = answer.method === "packet" ? "by wavepackets" : "by the stationary witness";
  const parts = [
    bold(answer.design.title),
    `transmission against energy, ${how}; energies from the left level\n${rowsText(answer.rows, filed)}`,
    resonancesText(answer),
    packetsText(answer),
    floorText(answer),
    `checks\n${table(answer.checks.map(checkRow), "  ")}`,
    ...answer.notes.map((note) => wrap(`note: ${note}`, COLUMNS, "      ")),
    verdictText(
      answer.verdict,
      answer.checks,
      `every bound is within ${short(answer.accuracy.reached)} of its transmission, ${short(answer.accuracy.asked)} was asked for`,
    ),
  ];
  return parts.filter((part) => part !== "").join("\n\n");
}

/** The rows, evenly thinned where they are many, both ends kept. */
function rowsText(rows: readonly SpectrumRow[], filed: boolean): string {
  const stride = Math.ceil(rows.length / MOST_ROWS);
  const shown = rows.filter((_, n) => n % stride === 0 || n === rows.length - 1);
  const unit = energyUnit(rows);
  const digits = energyDigits(rows);
  const lines = shown.map(({ energy, transmission, reflection }) => [
    formatQuantity(energy, "energy", unit, digits),
    concise(transmission.value, transmission.error),
    concise(reflection.value, reflection.error),
  ]);
  const text = table([["energy", "transmission", "reflection"], ...lines], "  ");
  if (stride === 1) return text;
  const where = filed ? "spectrum.csv has all of them" : "--out DIR writes all of them, --json prints them";
  return `${text}\n\n${wrap(`  ${shown.length} of ${rows.length} energies are shown; ${where}`, COLUMNS, "  ")}`;
}

/** One unit for the whole column: that of the greatest energy. */
const energyUnit = (rows: readonly SpectrumRow[]): string =>
  formatQuantity(rows[rows.length - 1].energy, "energy").split(" ")[1];

/** Most digits of an energy: the double's own would show its rounding. */
const MOST_DIGITS = 14;

/** Digits that tell neighbouring energies apart, with two to spare. */
function energyDigits(rows: readonly SpectrumRow[]): number {
  const last = rows[rows.length - 1].energy;
  const gaps = rows.slice(1).map(({ energy }, n) => energy - rows[n].energy);
  const finest = Math.min(rows[0].energy, ...gaps);
  return Math.min(MOST_DIGITS, Math.max(6, Math.ceil(Math.log10(last / finest)) + 2));
}

function resonancesText({ resonances }: Spectrum): string {
  if (resonances.length === 0) return "";
  const rows = resonances.slice(0, MOST_LISTED).map(({ energy, width }) => {
    const digits = Math.min(MOST_DIGITS, Math.max(4, Math.ceil(Math.log10(energy / width)) + 2));
    return [
      formatQuantity(energy, "energy", undefined, digits),
      `width ${formatQuantity(width, "energy", undefined, 3)}`,
    ];
  });
  return `resonances (energy, and full width at half height)\n${table(rows, "  ")}${more(resonances.length)}`;
}

function packetsText({ packets }: Spectrum): string {
  if (packets.length === 0) return "";
  const rows = packets
    .slice(0, MOST_LISTED)
    .map((packet) => [
      formatQuantity(packet.energy, "energy", undefined, 4),
      `from the ${packet.from}`,
      `width ${formatQuantity(packet.width, "length", undefined, 3)}`,
      `${packet.energies} ${packet.energies === 1 ? "energy" : "energies"}`,
      `${packet.points} points`,
      `${packet.steps} steps to ${formatQuantity(packet.end_fs, "time", undefined, 3)}, ${packet.runs} runs`,
    ]);
  return `packets sent (mean kinetic energy, and what each served)\n${table(rows, "  ")}${more(packets.length)}`;
}

const more = (count: number): string =>
  count > MOST_LISTED ? `\n  and ${count - MOST_LISTED} more; --json lists all of them` : "";

function floorText({ method, floor }: Spectrum): string {
  return method === "packet" && floor > 0
    ? `floor  round-off may hide a transmission below ${short(floor)}`
    : "";
}
