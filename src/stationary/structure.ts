import type { Potential } from "../potentials/potential.js";
import type { Element } from "./chain.js";
import { flatLayer, pointOfStrength } from "./flat-layer.js";
import { type Profile, SmoothPanel } from "./smooth-panel.js";
import { strengthAt } from "./strength.js";

/** Widest first panel, in units of the shortest length over which V changes; 24 samples then cannot miss anything. */
const WIDEST_PANEL = 4;
/** A fit is good when its residual is below this part of V on the panel, or of the whole range: a unit or two in the last place. */
const GOOD_FIT = 2e-16;
const GOOD_FIT_OF_RANGE = 2e-17;
/** Panels narrower than this part of the scale are taken as they come: V has a kink there, or is rounded coarsely. The bound says so. */
const NARROWEST_PANEL = 2 ** -20;
/** A coarser fit is as good where the panel is as much narrower, since residual times width is what counts. */
const NARROW_ENOUGH = 1e-17;

/** A potential taken apart: what lies between the leads, and the leads themselves. */
export interface Structure {
  readonly elements: readonly Element[];
  readonly faces: readonly [left: number, right: number];
  readonly levels: readonly [left: number, right: number];
  /** Masses in the leads, eV fs^2/nm^2. */
  readonly masses: readonly [left: number, right: number];
  /** Bound on integral |V - level| dx beyond each face, eV nm. */
  readonly cutAway: number;
}

/** Flat layers, smooth panels and points of strength from left to right. */
export function structureOf(potential: Potential): Structure {
  const { faces, scale } = potential;
  const [left, right] = faces;
  const inside = potential.interfaces.filter((x) => x > left && x < right);
  const places = right > left ? [left, ...inside, right] : [left];
  const elements: Element[] = [];
  places.forEach((x, i) => {
    if (potential.interfaces.includes(x)) {
      const gap = Math.min(
        i > 0 ? x - places[i - 1] : Number.POSITIVE_INFINITY,
        i + 1 < places.length ? places[i + 1] - x : Number.POSITIVE_INFINITY,
      );
      const strength = strengthAt(potential, x, gap);
      if (strength !== 0) elements.push(pointOfStrength(strength));
    }
    if (i + 1 < places.length) elements.push(...region(potential, x, places[i + 1]));
  });
  const beyond = (x: number, direction: number) => x + direction * (1 + Math.abs(x));
  const range = potential.highest - potential.lowest;
  return {
    elements,
    faces,
    levels: [potential.levelLeft, potential.levelRight],
    masses: [potential.mass(beyond(left, -1)), potential.mass(beyond(right, 1))],
    // A smooth V comes to its level within 1e-16 of its range at a face and falls on over its scale or faster.
    cutAway: Number.isFinite(scale) ? 1e-16 * range * scale : 0,
  };
}

/** What lies between two neighbouring interfaces or faces. */
function region(potential: Potential, left: number, right: number): Element[] {
  const { scale } = potential;
  if (!Number.isFinite(scale)) {
    const middle = (left + right) / 2;
    return [flatLayer({ left, right, value: potential.value(middle), mass: potential.mass(middle) })];
  }
  const profile: Profile = {
    value: (x) => potential.value(x),
    mass: (x) => potential.mass(x),
    range: potential.highest - potential.lowest,
  };
  const count = Math.max(1, Math.ceil((right - left) / (WIDEST_PANEL * scale)));
  const elements: Element[] = [];
  for (let i = 0; i < count; i++) {
    const at = (j: number) => (j === count ? right : left + ((right - left) * j) / count);
    panels(profile, scale, at(i), at(i + 1), elements);
  }
  return elements;
}

/** Halves a stretch until V is a polynomial on each piece. */
function panels(profile: Profile, scale: number, left: number, right: number, into: Element[]): void {
  const panel = new SmoothPanel(profile, left, right);
  const { residual, size, powers } = panel.potential;
  const middle = (left + right) / 2;
  const width = right - left;
  const good =
    residual <= GOOD_FIT * size + GOOD_FIT_OF_RANGE * profile.range ||
    residual * width <= NARROW_ENOUGH * profile.range * scale ||
    width <= NARROWEST_PANEL * scale;
  if (!good && middle > left && middle < right) {
    panels(profile, scale, left, middle, into);
    panels(profile, scale, middle, right, into);
  } else if (powers.length === 1 && residual === 0 && profile.mass(left) === profile.mass(right)) {
    into.push(flatLayer({ left, right, value: powers[0], mass: profile.mass(middle) }));
  } else into.push(panel);
}
