import type { Potential } from "../potentials/potential.js";
import { ParameterError } from "../potentials/shape.js";
import { shifted } from "../potentials/shifted.js";
import type { Design } from "../problem/design.js";
import { HBAR } from "../units/constants.js";
import { packetProblem, startProblem } from "./checks.js";
import { canonicalSha256 } from "./describe.js";
import type { ReadDesignOptions } from "./options.js";
import { parsePath, valueAt } from "./path.js";
import { type ResolvedDesign, resolveDesign } from "./resolve.js";

/**
 * Reads a design file.
 *
 * @param text the file's text, YAML 1.2 or JSON
 * @param options its name for errors, values that override it, and where ready-made potentials are found
 * @returns the problem in internal units, with what is left open left to the grid builder
 * @throws DesignError for everything that is wrong with text or options, with file, line, column and key
 * Cost: O(length of the text), a few ms.
 */
export function readDesign(text: string, options: ReadDesignOptions = {}): Design {
  return designOf(resolveDesign(text, options));
}

/** The design of a resolved one; the second half of `readDesign`. @throws DesignError */
export function designOf(resolved: ResolvedDesign): Design {
  const { data, provenance } = resolved;
  const contradiction = packetProblem(data);
  if (contradiction !== undefined) throw provenance.error(contradiction);
  const potential = buildPotential(resolved);
  const misfit = startProblem(data, potential);
  if (misfit !== undefined) throw provenance.error(misfit);
  const { energy, width, energySpread, from, start } = data.packet;
  const mass = data.particle.mass;
  return {
    title: data.title,
    sha256: canonicalSha256(resolved),
    particleMass: mass,
    potential,
    packet: {
      energy,
      width: width ?? widthOfSpread(energy, energySpread as number, mass),
      from,
      ...(start !== undefined && { start }),
    },
    numerics: data.numerics,
  };
}

/**
 * Width of a packet of a given energy spread, to first order in it: Delta E = hbar^2 k0 / (2 m sigma), as the spread of k
 * is 1/(2 sigma) and dE/dk = hbar^2 k0 / m. Energies in eV, mass in eV fs^2/nm^2, result in nm.
 */
function widthOfSpread(energy: number, spread: number, mass: number): number {
  const k0 = Math.sqrt(2 * mass * energy) / HBAR;
  return (HBAR * HBAR * k0) / (2 * mass * spread);
}

function buildPotential({ data, shape, provenance, written }: ResolvedDesign): Potential {
  const { shape: _, center = 0, ...values } = data.potential;
  try {
    return shifted(shape.build(values, data.particle.mass), center);
  } catch (error) {
    if (!(error instanceof ParameterError)) throw error;
    const path = ["potential", ...(parsePath(error.path) ?? [])];
    const target = valueAt(written, path) === undefined ? "parent" : "value";
    const help = `\`postern potentials ${shape.name}\` shows the formula and the parameters.`;
    throw provenance.error({ path, problem: error.message, help, target });
  }
}
