import { ForwardFft, fftWavenumbers } from "../numerics/fft.js";
import type { Potential } from "../potentials/potential.js";
import { HBAR } from "../units/constants.js";
import { periodicPotential } from "./band-limited.js";
import type { Grid } from "./grid.js";

/**
 * The Hamiltonian p^2 / 2m + V on a periodic grid: p^2 exact for every plane wave of the grid, V on the nodes as
 * grid/band-limited.ts makes it. Owns the work space of its own application.
 * Cost O(n log n). Source: common practice, no source.
 */
export class FourierHamiltonian {
  /** hbar^2 k^2 / 2m in the order of the transform, eV. */
  readonly kinetic: Float64Array;
  /** V on the nodes, eV. */
  readonly potential: Float64Array;
  private readonly fft: ForwardFft;
  private readonly spectrum: Float64Array;

  constructor(grid: Grid, potential: Potential, particleMass: number) {
    const n = grid.x.length;
    this.potential = periodicPotential(grid, potential);
    this.kinetic = fftWavenumbers(n, n * grid.finest).map((k) => (HBAR * HBAR * k * k) / (2 * particleMass));
    this.fft = new ForwardFft(n);
    this.spectrum = new Float64Array(2 * n);
  }

  /** out <- H psi (interleaved states). @throws RangeError when out is psi */
  apply(out: Float64Array, psi: Float64Array): void {
    if (out === psi) throw new RangeError("applyHamiltonian: the output must not be the state itself");
    const { fft, kinetic, potential, spectrum } = this;
    const n = kinetic.length;
    // A forward transform of conjugates stands for the inverse one.
    fft.forward(spectrum, psi);
    for (let j = 0; j < n; j++) {
      spectrum[2 * j] *= kinetic[j] / n;
      spectrum[2 * j + 1] *= -kinetic[j] / n;
    }
    fft.forward(out, spectrum);
    for (let j = 0; j < n; j++) {
      out[2 * j] += potential[j] * psi[2 * j];
      out[2 * j + 1] = potential[j] * psi[2 * j + 1] - out[2 * j + 1];
    }
  }
}
