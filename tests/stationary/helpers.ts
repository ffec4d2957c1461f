import { expect } from "vitest";
import { piecewise } from "../../src/potentials/piecewise.js";
import type { Potential } from "../../src/potentials/potential.js";
import { shapeNamed } from "../../src/potentials/registry.js";
import type { ParameterValues } from "../../src/potentials/shape.js";
import { scatter } from "../../src/stationary/scattering.js";
import { ELECTRON_MASS } from "../../src/units/constants.js";

/** A shape with its parameters in internal units, for a particle of so many electron masses. */
export function shape(name: string, values: ParameterValues, mass: number): Potential {
  const definition = shapeNamed(name);
  if (definition === undefined) throw new Error(`no shape ${name}`);
  return definition.build(values, mass * ELECTRON_MASS);
}

/** Layers as [width nm, height eV, mass m_e (the particle's when left out)]. */
export const layers = (mass: number, ...stack: readonly (readonly [number, number, number?])[]): Potential =>
  shape(
    "layers",
    {
      layers: stack.map(([width, height, own = mass]) => ({ width, height, mass: own * ELECTRON_MASS })),
    },
    mass,
  );

/** A piecewise constant potential with masses in m_e, leads included. */
export const pieces = (
  edges: readonly number[],
  values: readonly number[],
  masses: readonly number[],
): Potential => piecewise("pieces", { edges, values, masses: masses.map((m) => m * ELECTRON_MASS) });

/**
 * A published T must be met to `digits` of its own rounding (relative), and lie within the bound but for that rounding; R with it. From
 * both sides when the levels are equal (reciprocity).
 */
export function expectTransmission(
  potential: Potential,
  massInElectrons: number,
  energy: number,
  published: number,
  relative = 5e-15,
  from: "left" | "right" = "left",
  widest = massInElectrons > 100 ? 1e-11 : 2.5e-12,
): void {
  const { transmission, reflection } = scatter(potential, massInElectrons * ELECTRON_MASS, energy, from);
  const context = JSON.stringify({ energy, published, transmission, reflection });
  // A last digit of the printed value, and the rounding of the energies and lengths in decimal: relative.
  const slack = relative * published;
  expect(Math.abs(transmission.value - published), context).toBeLessThanOrEqual(transmission.error + slack);
  expect(Math.abs(reflection.value - (1 - published)), context).toBeLessThanOrEqual(
    reflection.error + slack + 3e-16,
  );
  // The bound itself stays near what issue 3 asks for. A proton's waves make forty turns inside a chemical barrier, where an electron's make one.
  expect(transmission.error, context).toBeLessThanOrEqual(widest * published);
}
