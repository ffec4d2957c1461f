import type { Design } from "../problem/design.js";
import { formatQuantity } from "../units/quantity.js";
import { isForced } from "./forced.js";
import type { SpectrumMethod, SpectrumRow } from "./spectrum-row.js";

/** What a reader of a spectrum should know, in sentences. */
export function spectrumNotes(
  design: Design,
  method: SpectrumMethod,
  rows: readonly SpectrumRow[],
  floor: number,
): string[] {
  const { potential, numerics } = design;
  const notes: string[] = [];
  const right = potential.levelRight - potential.levelLeft;
  if (right !== 0) {
    const apart = formatQuantity(Math.abs(right), "energy", undefined, 6);
    notes.push(
      `Energies are measured from the left level; the right one lies ${apart} ${right > 0 ? "above" : "below"} it. T and R are the same from both sides.`,
    );
  }
  const hidden = rows.filter(({ transmission }) => transmission.value < floor).length;
  if (method === "packet" && hidden > 0)
    notes.push(
      `Round-off may hide a transmission below ${floor.toPrecision(2)}: so it is at ${hidden} of ${rows.length} energies. The stationary method reaches further down.`,
    );
  if (isForced(numerics) || numerics.stepper !== undefined)
    notes.push("Numerics forced in the design are not used here: a spectrum chooses its own grid and times.");
  return notes;
}
