import { logistic, logisticDifference, logisticIntegral, logisticSlope } from "../numerics/logistic.js";
import { ParameterError, type ShapeDefinition } from "./shape.js";
import { FACE_TOLERANCE, smooth } from "./smooth.js";
import { optional, requiredPositive } from "./values.js";

/** A smooth barrier whose right side may lie lower or higher than its left. */
export const eckart: ShapeDefinition = {
  name: "eckart",
  summary: "a smooth barrier with a different level on either side, as along a reaction path",
  formula:
    "V(x) = drop y/(1 + y) + b y/(1 + y)^2, y = exp(x/width), b = (sqrt(height) + sqrt(height - drop))^2",
  source: "C. Eckart, Phys. Rev. 35, 1303 (1930), eq. (1); its eq. (15) is the reflection in closed form",
  parameters: {
    height: {
      kind: "energy",
      range: "positive",
      summary: "height of the top above the left level",
      example: "0.42 eV",
    },
    drop: {
      kind: "energy",
      range: "any",
      optional: true,
      fallback: "0 eV",
      summary: "level on the right, not above the top; negative for a downhill path",
      example: "-0.10 eV",
    },
    width: {
      kind: "length",
      range: "positive",
      summary: "length over which the flanks fall",
      example: "0.03 nm",
    },
  },
  build(values, particleMass) {
    const height = requiredPositive(values, "height");
    const drop = optional(values, "drop", 0);
    const width = requiredPositive(values, "width");
    if (drop > height) {
      throw new ParameterError(
        "drop",
        "the right level must not lie above the top: give a drop up to height",
      );
    }
    const b = (Math.sqrt(height) + Math.sqrt(height - drop)) ** 2;
    const tolerance = FACE_TOLERANCE * Math.max(height, Math.abs(drop));
    return smooth(
      {
        shape: "eckart",
        value: (x) => drop * logistic(x / width) + b * logisticSlope(x / width),
        cellAverage: (from, to) => {
          const a = from / width;
          const d = (to - from) / width;
          return drop * (logisticIntegral(a, d) / d) + b * (logisticDifference(a, d) / d);
        },
        faces: [
          width * Math.log(tail(b + drop, drop, tolerance)),
          -width * Math.log(tail(b - drop, drop, tolerance)),
        ],
        levelLeft: 0,
        levelRight: drop,
        lowest: Math.min(0, drop),
        highest: height,
        scale: width,
      },
      particleMass,
    );
  },
};

/**
 * The s = exp(-|x|/width) at which V has come within `tolerance` of a level. With y/(1+y) = s/(1+s) on the left and
 * 1 - s/(1+s) on the right, |V - level| = s |c -+ drop s| / (1+s)^2, c = b +- drop; this solves s (c + |drop| s) = tolerance.
 */
function tail(c: number, drop: number, tolerance: number): number {
  return (2 * tolerance) / (c + Math.sqrt(c * c + 4 * Math.abs(drop) * tolerance));
}
