import { frame } from "./axis.js";
import { hexColour } from "./colour.js";
import type { Box } from "./figure.js";
import { element } from "./svg.js";

/** Stops of the gradient: linear pieces between this many colours differ from the table by less than one step. */
const STOPS = 33;

/** The bar of colours, lowest at the bottom; its ticks are drawn as an axis beside it. */
export function colourBar(box: Box, table: Uint8Array, mapName: string, em: number): string {
  const last = table.length / 3 - 1;
  const stops = Array.from({ length: STOPS }, (_, i) => {
    const part = i / (STOPS - 1);
    return element("stop", { offset: part, "stop-color": hexColour(table, Math.round(part * last)) });
  });
  // The same name for the same colours: figures on one page may share it.
  const id = `colours-${mapName}`;
  const ramp = element("linearGradient", { id, x1: 0, y1: 1, x2: 0, y2: 0 }, ...stops);
  return element("defs", {}, ramp) + element("rect", { ...box, fill: `url(#${id})` }) + frame(box, em);
}
