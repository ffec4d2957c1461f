import { HBAR } from "../units/constants.js";

/**
 * A Gaussian packet, psi(x) = (2 pi sigma^2)^(-1/4) exp(-(x - x0)^2 / (4 sigma^2) + i k0 (x - x0)).
 * Its momentum distribution is |phi(k)|^2 = sqrt(2/pi) sigma exp(-2 sigma^2 (k - k0)^2).
 */
export interface GaussianPacket {
  /** x0, nm. */
  readonly center: number;
  /** sigma, standard deviation of |psi|^2, nm. */
  readonly width: number;
  /** k0, 1/nm; negative for a packet that travels to the left. */
  readonly wavenumber: number;
}

/** |k0| of the mean kinetic energy E = hbar^2 k0^2 / 2m, in 1/nm, for energy in eV and mass in eV fs^2/nm^2. */
export function wavenumberOf(energy: number, mass: number): number {
  return Math.sqrt(2 * mass * energy) / HBAR;
}

/** Kinetic energy hbar^2 k^2 / 2m in eV. */
export function kineticEnergy(k: number, mass: number): number {
  return (HBAR * HBAR * k * k) / (2 * mass);
}

/** Standard deviation of k, 1/(2 sigma), 1/nm. */
export function wavenumberSpread(width: number): number {
  return 1 / (2 * width);
}

/** |phi(k)|^2 = sqrt(2/pi) sigma exp(-2 sigma^2 (k - k0)^2), probability per wavenumber, nm. */
export function wavenumberWeight(k: number, k0: number, width: number): number {
  return Math.sqrt(2 / Math.PI) * width * Math.exp(-2 * width * width * (k - k0) ** 2);
}

/** Writes psi into `out` (interleaved, length 2n) at the nodes x (nm), in 1/sqrt(nm). Cost O(n). */
export function sampleGaussian(out: Float64Array, x: Float64Array, packet: GaussianPacket): void {
  if (out.length !== 2 * x.length)
    throw new RangeError(
      `a state of length ${2 * x.length} is needed for ${x.length} nodes; got ${out.length}`,
    );
  const { center, width, wavenumber } = packet;
  const peak = (2 * Math.PI * width * width) ** -0.25;
  for (let j = 0; j < x.length; j++) {
    const s = x[j] - center;
    const envelope = peak * Math.exp((-s * s) / (4 * width * width));
    // Most of a long box lies where the envelope has underflowed.
    if (envelope === 0) {
      out[2 * j] = 0;
      out[2 * j + 1] = 0;
      continue;
    }
    out[2 * j] = envelope * Math.cos(wavenumber * s);
    out[2 * j + 1] = envelope * Math.sin(wavenumber * s);
  }
}
