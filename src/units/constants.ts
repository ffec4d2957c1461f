/**
 * Fundamental constants, CODATA 2022 (Mohr, Newell, Taylor, Tiesinga, Rev. Mod. Phys. 97, 025002 (2025)), and what
 * follows from them in the program's own units: nm, eV, fs; mass in eV fs^2/nm^2.
 */

/** Planck constant, J s; exact since the SI of 2019. */
export const PLANCK_J_S = 6.62607015e-34;
/** Elementary charge, C; exact since the SI of 2019. */
export const ELEMENTARY_CHARGE_C = 1.602176634e-19;
/** Electron mass, kg; CODATA 2022, relative standard uncertainty 3.1e-10. */
export const ELECTRON_MASS_KG = 9.1093837139e-31;
/** Unified atomic mass unit, kg; CODATA 2022. */
export const ATOMIC_MASS_KG = 1.66053906892e-27;
/** Bohr radius, m; CODATA 2022. */
export const BOHR_RADIUS_M = 5.29177210544e-11;
/** Hartree energy, J; CODATA 2022. */
export const HARTREE_J = 4.359744722206e-18;
/** Boltzmann constant, J/K; exact since the SI of 2019. */
export const BOLTZMANN_J_K = 1.380649e-23;

/** Reduced Planck constant, eV fs. */
export const HBAR = (PLANCK_J_S / (2 * Math.PI) / ELEMENTARY_CHARGE_C) * 1e15;
/** One kilogram in eV fs^2/nm^2: 1 kg = 1 J s^2/m^2. */
export const KILOGRAM = 1e12 / ELEMENTARY_CHARGE_C;
/** Electron mass, eV fs^2/nm^2. */
export const ELECTRON_MASS = ELECTRON_MASS_KG * KILOGRAM;
/** Unified atomic mass unit, eV fs^2/nm^2. */
export const ATOMIC_MASS = ATOMIC_MASS_KG * KILOGRAM;
