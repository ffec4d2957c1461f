import { describe, expect, it } from "vitest";
import { ForwardFft } from "../../src/numerics/fft.js";
import { PhasedFftPair } from "../../src/numerics/phased-fft.js";

/** Values without any symmetry, between -1 and 1. */
const values = (length: number, seed: number) =>
  Float64Array.from({ length }, (_, i) => Math.sin(seed + 1.7 * i + 0.013 * i * i));

/** sum_j x_j exp(sign 2 pi i j k / n), from the definition. */
function transform(x: Float64Array, sign: 1 | -1): Float64Array {
  const n = x.length / 2;
  const out = new Float64Array(2 * n);
  for (let k = 0; k < n; k++)
    for (let j = 0; j < n; j++) {
      // The product is reduced before it meets pi, so that the angle is right to round-off.
      const angle = (sign * 2 * Math.PI * ((j * k) % n)) / n;
      out[2 * k] += x[2 * j] * Math.cos(angle) - x[2 * j + 1] * Math.sin(angle);
      out[2 * k + 1] += x[2 * j] * Math.sin(angle) + x[2 * j + 1] * Math.cos(angle);
    }
  return out;
}

function product(x: Float64Array, y: Float64Array): Float64Array {
  return x.map((_, i) =>
    i % 2 === 0 ? x[i] * y[i] - x[i + 1] * y[i + 1] : x[i - 1] * y[i] + x[i] * y[i - 1],
  );
}

describe("transforms against the sum that defines them", () => {
  // Both parities of the power of two, which the library treats differently.
  it.each([8, 16, 32, 64, 128, 256, 512])("after . F^-1 (between . F (before . psi)), n = %i", (n) => {
    const [psi, before, between, after] = [1, 2, 3, 4].map((seed) => values(2 * n, seed));
    const expected = product(
      transform(product(transform(product(psi, before), -1), between), 1).map((value) => value / n),
      after,
    );
    const pair = new PhasedFftPair(n);
    const found = psi.slice();
    pair.apply(found, before, pair.spectrumTable(between), after);
    // The sum by definition adds n terms; both round at 1e-16 each. Measured: 2e-14 at n = 512.
    found.forEach((value, i) => {
      expect(Math.abs(value - expected[i])).toBeLessThan(1e-13);
    });
  });

  it.each([2, 4, 8, 64, 128])("forward, n = %i", (n) => {
    const data = values(2 * n, 5);
    const expected = transform(data, -1);
    const found = new Float64Array(2 * n);
    new ForwardFft(n).forward(found, data);
    found.forEach((value, i) => {
      expect(Math.abs(value - expected[i])).toBeLessThan(1e-13 * n);
    });
  });

  it("refuses what is no power of two, too few points, and its own input as output", () => {
    for (const n of [0, 1, 4, 12, 100, Number.NaN]) expect(() => new PhasedFftPair(n)).toThrow(RangeError);
    for (const n of [0, 1, 3, 12, Number.NaN]) expect(() => new ForwardFft(n)).toThrow(RangeError);
    const data = new Float64Array(16);
    expect(() => new ForwardFft(8).forward(data, data)).toThrow(/output/);
  });
});
