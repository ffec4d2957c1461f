import { describe, expect, it } from "vitest";
import type { Potential } from "../../src/potentials/potential.js";
import { shifted } from "../../src/potentials/shifted.js";
import { scatter } from "../../src/stationary/scattering.js";
import { ELECTRON_MASS } from "../../src/units/constants.js";
import { eckart, sech2, slabs, smoothStep, type Transmission } from "../potentials/closed-forms.js";
import { between } from "../published/made-potentials.js";
import { shape } from "./helpers.js";

const logUniform = (low: number, high: number, u: number) => low * (high / low) ** u;

/** As in exact-oracle.test.ts. */
function numbers(start: number): () => number {
  let state = start;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

interface Case {
  readonly potential: Potential;
  readonly reference: Transmission;
  /** Higher level, eV. */
  readonly top: number;
  /** Size of the exponents in the closed form: it is right to about that many units in the last place. */
  readonly exponent: (energy: number) => number;
}

function draw(next: () => number, mass: number): Case {
  const width = logUniform(0.3, 5, next());
  const m = mass * ELECTRON_MASS;
  const k = (energy: number) => (Math.sqrt(2 * m * Math.abs(energy)) / 0.6582119569509066) * width;
  const kind = Math.floor(next() * 3);
  if (kind === 0) {
    const height = (next() < 0.3 ? -1 : 1) * logUniform(0.02, 1, next());
    const exponent = (energy: number) => 2 * Math.PI * (k(energy) + k(height));
    return {
      potential: shape("sech2", { height, width }, mass),
      reference: sech2(height, width),
      top: 0,
      exponent,
    };
  }
  if (kind === 1) {
    const height = logUniform(0.05, 1, next());
    const drop = height * (2 * next() - 1.2);
    const exponent = (energy: number) => 4 * Math.PI * (k(energy) + k(2 * height + Math.abs(drop)));
    return {
      potential: shape("eckart", { height, drop, width }, mass),
      reference: eckart(height, drop, width),
      top: Math.max(0, drop),
      exponent,
    };
  }
  const height = 0.6 * next() - 0.3;
  const exponent = (energy: number) => 2 * Math.PI * (k(energy) + k(energy - height));
  return {
    potential: shape("step", { height, thickness: width / 2 }, mass),
    reference: smoothStep(height, width / 2),
    top: Math.max(0, height),
    exponent,
  };
}

describe("smooth shapes against their closed forms (sources as in tests/published/values-smooth.ts)", () => {
  it("never lets T out of its bound on 400 random shapes, wherever they stand", () => {
    const next = numbers(7_031_994);
    const sizes: number[] = [];
    for (let trial = 0; trial < 400; trial++) {
      const mass = logUniform(0.02, 1, next());
      const { potential, reference, top, exponent } = draw(next, mass);
      const energy = top + logUniform(1e-3, 2, next());
      // cosh^2 of more than this overflows in the closed form.
      if (exponent(energy) > 300) continue;
      const centre = trial % 4 === 0 ? 40 * next() : 0;
      const moved = shifted(potential, centre);
      const { transmission, reflection } = scatter(moved, mass * ELECTRON_MASS, energy);
      const expected = reference(energy, mass * ELECTRON_MASS);
      // Rounding in the closed form: of its exponents, and of E less the higher level.
      const own = 4 * Number.EPSILON * (exponent(energy) + energy / (energy - top));
      const context = JSON.stringify({ trial, shape: potential.shape, mass, energy, transmission, expected });
      expect(Math.abs(transmission.value - expected), context).toBeLessThanOrEqual(
        transmission.error + own * Math.max(expected, potential.shape === "step" ? 1 : 0),
      );
      expect(Math.abs(transmission.value + reflection.value - 1), context).toBeLessThanOrEqual(
        transmission.error + reflection.error,
      );
      sizes.push(transmission.error / transmission.value);
    }
    expect(sizes.length).toBeGreaterThan(250);
    expect(sizes.sort((a, b) => a - b)[sizes.length >> 1]).toBeLessThan(2e-12);
  });

  it("gives a Gaussian barrier the same T from both sides, and what ever thinner slabs tend to", () => {
    const mass = 0.067;
    const barrier = shape("gaussian", { height: 0.3, width: 2 }, mass);
    const [left, right] = [-12, 12];
    for (const energy of [0.05, 0.2, 0.3, 0.5]) {
      const { transmission } = scatter(barrier, mass * ELECTRON_MASS, energy);
      const mirrored = scatter(barrier, mass * ELECTRON_MASS, energy, "right").transmission;
      expect(Math.abs(transmission.value - mirrored.value)).toBeLessThanOrEqual(
        transmission.error + mirrored.error,
      );
      const by = (count: number) => {
        const width = (right - left) / count;
        const stack = Array.from({ length: count }, (_, i) => ({
          width,
          height: barrier.cellAverage(left + i * width, left + (i + 1) * width),
        }));
        return Math.log(slabs(stack)(energy, mass * ELECTRON_MASS));
      };
      // The error falls like h^2, then h^4: two steps of extrapolation. V at 12 nm is 1e-9 of the top.
      const [a, b, c] = [by(300), by(600), by(1200)];
      const [ab, bc] = [b + (b - a) / 3, c + (c - b) / 3];
      expect(Math.log(transmission.value)).toBeCloseTo(bc + (bc - ab) / 15, 8);
    }
  });
});

describe("sloped and curved parts between interfaces (those with a closed form are in tests/published)", () => {
  it("follows a mass and a V that both change smoothly, across a kink in between", () => {
    const value = (x: number) => 0.3 * (1 - Math.abs(x - 3) / 3) + 0.05 * Math.sin(x);
    const mass = (x: number) => (x > 0 && x < 6 ? 0.067 + 0.01 * x + 0.02 * Math.cos(x) : 0.067);
    const potential = between([0, 3, 6], value, mass, 1);
    const m = 0.067 * ELECTRON_MASS;
    for (const energy of [0.03, 0.15, 0.4]) {
      const { transmission } = scatter(potential, m, energy);
      const by = (count: number) => {
        const width = 6 / count;
        const stack = Array.from({ length: count }, (_, i) => {
          const x = (i + 0.5) * width;
          return { width, height: value(x), mass: mass(x) * ELECTRON_MASS };
        });
        return slabs(stack)(energy, m);
      };
      const [a, b, c, d] = [by(200), by(400), by(800), by(1600)];
      const first = [b + (b - a) / 3, c + (c - b) / 3, d + (d - c) / 3];
      const second = [first[1] + (first[1] - first[0]) / 15, first[2] + (first[2] - first[1]) / 15];
      // Slabs with midpoint values: h^2, h^4 taken out, what is left is 1e-11.
      expect(Math.abs(transmission.value - second[1])).toBeLessThan(1e-10 * transmission.value);
      expect(transmission.error).toBeLessThan(1e-12 * transmission.value);
    }
  });

  it("finds a kink that no interface announces, and says what it leaves", () => {
    const value = (x: number) => 0.3 * (1 - Math.abs(x - 2.2) / 3.8);
    const known = between([0, 2.2, 6], value, () => 0.067, 2);
    const hidden = between([0, 6], value, () => 0.067, 2);
    const m = 0.067 * ELECTRON_MASS;
    const [a, b] = [known, hidden].map((potential) => scatter(potential, m, 0.12).transmission);
    expect(Math.abs(a.value - b.value)).toBeLessThanOrEqual(a.error + b.error);
    expect(b.error).toBeLessThan(1e-11 * b.value);
  });

  it("gives flat parts of a curved potential the same T as flat layers", () => {
    const curved = between(
      [0, 2, 5],
      (x) => (x < 2 ? 0.4 : 0.1),
      (x) => (x > 0 && x < 2 ? 0.1 : 0.067),
      1,
    );
    const m = 0.067 * ELECTRON_MASS;
    const expected = slabs([
      { width: 2, height: 0.4, mass: 0.1 * ELECTRON_MASS },
      { width: 3, height: 0.1 },
    ])(0.25, m);
    const { transmission } = scatter(curved, m, 0.25);
    expect(Math.abs(transmission.value - expected)).toBeLessThanOrEqual(
      transmission.error + 4e-15 * expected,
    );
  });
});
