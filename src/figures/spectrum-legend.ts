import type { SpectrumMethod } from "../studies/spectrum-row.js";
import { axisUnit } from "./axis-unit.js";
import type { EnergyAxis } from "./energy-axis.js";
import type { LegendEntry } from "./legend.js";
import { triangle } from "./resonance-labels.js";
import type { EnergyMark } from "./spectrum-marks.js";
import { type Curve, curveStroke, markStroke } from "./spectrum-panel.js";
import { element, straight } from "./svg.js";
import { plain, symbol } from "./text.js";
import { HIDDEN_FILL, PROFILE_FILL } from "./theme.js";
import { labelNumber } from "./ticks.js";

/** What stands in the figure and has to be explained. */
export interface LegendParts {
  readonly method: SpectrumMethod;
  readonly curves: readonly Curve[];
  readonly bounds: boolean;
  readonly weight: boolean;
  readonly marks: readonly EnergyMark[];
  readonly energies: EnergyAxis;
  readonly resonances: boolean;
  readonly hidden: boolean;
}

/** The entries of the legend, in the order in which they matter. */
export function spectrumLegend(parts: LegendParts, em: number): LegendEntry[] {
  const { curves, energies, method } = parts;
  const how = method === "packet" ? "by packet" : "stationary";
  const within = parts.bounds ? ", with its bound" : "";
  const entries = [
    lineEntry(curves[0], [symbol("T"), { text: ` ${how}${within}` }], em),
    ...curves.slice(1).map((curve) => lineEntry(curve, [symbol("R")], em)),
  ];
  if (parts.weight) entries.push(areaEntry(PROFILE_FILL, "energies of the packet", em));
  for (const mark of parts.marks)
    if (mark.name !== undefined) entries.push(markEntry(mark, mark.name, energies, em));
  if (parts.resonances)
    entries.push({
      sample: (x, width, middle) => triangle(x + width / 2, middle + 0.24 * em, em),
      label: plain("resonance: energy, width Γ"),
    });
  if (parts.hidden) entries.push(areaEntry(HIDDEN_FILL, "hidden by round-off", em));
  return entries;
}

function lineEntry(curve: Curve, label: LegendEntry["label"], em: number): LegendEntry {
  const stroke = curveStroke(curve, em);
  return { sample: (x, width, middle) => straight(x, middle, x + width, middle, stroke), label };
}

function areaEntry(fill: string, text: string, em: number): LegendEntry {
  const height = 0.8 * em;
  return {
    sample: (x, width, middle) => element("rect", { x, y: middle - height / 2, width, height, fill }),
    label: plain(text),
  };
}

/** A mark with its energy, in the unit that suits the number: that of a narrow axis would be too small. */
function markEntry(mark: EnergyMark, name: string, { unit }: EnergyAxis, em: number): LegendEntry {
  const { energy } = mark;
  const own = energy === 0 ? unit : axisUnit("energy", Math.abs(energy));
  const stroke = markStroke(mark, em);
  return {
    sample: (x, width, middle) => straight(x, middle, x + width, middle, stroke),
    label: plain(`${name} ${labelNumber(energy / own.size)} ${own.name}`),
  };
}
