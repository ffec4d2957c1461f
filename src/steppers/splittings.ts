/**
 * Coefficients of symmetric splittings of exp((A + B) dt) into exp(b_1 B dt) exp(a_1 A dt) exp(b_2 B dt) ..., with the potential
 * B outermost. The Nystrom sets hold because [B, [B, [B, A]]] = 0 for a potential B and a kinetic energy A; the roles must not be exchanged.
 */
export interface Splitting {
  readonly order: number;
  /** Potential stages, one more than the kinetic ones. */
  readonly b: readonly number[];
  /** Kinetic stages. */
  readonly a: readonly number[];
  readonly source: string;
}

const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);
/** outer..., centre, ...outer mirrored */
const aroundCentre = (outer: readonly number[]) => [...outer, 1 - 2 * sum(outer), ...[...outer].reverse()];
/** outer..., half-centre twice, ...outer mirrored */
const aroundPair = (outer: readonly number[]) => {
  const half = [...outer, 0.5 - sum(outer)];
  return [...half, ...[...half].reverse()];
};

/** Order 2: half a kick, a drift, half a kick. */
export const STRANG: Splitting = {
  order: 2,
  b: [0.5, 0.5],
  a: [1],
  source: "G. Strang, SIAM J. Numer. Anal. 5, 506 (1968), citation from memory",
};

const BLANES_MOAN =
  "S. Blanes and P. C. Moan, J. Comput. Appl. Math. 142, 313 (2002), table 3; coefficients seen as attributed in the source of a general ODE integrator, verified here by their order conditions";

/** Order 4, six kinetic stages (the set SRKN6b). */
export const NYSTROM_4: Splitting = {
  order: 4,
  b: aroundCentre([0.0829844064174052, 0.396309801498368, -0.0390563049223486]),
  a: aroundPair([0.245298957184271, 0.60487266571108]),
  source: BLANES_MOAN,
};

/** Order 6, eleven kinetic stages (the set SRKN11b). */
export const NYSTROM_6: Splitting = {
  order: 6,
  b: aroundPair([
    0.0414649985182624, 0.198128671918067, -0.0400061921041533, 0.0752539843015807, -0.0115113874206879,
  ]),
  a: aroundCentre([
    0.123229775946271, 0.290553797799558, -0.127049212625417, -0.246331761062075, 0.357208872795928,
  ]),
  source: BLANES_MOAN,
};

export const splittings: readonly Splitting[] = [STRANG, NYSTROM_4, NYSTROM_6];

/** The splitting of an order, or undefined. */
export function splittingOfOrder(order: number): Splitting | undefined {
  return splittings.find((splitting) => splitting.order === order);
}
