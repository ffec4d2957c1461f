import { piecewise } from "./piecewise.js";
import type { ShapeDefinition } from "./shape.js";
import { optionalPositive, required, requiredPositive } from "./values.js";

/** One barrier or well of constant height, centred on x = 0. */
export const rectangular: ShapeDefinition = {
  name: "rectangular",
  summary: "a barrier (or well) with sharp edges and a flat top",
  formula: "V(x) = height for |x| < width/2, 0 outside",
  source:
    "L. D. Landau and E. M. Lifshitz, Quantum Mechanics, par. 25, problem 2 (citation from memory) has its closed-form transmission",
  parameters: {
    height: {
      kind: "energy",
      range: "any",
      summary: "height of the barrier; negative for a well",
      example: "0.30 eV",
    },
    width: { kind: "length", range: "positive", summary: "thickness of the barrier", example: "5 nm" },
    mass: {
      kind: "mass",
      range: "positive",
      optional: true,
      summary: "effective mass inside the barrier; that of the particle when left out",
      example: "0.092 m_e",
    },
  },
  build(values, particleMass) {
    const height = required(values, "height");
    const half = requiredPositive(values, "width") / 2;
    const mass = optionalPositive(values, "mass", particleMass);
    return piecewise("rectangular", {
      edges: [-half, half],
      values: [0, height, 0],
      masses: [particleMass, mass, particleMass],
    });
  },
};
