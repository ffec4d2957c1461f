import { ENERGY_LINE, PROFILE_LINE, REFLECTION_LINE, THICK } from "./theme.js";

const STYLES: Readonly<Record<string, { readonly colour: string; readonly dashes?: readonly number[] }>> = {
  "crank-nicolson": { colour: PROFILE_LINE },
  // Dashes let the line below them be seen where both coincide.
  "split-operator": { colour: ENERGY_LINE, dashes: [0.55, 0.45] },
  stationary: { colour: REFLECTION_LINE, dashes: [0.15, 0.3] },
};

/** How the line of a method is drawn, in panels and legends. */
export function methodStyle(name: string, em: number) {
  const { colour, dashes } = STYLES[name] ?? { colour: PROFILE_LINE };
  return {
    stroke: colour,
    "stroke-width": (name === "split-operator" ? 1.35 : 1) * THICK * em,
    "stroke-dasharray": dashes?.map((length) => (length * em).toFixed(2)).join(" "),
  };
}
