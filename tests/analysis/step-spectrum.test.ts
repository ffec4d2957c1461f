import { describe, expect, it } from "vitest";
import { recordWeights, stepPhase, stepTransform } from "../../src/analysis/step-spectrum.js";
import { uniformClosedGrid } from "../../src/grid/grid.js";
import { crankNicolson } from "../../src/steppers/crank-nicolson.js";
import { HBAR } from "../../src/units/constants.js";
import { MASS, potentialOf } from "../grid/samples.js";
import { overlap } from "../steppers/samples.js";

/** Of the taper, e^-beta = e^-18. */
const TAPER_LEAKAGE = 1.6e-8;

describe("the phase of a Crank-Nicolson step", () => {
  const grid = uniformClosedGrid(0, 0.25, 199);
  const free = potentialOf("rectangular", { height: 0, width: 1 }, 25);
  /** Standing wave of the box and its energy: sin(l pi j / n), (2 hbar^2/m h^2) sin^2(l pi/2n) (those of a chain, textbook knowledge). */
  const level = (l: number) => ({
    psi: Float64Array.from({ length: 398 }, (_, i) =>
      i % 2 === 0 ? Math.sin((l * Math.PI * (i / 2 + 1)) / 200) : 0,
    ),
    energy: ((2 * HBAR ** 2) / (MASS * 0.25 ** 2)) * Math.sin((l * Math.PI) / 400) ** 2,
  });

  it.each([
    [0, 2],
    [0.2, 2],
    [0.2, 9],
    [-0.4, 0.3],
  ])("is what a step takes off an eigenstate: E_ref = %d eV, dt = %d fs", (referenceEnergy, timeStep) => {
    const system = { grid, potential: free, particleMass: MASS, referenceEnergy };
    const stepper = crankNicolson.prepare(system, timeStep);
    for (const l of [1, 12, 40, 120, 199]) {
      const { psi, energy } = level(l);
      const start = psi.slice();
      stepper.advance(psi, 0);
      const { theta } = stepPhase(energy, timeStep, referenceEnergy);
      const [re, im] = overlap(grid, start, psi);
      const size = overlap(grid, start, start)[0];
      expect(Math.abs(re / size - Math.cos(theta))).toBeLessThan(1e-12);
      expect(Math.abs(im / size + Math.sin(theta))).toBeLessThan(1e-12);
    }
  });

  it("is that of time itself at the reference energy, and its slope is its derivative", () => {
    for (const scale of [1e-9, 1, 1e9]) {
      const [reference, timeStep] = [0.2 * scale, 3 / scale];
      const at = stepPhase(reference, timeStep, reference);
      expect(at.theta).toBeCloseTo(0.6 / HBAR, 13);
      expect((at.slope * HBAR) / timeStep).toBeCloseTo(1, 14);
      for (const energy of [0.01 * scale, 0.35 * scale, 5 * scale]) {
        const d = 1e-5 * energy;
        const [low, high] = [energy - d, energy + d].map((e) => stepPhase(e, timeStep, reference).theta);
        expect((high - low) / (2 * d) / stepPhase(energy, timeStep, reference).slope).toBeCloseTo(1, 8);
      }
    }
  });

  it("stays below a whole turn beyond that of the reference, however high the energy", () => {
    const { theta, slope } = stepPhase(1e12, 2, 0.1);
    expect(theta - (0.1 * 2) / HBAR).toBeLessThan(Math.PI);
    expect(theta - (0.1 * 2) / HBAR).toBeGreaterThan(Math.PI - 1e-9);
    expect(slope).toBeGreaterThan(0);
  });
});

describe("the weights of a record", () => {
  it.each([0, 1, 2, 9, 200, 1001])("of %i steps are 1 in the first half and fall to 0 at the end", (last) => {
    const weights = recordWeights(last);
    expect(weights).toHaveLength(last + 1);
    for (let n = 0; n <= last; n++) {
      if (n <= last / 2) expect(weights[n]).toBe(1);
      if (n > 0) expect(weights[n]).toBeLessThanOrEqual(weights[n - 1]);
    }
    if (last > 1) expect(weights[last]).toBe(0);
  });
});

/** exp((-i phase - decay) n), n = 0 ... last. */
function tone(last: number, phase: number, decay: number): Float64Array {
  const record = new Float64Array(2 * (last + 1));
  for (let n = 0; n <= last; n++) {
    record[2 * n] = Math.exp(-decay * n) * Math.cos(phase * n);
    record[2 * n + 1] = -Math.exp(-decay * n) * Math.sin(phase * n);
  }
  return record;
}

/** 1/(1 - q), q = exp(i(theta - phase) - decay): the sum over an endless record. */
function endless(theta: number, phase: number, decay: number): [number, number] {
  const [re, im] = [
    1 - Math.exp(-decay) * Math.cos(theta - phase),
    -Math.exp(-decay) * Math.sin(theta - phase),
  ];
  const square = re * re + im * im;
  return [re / square, -im / square];
}

const apart = (a: readonly number[], b: readonly number[]) => Math.hypot(a[0] - b[0], a[1] - b[1]);

describe("the transform of a record", () => {
  it.each([
    [0.7, 0.7],
    [0.7, 0.9],
    [0.7, -2],
    [0.01, 3.1],
  ])("of a tone of phase %d that has died away is 1/(1 - q) at %d", (phase, theta) => {
    // exp(-0.1 * 200) of it is left where the weights begin to fall.
    const found = stepTransform(tone(400, phase, 0.1), recordWeights(400), theta);
    expect(apart(found, endless(theta, phase, 0.1))).toBeLessThan(40 * Math.exp(-20));
    const long = stepTransform(tone(1000, phase, 0.1), recordWeights(1000), theta);
    expect(apart(long, endless(theta, phase, 0.1))).toBeLessThan(1e-12);
  });

  it("of a tone that still rings is cut off as smoothly as if it went on for ever, but for what the taper leaks", () => {
    const [last, phase] = [1000, 0.7];
    for (const theta of [0.3, 1, 2.5, -1.5]) {
      const exact = endless(theta, phase, 0);
      const found = stepTransform(tone(last, phase, 0), recordWeights(last), theta);
      expect(apart(found, exact)).toBeLessThan(2 * TAPER_LEAKAGE * Math.hypot(...exact));
      // An end without a taper leaves a half of the size of the sum itself.
      const cut = stepTransform(tone(last, phase, 0), new Float64Array(last + 1).fill(1), theta);
      expect(apart(cut, exact)).toBeGreaterThan(0.9 * Math.hypot(...exact));
    }
  });

  it("is linear, and empty for an empty record", () => {
    const [a, b] = [tone(300, 0.2, 0.01), tone(300, 1.4, 0.002)];
    const sum = a.map((value, i) => 2 * value - 3 * b[i]);
    const weights = recordWeights(300);
    const [ta, tb, ts] = [a, b, sum].map((record) => stepTransform(record, weights, 0.5));
    expect(apart(ts, [2 * ta[0] - 3 * tb[0], 2 * ta[1] - 3 * tb[1]])).toBeLessThan(1e-12);
    expect(stepTransform(new Float64Array(602), weights, 0.5)).toEqual([0, 0]);
  });
});
