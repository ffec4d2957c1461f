import type { QuantityParameter } from "../potentials/shape.js";
import { steppers } from "../steppers/registry.js";

type Fields = Readonly<Record<string, QuantityParameter>>;

/** Mass of the particle when the design gives none. */
export const DEFAULT_MASS = "1 m_e";
/** Limits of the number of grid points: 2^24 points already hold a state of 268 MB. */
export const FEWEST_POINTS = 16;
export const MOST_POINTS = 2 ** 24;
/** Limits of the relative accuracy: round-off of a propagation below, no statement at all above. */
export const FINEST_ACCURACY = 1e-13;
export const COARSEST_ACCURACY = 0.5;
/** Orders in the time step that some stepper offers. */
export const ORDERS: readonly number[] = [...new Set(steppers.flatMap(({ orders }) => orders))].sort(
  (a, b) => a - b,
);
/** Names of the steppers that can be forced. */
export const STEPPER_NAMES: readonly string[] = steppers.map(({ name }) => name);
/** Longest title, so that it fits a figure's heading. */
export const LONGEST_TITLE = 200;

/** Quantities under `particle`. */
export const PARTICLE_FIELDS: Fields = {
  mass: {
    kind: "mass",
    range: "positive",
    fallback: DEFAULT_MASS,
    summary: "mass of the particle outside the structure",
    example: "0.067 m_e",
  },
};

/** Quantities under `packet`. */
export const PACKET_FIELDS: Fields = {
  energy: {
    kind: "energy",
    range: "not negative",
    summary: "mean kinetic energy at the start, hbar^2 k0^2 / 2m",
    example: "0.15 eV",
  },
  width: {
    kind: "length",
    range: "positive",
    optional: true,
    summary: "standard deviation of the density |psi|^2 in x; or give energySpread instead",
    example: "12 nm",
  },
  energySpread: {
    kind: "energy",
    range: "positive",
    optional: true,
    summary:
      "standard deviation of the kinetic energy to first order, hbar^2 k0 / (2 m width); instead of width",
    example: "10 meV",
  },
  start: {
    kind: "length",
    range: "any",
    optional: true,
    summary: "mean position of the packet at the start; chosen clear of the structure when left out",
    example: "-80 nm",
  },
};

/** Quantities under `numerics`. */
export const NUMERICS_FIELDS: Fields = {
  step: { kind: "length", range: "positive", optional: true, summary: "grid spacing", example: "0.1 nm" },
  length: {
    kind: "length",
    range: "positive",
    optional: true,
    summary: "length of the box",
    example: "400 nm",
  },
  timeStep: { kind: "time", range: "positive", optional: true, summary: "time step", example: "0.5 fs" },
  end: {
    kind: "time",
    range: "positive",
    optional: true,
    summary: "time at which the run ends",
    example: "300 fs",
  },
};

/** Taken by every shape that is placed by its middle, which all are but layers. */
export const CENTER: QuantityParameter = {
  kind: "length",
  range: "any",
  fallback: "0 nm",
  summary: "place of the shape's own x = 0",
  example: "20 nm",
};
