import { ParameterError, type ShapeDefinition } from "./shape.js";
import { required } from "./values.js";

/** A barrier without width: all its strength in one point. */
export const delta: ShapeDefinition = {
  name: "delta",
  summary: "a point barrier: the limit of a high and thin one, of given area",
  formula: "V(x) = strength delta(x), delta being the unit point of area 1",
  source:
    "D. J. Griffiths, Introduction to Quantum Mechanics, sec. 2.5 (citation from memory): T = 1/(1 + beta^2), beta = m strength / (hbar^2 k)",
  parameters: {
    strength: {
      kind: "strength",
      range: "any",
      summary: "area under the barrier, height times width; negative for a well, not zero",
      example: "0.5 eV nm",
    },
  },
  build(values, particleMass) {
    const strength = required(values, "strength");
    if (strength === 0) throw new ParameterError("strength", "a strength other than zero is needed");
    return {
      shape: "delta",
      value: () => 0,
      // Half to either side when the point is an end, so that the averages of adjacent cells still add up.
      cellAverage: (a, b) => {
        if (a > 0 || b < 0) return 0;
        return (a < 0 && b > 0 ? strength : strength / 2) / (b - a);
      },
      mass: () => particleMass,
      massAverage: () => particleMass,
      // V' is strength delta', whose transform is i k strength.
      slopeTransform: (k) => [0, k * strength],
      interfaces: [0],
      faces: [0, 0],
      levelLeft: 0,
      levelRight: 0,
      lowest: 0,
      highest: 0,
      scale: Number.POSITIVE_INFINITY,
      uniformMass: true,
      confining: false,
    };
  },
};
