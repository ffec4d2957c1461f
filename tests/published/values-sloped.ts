import { trapezoid, triangle } from "./made-potentials.js";
import type { PublishedCurve, PublishedForm } from "./published-curve.js";

/** What a grid would have to resolve of it is not the barrier but the fall behind it. */
export const BENT = "it falls by hundreds of electronvolts";
/** Some hundred wavelengths lie behind it, each of which adds its roundings to the bound of the witness. */
export const BENT_WIDEST = 5e-11;

/** Rows of E, V1, V2 (eV), d (nm), level on the right (eV), masses of the particle and inside (m_e), T. */
const TRAPEZOIDS: readonly (readonly number[])[] = [
  [5, 9.5, 8.5, 1, -1, 1, 1, 4.924681336285603e-9],
  [5, 9.5, 6.5, 1, -3, 1, 1, 7.185326479104102e-8],
  [5, 9.5, 1.5, 1.6, -8, 1, 1, 2.749844396030486e-6],
  [0.1, 3.15, 1.15, 2, -2, 0.19, 0.5, 2.00031183524248e-9],
  [0.1, 3.15, -0.85, 4, -4, 0.19, 0.5, 1.971097318491146e-11],
  [0.05, 0.2591, 0.1591, 5, -0.1, 0.067, 0.0919, 7.074383130403965e-3],
  [0.15, 0.2591, 0.1591, 5, -0.1, 0.067, 0.0919, 5.183792908923638e-2],
];

export const TRAPEZOID: PublishedForm = {
  source:
    "trapezoidal barrier (Airy functions; Gundlach, Solid-State Electron. 9, 949 (1966), citation from memory)",
  curves: TRAPEZOIDS.map(([energy, first, last, width, levelRight, mass, own, transmission]) => ({
    title: `${first} to ${last} eV over ${width} nm, then ${levelRight} eV; ${mass} and ${own} m_e`,
    mass,
    potential: trapezoid({ first, last, width, levelRight, mass, own }),
    points: [[energy, transmission]],
    // Rounding of V1, V2 and d, in exponents of up to twenty.
    printed: 2e-14,
  })),
};

const falling = (
  mass: number,
  top: number,
  force: number,
  points: PublishedCurve["points"],
): PublishedCurve => ({
  title: `${top} eV, ${force} eV/nm, ${mass} m_e`,
  mass,
  potential: triangle({ top, force, mass }),
  points,
  witnessOnly: BENT,
  widest: BENT_WIDEST,
  // As above: rounding of V0 and F, in exponents of up to twenty-five.
  printed: 2e-14,
});

export const TRIANGLE: PublishedForm = {
  source:
    "triangular barrier without end (Fowler & Nordheim, Proc. R. Soc. A 119, 173 (1928); exact with Bi + i Ai: Forbes & Deane, Proc. R. Soc. A 467, 2927 (2011); citations from memory)",
  curves: [
    falling(1, 9.5, 3, [[5, 7.268569032104373e-10]]),
    falling(1, 9.5, 5, [
      [4, 4.418036409416151e-8],
      [5, 4.343126882242373e-6],
      [9.5, 0.5561225229184851],
      [11, 0.7973607627115998],
    ]),
    falling(1, 9.5, 10, [[5, 2.951619195028948e-3]]),
    falling(0.5, 3.15, 1, [[0.2, 2.327566054670398e-11]]),
    falling(0.067, 0.3, 0.05, [
      [0.1, 8.193849712007709e-2],
      [0.2, 0.4497349110094275],
    ]),
  ],
};
