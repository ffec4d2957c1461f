import { logistic, logisticIntegral } from "../numerics/logistic.js";
import { piecewise } from "./piecewise.js";
import { ParameterError, type ShapeDefinition } from "./shape.js";
import { FACE_TOLERANCE, smooth } from "./smooth.js";
import { optional, required } from "./values.js";

/** 1 / (1 + exp(z)) = exp(-z) has fallen to FACE_TOLERANCE here. */
const REACH = -Math.log(FACE_TOLERANCE);

/** From level 0 on the left to level `height` on the right, sharply or over a length. */
export const step: ShapeDefinition = {
  name: "step",
  summary: "a step from 0 on the left to height on the right, sharp or smooth",
  formula: "V(x) = height / (1 + exp(-x/thickness)); thickness 0: 0 for x < 0, height for x > 0",
  source:
    "L. D. Landau and E. M. Lifshitz, Quantum Mechanics, par. 25, problems 1 (sharp) and 3 (smooth): transmission in closed form (citation from memory)",
  parameters: {
    height: {
      kind: "energy",
      range: "any",
      summary: "level on the right; negative for a downward step",
      example: "0.20 eV",
    },
    thickness: {
      kind: "length",
      range: "not negative",
      optional: true,
      fallback: "0 nm",
      summary: "length over which it rises; it goes from 12 % to 88 % within four times it",
      example: "1 nm",
    },
  },
  build(values, particleMass) {
    const height = required(values, "height");
    const thickness = optional(values, "thickness", 0);
    if (thickness < 0) {
      throw new ParameterError("thickness", `a length of zero or more is needed; got ${thickness} nm`);
    }
    if (thickness === 0) {
      return piecewise("step", { edges: [0], values: [0, height], masses: [particleMass, particleMass] });
    }
    return smooth(
      {
        shape: "step",
        value: (x) => height * logistic(x / thickness),
        cellAverage: (a, b) => {
          const d = (b - a) / thickness;
          return height * (logisticIntegral(a / thickness, d) / d);
        },
        faces: [-REACH * thickness, REACH * thickness],
        levelLeft: 0,
        levelRight: height,
        lowest: Math.min(0, height),
        highest: Math.max(0, height),
        scale: thickness,
      },
      particleMass,
    );
  },
};
