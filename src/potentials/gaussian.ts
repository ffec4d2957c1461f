import { integrate } from "../numerics/quadrature.js";
import type { ShapeDefinition } from "./shape.js";
import { FACE_TOLERANCE, smooth } from "./smooth.js";
import { required, requiredPositive } from "./values.js";

/** exp(-z^2/2) has fallen to FACE_TOLERANCE here. */
const REACH = Math.sqrt(-2 * Math.log(FACE_TOLERANCE));

/** exp(-z^2/2) is below the least double (5e-324) from here on. */
const VANISHED = 39;

/** 16 points on panels of half a width leave less than 1e-22 of the integral within |z| < 10 (remainder formula). */
const PANEL = 0.5;
const POINTS = 16;

/** A barrier or well of Gaussian profile, such as a light sheet makes for an atom. */
export const gaussian: ShapeDefinition = {
  name: "gaussian",
  summary: "a smooth barrier (or well) of Gaussian profile",
  formula: "V(x) = height exp(-x^2 / (2 width^2))",
  source: "the normal curve; no closed-form transmission is known",
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
      summary: "standard deviation; full width at half height is 2.355 times it",
      example: "2 nm",
    },
  },
  build(values, particleMass) {
    const height = required(values, "height");
    const width = requiredPositive(values, "width");
    return smooth(
      {
        shape: "gaussian",
        value: (x) => height * bell(x / width),
        cellAverage: (a, b) => height * bellAverage(a / width, b / width, (b - a) / width),
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

function bell(z: number): number {
  return Math.exp((-z * z) / 2);
}

/** Mean of exp(-z^2/2) over [a, a + d]: quadrature, because a difference of error functions cancels in a small cell. */
function bellAverage(a: number, b: number, d: number): number {
  if (d <= PANEL) return integrate((s) => bell(a + d * s), 0, 1, 1, POINTS);
  const from = Math.max(a, -VANISHED);
  const to = Math.min(b, VANISHED);
  return to > from ? integrate(bell, from, to, PANEL, POINTS) / d : 0;
}
