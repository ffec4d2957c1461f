import type { Potential } from "./potential.js";

/** What a smooth shape has to say about itself; the mass is the particle's everywhere. */
export interface SmoothProfile
  extends Pick<
    Potential,
    "shape" | "value" | "cellAverage" | "faces" | "levelLeft" | "levelRight" | "lowest" | "highest" | "scale"
  > {
  readonly confining?: boolean;
}

/** A face stands where V differs from its level by this part of the greatest height: less than half a unit in the last place. */
export const FACE_TOLERANCE = 1e-16;

/** Makes the potential of a smooth profile. */
export function smooth(profile: SmoothProfile, particleMass: number): Potential {
  return {
    confining: false,
    ...profile,
    mass: () => particleMass,
    massAverage: () => particleMass,
    interfaces: [],
    uniformMass: true,
  };
}
