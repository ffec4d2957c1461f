import { line } from "d3-shape";
import { type Axis, frame, sideAxis } from "./axis.js";
import type { DrawnCrosscheck } from "./drawn-crosscheck.js";
import type { Box } from "./figure.js";
import type { LegendEntry } from "./legend.js";
import { methodStyle } from "./method-style.js";
import { element, straight } from "./svg.js";
import { plain } from "./text.js";

const WITNESS = "stationary";

/** What has got through over time by every stepper, and the witness's value for when all has passed. */
export function sharePanel(
  box: Box,
  { matched, witness }: DrawnCrosscheck,
  axis: Axis,
  labelOffset: number,
  em: number,
): string {
  const x = (time: number) => box.x + (time / matched.end_fs) * box.width;
  const y = (share: number) => box.y + (1 - (share - axis.from) / (axis.to - axis.from)) * box.height;
  const at = y(witness.transmission.value);
  const value = straight(box.x, at, box.x + box.width, at, methodStyle(WITNESS, em));
  const curves = matched.motions.map(({ name, series }) => {
    const column = (wanted: string) =>
      series.find((each) => each.name === wanted)?.values ?? new Float64Array(0);
    const shares = column("transmission");
    const points = Array.from(column("time"), (time, i): [number, number] => [x(time), y(shares[i])]);
    return element("path", { d: line().digits(3)(points) ?? "", fill: "none", ...methodStyle(name, em) });
  });
  return [value, ...curves, frame(box, em), sideAxis(box, axis, "left", labelOffset, em)].join("");
}

/** One entry for each stepper, and one for the witness. */
export function sharesLegend({ matched }: DrawnCrosscheck, em: number): LegendEntry[] {
  const entry = (name: string, label: string): LegendEntry => ({
    sample: (x, width, middle) => straight(x, middle, x + width, middle, methodStyle(name, em)),
    label: plain(label),
  });
  return [
    ...matched.motions.map(({ name }) => entry(name, name)),
    entry(WITNESS, "stationary witness, when all has passed"),
  ];
}
