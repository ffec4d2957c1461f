import { logisticDifference, logisticSlope } from "../numerics/logistic.js";
import type { ShapeDefinition } from "./shape.js";
import { FACE_TOLERANCE, smooth } from "./smooth.js";
import { required, requiredPositive } from "./values.js";

/** 1/cosh^2 z = 4 exp(-2|z|) to round-off beyond this |z|, where it has fallen to FACE_TOLERANCE. */
const REACH = Math.log(4 / FACE_TOLERANCE) / 2;

/** The smooth barrier or well height / cosh^2(x/width), whose transmission is known in closed form. */
export const sech2: ShapeDefinition = {
  name: "sech2",
  summary: "a smooth barrier (or well) with exponential flanks",
  formula: "V(x) = height / cosh(x/width)^2",
  source:
    "G. Poschl and E. Teller, Z. Phys. 83, 143 (1933); transmission: L. D. Landau and E. M. Lifshitz, Quantum Mechanics, par. 25, problem 4 (citations from memory)",
  parameters: {
    height: {
      kind: "energy",
      range: "any",
      summary: "height of the top; negative for a well",
      example: "0.30 eV",
    },
    width: {
      kind: "length",
      range: "positive",
      summary: "length over which the flanks fall; full width at half height is 1.763 times it",
      example: "2 nm",
    },
  },
  build(values, particleMass) {
    const height = required(values, "height");
    const width = requiredPositive(values, "width");
    return smooth(
      {
        shape: "sech2",
        // 1/cosh^2 z = 4 y/(1 + y)^2 with y = exp(2z).
        value: (x) => 4 * height * logisticSlope((2 * x) / width),
        // The integral is width (tanh(b/width) - tanh(a/width)).
        cellAverage: (a, b) => {
          const d = (2 * (b - a)) / width;
          return 4 * height * (logisticDifference((2 * a) / width, d) / d);
        },
        faces: [-REACH * width, REACH * width],
        levelLeft: 0,
        levelRight: 0,
        lowest: Math.min(0, height),
        highest: Math.max(0, height),
        scale: width,
      },
      particleMass,
    );
  },
};
