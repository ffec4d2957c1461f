import type { Potential } from "../potentials/potential.js";

/**
 * Why a potential has no stationary answer, in words that end an error line; undefined when it has one. A transmission at one
 * energy needs a wave that comes in and one that leaves, hence a finite level on both sides.
 */
export function stationaryRefusal(potential: Potential): string | undefined {
  const { confining, levelLeft, levelRight, faces, shape } = potential;
  if (confining)
    return `the ${shape} potential confines the particle, so that nothing comes in, is transmitted or reflected`;
  if (!Number.isFinite(levelLeft) || !Number.isFinite(levelRight))
    return `the ${shape} potential rises or falls without limit on one side, where no free wave exists`;
  if (!Number.isFinite(faces[0]) || !Number.isFinite(faces[1]))
    return `the ${shape} potential reaches its level only at infinity`;
  return undefined;
}
