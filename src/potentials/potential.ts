/**
 * What a potential is to the rest of the program: a profile V(x) that tends to a constant level on either side, with
 * a mass that may differ inside. All lengths in nm, energies in eV, masses in eV fs^2/nm^2.
 */
export interface Potential {
  /** Name of the shape it was made from. */
  readonly shape: string;

  /** V(x) in eV; at a jump the mean of both sides. A point of strength (delta) does not show here. */
  value(x: number): number;

  /** Mean of V over [a, b], exact to round-off: (1/(b-a)) integral_a^b V dx, a delta inside included. Needs a < b. */
  cellAverage(a: number, b: number): number;

  /** Effective mass at x, eV fs^2/nm^2; at an interface the mean of both sides. */
  mass(x: number): number;

  /** Mean of the mass over [a, b], exact for piecewise constant masses. Needs a < b. */
  massAverage(a: number, b: number): number;

  /**
   * Fourier transform of the slope, integral V'(x) exp(-i k x) dx, for a potential with jumps or points: the only form
   * in which a grid of finite band can hold it. Absent for smooth shapes, which are sampled.
   */
  slopeTransform?(k: number): readonly [re: number, im: number];

  /** Places where V or the mass jumps, or a point of strength stands, ascending, in nm. Empty for smooth shapes. */
  readonly interfaces: readonly number[];

  /** Left and right of these places V equals its level to round-off and the mass is that of the particle. */
  readonly faces: readonly [left: number, right: number];

  /** V far to the left and far to the right, eV. Infinite for a confining shape. */
  readonly levelLeft: number;
  readonly levelRight: number;

  /** Least and greatest V anywhere, eV (a point of strength is left out). */
  readonly lowest: number;
  readonly highest: number;

  /** Shortest length over which a smooth V changes, nm; Infinity where it is piecewise constant. */
  readonly scale: number;

  /** True when the mass is the same everywhere. */
  readonly uniformMass: boolean;

  /** True when V rises without limit on both sides, so that nothing can be transmitted. */
  readonly confining: boolean;
}
