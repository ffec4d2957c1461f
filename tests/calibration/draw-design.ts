import { drawLayered } from "./draw-layered.js";
import { drawSmooth } from "./draw-smooth.js";
import type { DrawnDesign, Family } from "./drawn-design.js";
import { MixingGenerator } from "./mixing-generator.js";
import { wavenumberOf } from "./packet-guess.js";

/**
 * The design of a seed and an index: the same whatever else is drawn, so that one alone can be drawn again.
 * @param only one family; both in turn when undefined
 */
export function drawDesign(seed: number, index: number, only?: Family): DrawnDesign {
  const family = only ?? (index % 2 === 0 ? "layered" : "smooth");
  const random = new MixingGenerator(seed, index, family === "layered" ? 1 : 2);
  const { structure, packet } = family === "layered" ? drawLayered(random) : drawSmooth(random);
  const text = [
    `title: "Calibration ${seed}, design ${index}: ${structure.theme}"`,
    "particle:",
    `  mass: ${structure.mass} m_e`,
    "potential:",
    ...structure.potential.map((line) => `  ${line}`),
    "packet:",
    `  energy: ${packet.energy} eV`,
    `  width: ${packet.width} nm`,
    `  from: ${packet.from}`,
    "",
  ].join("\n");
  const { theme, closedForm, levelRight } = structure;
  const spreads = 2 * packet.width * wavenumberOf(packet.energy, structure.mass);
  return { seed, index, family, theme, text, closedForm, levelRight, spreads };
}
