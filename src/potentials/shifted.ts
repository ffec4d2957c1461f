import type { Potential } from "./potential.js";

/**
 * The same potential moved to the right by `distance` (nm): V(x - distance), with averages, mass, interfaces and faces moved
 * along. Its slope transform is that of the original times exp(-i k distance), by the shift theorem.
 *
 * @param distance finite, nm; 0 gives the potential itself
 * @throws RangeError for a distance that is not finite
 */
export function shifted(potential: Potential, distance: number): Potential {
  if (!Number.isFinite(distance)) throw new RangeError(`a finite distance is needed, in nm; got ${distance}`);
  if (distance === 0) return potential;
  const { slopeTransform, faces } = potential;
  return {
    ...potential,
    value: (x) => potential.value(x - distance),
    cellAverage: (a, b) => potential.cellAverage(a - distance, b - distance),
    mass: (x) => potential.mass(x - distance),
    massAverage: (a, b) => potential.massAverage(a - distance, b - distance),
    ...(slopeTransform && {
      slopeTransform: (k: number): readonly [number, number] => {
        const [re, im] = slopeTransform.call(potential, k);
        const c = Math.cos(k * distance);
        const s = Math.sin(k * distance);
        return [re * c + im * s, im * c - re * s];
      },
    }),
    interfaces: potential.interfaces.map((x) => x + distance),
    faces: [faces[0] + distance, faces[1] + distance],
  };
}
