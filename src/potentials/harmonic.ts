import { HBAR } from "../units/constants.js";
import type { ShapeDefinition } from "./shape.js";
import { smooth } from "./smooth.js";
import { requiredPositive } from "./values.js";

/** The harmonic well: confining, so nothing is transmitted; for levels, revivals and checks of the steppers. */
export const harmonic: ShapeDefinition = {
  name: "harmonic",
  summary: "a parabolic well that confines the particle: equally spaced levels, no transmission",
  formula: "V(x) = m omega^2 x^2 / 2, with hbar omega = quantum",
  source:
    "E. Schrodinger, Naturwissenschaften 14, 664 (1926) (citation from memory): its packets keep their width",
  parameters: {
    quantum: {
      kind: "energy",
      range: "positive",
      summary: "spacing of the levels, hbar omega",
      example: "0.10 eV",
    },
  },
  build(values, particleMass) {
    const quantum = requiredPositive(values, "quantum");
    const omega = quantum / HBAR;
    const stiffness = particleMass * omega * omega;
    return smooth(
      {
        shape: "harmonic",
        value: (x) => (stiffness * x * x) / 2,
        // Mean of x^2 over [a, b] is (a^2 + a b + b^2)/3, written as a sum of squares so that nothing cancels.
        cellAverage: (a, b) => (stiffness * (((a + b) / 2) ** 2 + (b - a) ** 2 / 12)) / 2,
        faces: [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY],
        levelLeft: Number.POSITIVE_INFINITY,
        levelRight: Number.POSITIVE_INFINITY,
        lowest: 0,
        highest: Number.POSITIVE_INFINITY,
        // Width of the ground state's wave function, sqrt(hbar / (m omega)).
        scale: Math.sqrt(HBAR / (particleMass * omega)),
        confining: true,
      },
      particleMass,
    );
  },
};
