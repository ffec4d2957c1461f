import { HBAR } from "../../src/units/constants.js";
import { tanhSinh } from "./tanh-sinh.js";

/**
 * Transmission at energy E (eV) for mass m (eV fs^2/nm^2), incident from the left, in closed form or by a transfer
 * matrix: written for the tests, sharing nothing with the program but the constants.
 */
export type Transmission = (energy: number, mass: number) => number;

const wavenumber = (energy: number, mass: number) => Math.sqrt(2 * mass * energy) / HBAR;

export interface Slab {
  readonly width: number;
  readonly height: number;
  /** The particle's when left out. */
  readonly mass?: number;
}

/**
 * Flat layers between equal leads at V = 0: M maps (psi, psi'/m) from left to right, det M = 1, v = k/m;
 * T = 4 v^2 / [(v M22 + v M11)^2 + (M21 - v^2 M12)^2] (check-values.md, 2.8; conditions of BenDaniel and Duke 1966).
 */
export function slabs(stack: readonly Slab[]): Transmission {
  return (energy, mass) => {
    let [m11, m12, m21, m22] = [1, 0, 0, 1];
    for (const slab of stack) {
      const m = slab.mass ?? mass;
      const excess = energy - slab.height;
      const q = wavenumber(Math.abs(excess), m);
      const c = excess > 0 ? Math.cos(q * slab.width) : Math.cosh(q * slab.width);
      const s =
        excess === 0 ? slab.width : (excess > 0 ? Math.sin(q * slab.width) : Math.sinh(q * slab.width)) / q;
      const [a, b, d] = [c, m * s, (-Math.sign(excess) * q * q * s) / m];
      [m11, m12, m21, m22] = [a * m11 + b * m21, a * m12 + b * m22, d * m11 + a * m21, d * m12 + a * m22];
    }
    const v = wavenumber(energy, mass) / mass;
    return (4 * v * v) / ((v * (m11 + m22)) ** 2 + (m21 - v * v * m12) ** 2);
  };
}

/** Landau and Lifshitz, par. 25, problem 4 (from memory; check-values.md, 2.5). */
export function sech2(height: number, width: number): Transmission {
  return (energy, mass) => {
    const s = Math.sinh(Math.PI * wavenumber(energy, mass) * width) ** 2;
    const d = (8 * mass * height * width ** 2) / HBAR ** 2;
    const c =
      d > 1 ? Math.cosh((Math.PI / 2) * Math.sqrt(d - 1)) : Math.cos((Math.PI / 2) * Math.sqrt(1 - d));
    return s / (s + c * c);
  };
}

/** C. Eckart (1930), eq. (15), in the form of check-values.md, 2.6; his A is the drop, his l is 2 pi width. */
export function eckart(height: number, drop: number, width: number): Transmission {
  const b = (Math.sqrt(height) + Math.sqrt(height - drop)) ** 2;
  return (energy, mass) => {
    const c = (HBAR ** 2 * Math.PI ** 2) / (2 * mass * (2 * Math.PI * width) ** 2);
    const alpha = Math.PI * Math.sqrt(energy / c);
    const beta = Math.PI * Math.sqrt((energy - drop) / c);
    const delta = Math.PI * Math.sqrt(Math.abs(b - c) / c);
    const last = b > c ? Math.cosh(delta) : Math.cos(delta);
    return (2 * Math.sinh(alpha) * Math.sinh(beta)) / (Math.cosh(alpha + beta) + last);
  };
}

/** Landau and Lifshitz, par. 25, problem 3 (from memory; check-values.md, 2.3). */
export function smoothStep(height: number, thickness: number): Transmission {
  return (energy, mass) => {
    const left = Math.PI * thickness * wavenumber(energy, mass);
    const right = Math.PI * thickness * wavenumber(energy - height, mass);
    return 1 - (Math.sinh(left - right) / Math.sinh(left + right)) ** 2;
  };
}

/** D. J. Griffiths, sec. 2.5 (from memory; check-values.md, 2.4). */
export function delta(strength: number): Transmission {
  return (energy, mass) => 1 / (1 + ((mass * strength) / (HBAR ** 2 * wavenumber(energy, mass))) ** 2);
}

/** Mean over a packet: integral |phi(k)|^2 T(E_k) dk, |phi|^2 = sqrt(2/pi) sigma exp(-2 sigma^2 (k - k0)^2), k > 0. */
export function packetMean(transmission: Transmission, energy: number, mass: number, sigma: number): number {
  const k0 = wavenumber(energy, mass);
  const integrand = (k: number) =>
    Math.sqrt(2 / Math.PI) *
    sigma *
    Math.exp(-2 * (sigma * (k - k0)) ** 2) *
    transmission((HBAR * k) ** 2 / (2 * mass), mass);
  // 4.5/sigma is nine standard deviations: 1e-18 of the weight is left out. Panels narrow enough for sharp resonances.
  const [low, high] = [Math.max(0, k0 - 4.5 / sigma), k0 + 4.5 / sigma];
  const panels = 60;
  let sum = 0;
  for (let p = 0; p < panels; p++) {
    sum += tanhSinh(integrand, low + ((high - low) * p) / panels, low + ((high - low) * (p + 1)) / panels);
  }
  return sum;
}
