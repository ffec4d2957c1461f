import { describe, expect, it } from "vitest";
import { periodicPotential, SEAM_ROOM } from "../../src/grid/band-limited.js";
import { type Grid, periodicGrid } from "../../src/grid/grid.js";
import { sampleGaussian, wavenumberOf } from "../../src/packets/gaussian.js";
import type { Potential } from "../../src/potentials/potential.js";
import { splitOperator } from "../../src/steppers/split-operator.js";
import { MASS, potentialOf } from "./samples.js";

const N = 256;
const STEP = 0.5;
const circle = periodicGrid(-64, STEP, N);

/** c_k = (1/n) sum_j V_j exp(-i k x_j) by its definition. */
function coefficient(v: Float64Array, grid: Grid, k: number): [re: number, im: number] {
  let [re, im] = [0, 0];
  v.forEach((value, j) => {
    re += value * Math.cos(k * grid.x[j]);
    im -= value * Math.sin(k * grid.x[j]);
  });
  return [re / v.length, im / v.length];
}

const mean = (v: Float64Array) => v.reduce((sum, value) => sum + value, 0) / v.length;

describe("band-limited potential", () => {
  it("of a barrier has its mean and its own Fourier coefficients, h sin(k w / 2) / (k L / 2) exp(-i k c)", () => {
    const [height, width, center] = [0.3, 5.3, 1.17];
    const v = periodicPotential(circle, potentialOf("rectangular", { height, width }, center));
    const length = N * STEP;
    expect(mean(v)).toBeCloseTo((height * width) / length, 14);
    for (const j of [1, 2, 17, 60, 127]) {
      const k = (2 * Math.PI * j) / length;
      const size = (2 * height * Math.sin((k * width) / 2)) / (k * length);
      const [re, im] = coefficient(v, circle, k);
      expect(re).toBeCloseTo(size * Math.cos(k * center), 14);
      expect(im).toBeCloseTo(-size * Math.sin(k * center), 14);
    }
  });

  it("of a delta has the same coefficient g / L at every k of the band", () => {
    const v = periodicPotential(circle, potentialOf("delta", { strength: 0.5 }));
    for (const j of [0, 1, 40, 127]) {
      const [re, im] = coefficient(v, circle, (2 * Math.PI * j) / (N * STEP));
      expect(re).toBeCloseTo(0.5 / (N * STEP), 14);
      expect(im).toBeCloseTo(0, 14);
    }
  });

  it("of a smooth shape is V at the nodes", () => {
    const bump = potentialOf("gaussian", { height: 0.3, width: 2 });
    expect([...periodicPotential(circle, bump)]).toEqual([...circle.x].map((x) => bump.value(x)));
  });

  it.each([
    ["sharp", "step", { height: -0.2 }],
    ["smooth", "step", { height: 0.2, thickness: 1 }],
    ["eckart", "eckart", { height: 0.3, drop: -0.25, width: 1 }],
  ])(
    "%s: returns to the near level at the seam by a ramp, and equals either level between",
    (title, shape, values) => {
      const potential = potentialOf(shape, values);
      const v = periodicPotential(circle, potential);
      const level = potential.levelRight;
      // Half-way at the seam itself.
      expect(v[0]).toBeCloseTo(level / 2, 9);
      // A jump at x = 0 rings like 1/distance in the band's own waves; a smooth shape does not.
      const ringing = title === "sharp" ? Math.abs(level) / 30 : 1e-9;
      for (let j = SEAM_ROOM; j < 84; j++) expect(Math.abs(v[j])).toBeLessThan(ringing);
      for (let j = 172; j <= N - SEAM_ROOM; j++) expect(Math.abs(v[j] - level)).toBeLessThan(ringing);
      // Monotonic within the ramp, apart from the ringing.
      for (let j = 1; j < SEAM_ROOM; j++)
        expect((v[j] - v[j - 1]) * Math.sign(level)).toBeLessThan(ringing / 10);
    },
  );
});

describe("translation: nothing depends on where the interfaces lie between the nodes", () => {
  // A kinetic phase of 3.06 at the band's edge, below pi; and long enough for all but 1e-8 of the packet to have passed.
  const TIME_STEP = 0.09;
  const END = 400;
  /** Share of a packet of 0.15 eV and 8 nm beyond the barrier in the end. */
  function transmitted(potential: Potential): number {
    const grid = periodicGrid(-512, STEP, 2048);
    const stepper = splitOperator.prepare({ grid, potential, particleMass: MASS }, TIME_STEP);
    const psi = new Float64Array(2 * grid.x.length);
    sampleGaussian(psi, grid.x, { center: -80, width: 8, wavenumber: wavenumberOf(0.15, MASS) });
    for (let step = 0; step < END / TIME_STEP; step++) stepper.advance(psi, step * TIME_STEP);
    let sum = 0;
    for (let j = 1044; j < 2048; j++) sum += STEP * (psi[2 * j] ** 2 + psi[2 * j + 1] ** 2);
    return sum;
  }

  it("a barrier moved by parts of a spacing transmits the same to 2e-4, and would not if it were sampled", () => {
    const values = { height: 0.3, width: 4.8 };
    const at = (center: number) => potentialOf("rectangular", values, center);
    const reference = transmitted(at(0));
    // The product V psi has twice the band and is folded onto it: that is all which still knows the nodes, 1.3e-4 at this spacing, 2e-6 at half of it.
    for (const part of [0.13, 0.29, 0.5])
      expect(Math.abs(transmitted(at(part * STEP)) / reference - 1)).toBeLessThan(2e-4);
    const sampled = (center: number) => transmitted({ ...at(center), slopeTransform: undefined });
    expect(Math.abs(sampled(0.29 * STEP) / sampled(0) - 1)).toBeGreaterThan(1e-2);
  });
});
