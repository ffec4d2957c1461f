import { describe, expect, it } from "vitest";
import { trigonometricValues } from "../../src/numerics/trigonometric.js";

const N = 64;
const FIRST = -3.3;
const STEP = 0.17;
const PLACES = Float64Array.from({ length: 41 }, (_, i) => FIRST + 0.2631 * i);

function sampled(f: (x: number) => readonly [number, number]): Float64Array {
  const psi = new Float64Array(2 * N);
  for (let j = 0; j < N; j++) psi.set(f(FIRST + j * STEP), 2 * j);
  return psi;
}

describe("a trigonometric interpolant", () => {
  it("is exact between the nodes for waves within the band", () => {
    const unit = (2 * Math.PI) / (N * STEP);
    const f = (x: number): [number, number] => [
      Math.cos(3 * unit * x) + 0.3 * Math.cos(-31 * unit * x + 1),
      Math.sin(3 * unit * x) + 0.3 * Math.sin(-31 * unit * x + 1),
    ];
    const values = trigonometricValues(sampled(f), FIRST, STEP, PLACES);
    PLACES.forEach((x, i) => {
      expect(values[2 * i]).toBeCloseTo(f(x)[0], 12);
      expect(values[2 * i + 1]).toBeCloseTo(f(x)[1], 12);
    });
  });

  it("gives back the samples at the nodes, also of a state that fills the band", () => {
    const psi = Float64Array.from({ length: 2 * N }, (_, i) => Math.sin(1 + i * i));
    const nodes = Float64Array.from({ length: N }, (_, j) => FIRST + j * STEP);
    const values = trigonometricValues(psi, FIRST, STEP, nodes);
    values.forEach((value, i) => {
      expect(value).toBeCloseTo(psi[i], 12);
    });
  });
});
