import type { Potential } from "../../src/potentials/potential.js";
import { shapeNamed } from "../../src/potentials/registry.js";
import type { ParameterValues } from "../../src/potentials/shape.js";
import { shifted } from "../../src/potentials/shifted.js";
import type { Design, Numerics, PacketDesign } from "../../src/problem/design.js";
import { ELECTRON_MASS } from "../../src/units/constants.js";

/** Mass of the particle in these tests, eV fs^2/nm^2. */
export const MASS = 0.067 * ELECTRON_MASS;

/** A potential of a registered shape, moved by `center` (nm). */
export function potentialOf(shape: string, values: ParameterValues, center = 0): Potential {
  const definition = shapeNamed(shape);
  if (definition === undefined) throw new Error(`no shape ${shape}`);
  return shifted(definition.build(values, MASS), center);
}

/** A design put together without its text. */
export function designOf(
  potential: Potential,
  packet: Omit<PacketDesign, "from"> & Partial<PacketDesign>,
  numerics: Numerics = {},
): Design {
  return {
    title: "test",
    sha256: "0".repeat(64),
    particleMass: MASS,
    potential,
    packet: { from: "left", ...packet },
    numerics,
  };
}
