import { delta } from "./delta.js";
import { eckart } from "./eckart.js";
import { gaussian } from "./gaussian.js";
import { harmonic } from "./harmonic.js";
import { layers } from "./layers.js";
import { rectangular } from "./rectangular.js";
import { sech2 } from "./sech2.js";
import type { ShapeDefinition } from "./shape.js";
import { step } from "./step.js";

/** Every shape, in the order in which help and docs list them. A new shape is one file and one line here. */
export const shapes: readonly ShapeDefinition[] = [
  rectangular,
  layers,
  step,
  gaussian,
  sech2,
  eckart,
  harmonic,
  delta,
];

/** The shape of that name, or undefined. */
export function shapeNamed(name: string): ShapeDefinition | undefined {
  return shapes.find((shape) => shape.name === name);
}
