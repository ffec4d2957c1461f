import { shapeNamed } from "../../src/potentials/registry.js";
import type { ParameterValues, ShapeParameter } from "../../src/potentials/shape.js";
import { ELECTRON_MASS } from "../../src/units/constants.js";

/** One potential to test: the shape, its parameters in internal units, and V(x) written out a second time. */
export interface Sample {
  readonly title: string;
  readonly shape: string;
  readonly values: ParameterValues;
  /** V(x) straight from the contract's formula, without any care for far tails; not at jumps. */
  readonly formula: (x: number, mass: number) => number;
}

/** Mass of the particle in every sample, eV fs^2/nm^2. */
export const MASS = 0.067 * ELECTRON_MASS;

const HBAR_EV_FS = 0.6582119569509066; // check-values: CODATA 2022, exact h and e

const stack = [
  { width: 2.5, height: 0.3, mass: 0.092 * ELECTRON_MASS },
  { width: 5, height: -0.05 },
  { width: 1.25, height: 0.3, mass: 0.092 * ELECTRON_MASS },
];

function eckart(height: number, drop: number, width: number) {
  const b = (Math.sqrt(height) + Math.sqrt(height - drop)) ** 2;
  return (x: number) => {
    const y = Math.exp(x / width);
    return (drop * y) / (1 + y) + (b * y) / (1 + y) ** 2;
  };
}

export const samples: readonly Sample[] = [
  {
    title: "rectangular barrier",
    shape: "rectangular",
    values: { height: 0.3, width: 5 },
    formula: (x) => (Math.abs(x) < 2.5 ? 0.3 : 0),
  },
  {
    title: "rectangular well with a mass of its own",
    shape: "rectangular",
    values: { height: -0.2, width: 10, mass: 0.05 * ELECTRON_MASS },
    formula: (x) => (Math.abs(x) < 5 ? -0.2 : 0),
  },
  {
    title: "layers",
    shape: "layers",
    values: { layers: stack },
    formula: (x) => (x < 0 || x > 8.75 ? 0 : x > 2.5 && x < 7.5 ? -0.05 : 0.3),
  },
  {
    title: "sharp step",
    shape: "step",
    values: { height: 0.2 },
    formula: (x) => (x < 0 ? 0 : 0.2),
  },
  {
    title: "smooth step",
    shape: "step",
    values: { height: 0.2, thickness: 1.5 },
    formula: (x) => 0.2 / (1 + Math.exp(-x / 1.5)),
  },
  {
    title: "smooth downward step",
    shape: "step",
    values: { height: -0.2, thickness: 1.5 },
    formula: (x) => -0.2 / (1 + Math.exp(-x / 1.5)),
  },
  {
    title: "gaussian barrier",
    shape: "gaussian",
    values: { height: 0.3, width: 2 },
    formula: (x) => 0.3 * Math.exp(-(x ** 2) / 8),
  },
  {
    title: "gaussian well",
    shape: "gaussian",
    values: { height: -0.1, width: 3 },
    formula: (x) => -0.1 * Math.exp(-(x ** 2) / 18),
  },
  {
    title: "sech2 barrier",
    shape: "sech2",
    values: { height: 0.3, width: 2 },
    formula: (x) => 0.3 / Math.cosh(x / 2) ** 2,
  },
  {
    title: "sech2 well",
    shape: "sech2",
    values: { height: -0.28, width: 2 },
    formula: (x) => -0.28 / Math.cosh(x / 2) ** 2,
  },
  {
    title: "eckart, level",
    shape: "eckart",
    values: { height: 0.3, width: 2 },
    formula: eckart(0.3, 0, 2),
  },
  {
    title: "eckart, downhill",
    shape: "eckart",
    values: { height: 0.3, drop: -0.25, width: 2 },
    formula: eckart(0.3, -0.25, 2),
  },
  {
    title: "eckart, uphill",
    shape: "eckart",
    values: { height: 0.3, drop: 0.2, width: 2 },
    formula: eckart(0.3, 0.2, 2),
  },
  {
    title: "harmonic",
    shape: "harmonic",
    values: { quantum: 0.1 },
    formula: (x, mass) => (mass * (0.1 / HBAR_EV_FS) ** 2 * x ** 2) / 2,
  },
  { title: "delta barrier", shape: "delta", values: { strength: 0.5 }, formula: () => 0 },
  { title: "delta well", shape: "delta", values: { strength: -0.5 }, formula: () => 0 },
];

export function build(sample: Sample) {
  return definitionOf(sample).build(sample.values, MASS);
}

export function definitionOf(sample: Sample) {
  const definition = shapeNamed(sample.shape);
  if (definition === undefined) throw new Error(`no shape ${sample.shape}`);
  return definition;
}

/**
 * The same potential with lengths times `length`, energies times `energy`, and masses divided by energy length^2, so
 * that hbar^2/(2 m x^2) grows like the energies do: V(length x) must come out as energy V(x).
 */
export function scaled(sample: Sample, length: number, energy: number) {
  const factors: Record<string, number> = {
    length,
    energy,
    strength: length * energy,
    mass: 1 / (energy * length * length),
  };
  const { parameters } = definitionOf(sample);
  const scale = (value: number | undefined, parameter: ShapeParameter) =>
    value === undefined ? undefined : value * factors[parameter.kind];
  const values = Object.fromEntries(
    Object.entries(sample.values).map(([name, value]) => {
      const parameter = parameters[name];
      if (parameter.kind !== "list") return [name, scale(value as number, parameter)];
      const list = value as readonly Record<string, number>[];
      return [
        name,
        list.map((entry) =>
          Object.fromEntries(Object.entries(entry).map(([key, v]) => [key, scale(v, parameter.fields[key])])),
        ),
      ];
    }),
  );
  return definitionOf(sample).build(values, MASS * factors.mass);
}
