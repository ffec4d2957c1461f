import { EigenvalueDecomposition, Matrix } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { type Eigensystem, tridiagonalEigen } from "../../src/numerics/tridiagonal-eigen.js";

type Entries = readonly [diagonal: Float64Array, offDiagonal: Float64Array];

const made = (n: number, diagonal: (j: number) => number, offDiagonal: (j: number) => number): Entries => [
  Float64Array.from({ length: n }, (_, j) => diagonal(j)),
  Float64Array.from({ length: n - 1 }, (_, j) => offDiagonal(j)),
];

/** Greatest sum of sizes in a row: no eigenvalue is larger. */
function normOf([d, e]: Entries): number {
  return Math.max(...Array.from(d, (v, j) => Math.abs(v) + Math.abs(e[j] ?? 0) + Math.abs(e[j - 1] ?? 0)));
}

/** Greatest component of T v - lambda v, relative to the norm of T. */
function residual(entries: Entries, { values, vectors }: Eigensystem): number {
  const [d, e] = entries;
  const n = d.length;
  let worst = 0;
  for (let k = 0; k < n; k++)
    for (let j = 0; j < n; j++) {
      const at = k * n + j;
      const below = j > 0 ? e[j - 1] * vectors[at - 1] : 0;
      const above = j < n - 1 ? e[j] * vectors[at + 1] : 0;
      worst = Math.max(worst, Math.abs((d[j] - values[k]) * vectors[at] + below + above));
    }
  return worst / normOf(entries);
}

/** Greatest entry of V V^T - 1. */
function orthogonality({ values, vectors }: Eigensystem): number {
  const n = values.length;
  let worst = 0;
  for (let a = 0; a < n; a++)
    for (let b = 0; b <= a; b++) {
      let sum = a === b ? -1 : 0;
      for (let j = 0; j < n; j++) sum += vectors[a * n + j] * vectors[b * n + j];
      worst = Math.max(worst, Math.abs(sum));
    }
  return worst;
}

const largestDifference = (a: ArrayLike<number>, b: ArrayLike<number>) =>
  Math.max(...Array.from(a, (value, i) => Math.abs(value - b[i])));

/** A generator of numbers from 0 to 1 that is the same everywhere (Park and Miller, Comm. ACM 31, 1192 (1988), citation from memory). */
function numbers(start: number): () => number {
  let state = start;
  return () => {
    state = (state * 16807) % 2147483647;
    return state / 2147483647;
  };
}
const next = numbers(20);

/** Two equal wells parted by a wall of `wall` nodes: pairs of levels that lie closer than any rounding when it is thick. */
const twoWells = (n: number, wall: number) =>
  made(
    n,
    (j) => 2 + (Math.abs(j - (n - 1) / 2) < wall / 2 ? 3 : 0),
    () => -1,
  );

const CASES: Readonly<Record<string, Entries>> = {
  "one entry": made(
    1,
    () => 3,
    () => 0,
  ),
  "two equal levels, coupled": made(
    2,
    () => 1,
    () => 1e-9,
  ),
  "free lattice": made(
    301,
    () => 2,
    () => -1,
  ),
  "off-diagonal of both signs": made(
    200,
    () => next(),
    () => next() - 0.5,
  ),
  "no coupling at all": made(
    50,
    (j) => j % 7,
    () => 0,
  ),
  "all entries zero but one": made(
    40,
    (j) => (j === 11 ? 1 : 0),
    () => 0,
  ),
  "two wells with a thin wall between": twoWells(300, 6),
  "two wells with a wall that nothing crosses": twoWells(300, 60),
  "levels over thirty orders of magnitude": made(
    150,
    (j) => 10 ** (-j / 5),
    (j) => 0.3 * 10 ** (-j / 5),
  ),
  "W21+, the pairs of which agree to 14 digits (Wilkinson 1965, citation from memory)": made(
    21,
    (j) => Math.abs(j - 10),
    () => 1,
  ),
  "twelve of them, joined by next to nothing": made(
    252,
    (j) => Math.abs((j % 21) - 10),
    (j) => (j % 21 === 20 ? 1e-13 : 1),
  ),
};

describe("eigenvectors of a symmetric tridiagonal matrix", () => {
  it.each(Object.entries(CASES))("are orthonormal and belong to their values: %s", (_, entries) => {
    for (const scale of [1e-9, 1, 1e9]) {
      const scaled: Entries = [entries[0].map((v) => v * scale), entries[1].map((v) => v * scale)];
      const system = tridiagonalEigen(...scaled);
      // Measured: below 4e-15 and 1e-15 in all of these.
      expect(orthogonality(system)).toBeLessThan(1e-14);
      expect(residual(scaled, system)).toBeLessThan(4e-15);
      expect(Array.from(system.values)).toEqual(Array.from(system.values).sort((a, b) => a - b));
    }
  });

  it("keep both at a thousand", () => {
    const entries = made(
      1000,
      (j) => 2 + 0.02 * Math.sin(j),
      () => -1,
    );
    const system = tridiagonalEigen(...entries);
    expect(orthogonality(system)).toBeLessThan(1e-14);
    expect(residual(entries, system)).toBeLessThan(4e-15);
  });

  it("leave the matrix as it was", () => {
    const entries = made(
      20,
      (j) => j,
      () => 1,
    );
    tridiagonalEigen(...entries);
    expect(entries[0]).toEqual(Float64Array.from({ length: 20 }, (_, j) => j));
    expect(entries[1]).toEqual(new Float64Array(19).fill(1));
  });
});

describe("eigenvalues of a symmetric tridiagonal matrix", () => {
  it.each([1, 2, 3, 7, 64, 513])(
    "of the free lattice with %i nodes: 2 t (1 - cos(pi k / (n + 1))) (closed form)",
    (n) => {
      const t = 0.57;
      const { values, vectors } = tridiagonalEigen(
        ...made(
          n,
          () => 2 * t,
          () => -t,
        ),
      );
      const exact = values.map((_, k) => 2 * t * (1 - Math.cos((Math.PI * (k + 1)) / (n + 1))));
      expect(largestDifference(values, exact)).toBeLessThan(1e-14);
      // The lowest state is half a wave: sqrt(2 / (n + 1)) sin(pi (j + 1) / (n + 1)), up to its sign.
      const sine = Array.from(
        { length: n },
        (_, j) => Math.sqrt(2 / (n + 1)) * Math.sin((Math.PI * (j + 1)) / (n + 1)),
      );
      const lowest = vectors.subarray(0, n).map((v) => v * Math.sign(vectors[0]));
      // Neighbouring levels lie 3 (pi / n)^2 apart, which rounding of the norm is divided by.
      expect(largestDifference(lowest, sine)).toBeLessThan(1e-15 * n * n + 1e-15);
    },
  );

  /** -1/2 d^2/dx^2 + V on n nodes over `length`, whose levels go like h^2, h^4, ...: the lowest `count`, by Romberg over halvings. */
  function levels(length: number, potential: (x: number) => number, count: number): number[] {
    let row = [127, 255, 511, 1023].map((n) => {
      const h = length / (n + 1);
      const entries = made(
        n,
        (j) => 1 / (h * h) + potential((j + 1) * h - length / 2),
        () => -0.5 / (h * h),
      );
      return Array.from(tridiagonalEigen(...entries).values.slice(0, count));
    });
    for (let order = 1; row.length > 1; order++)
      row = row.slice(1).map((finer, g) => finer.map((v, k) => v + (v - row[g][k]) / (4 ** order - 1)));
    return row[0];
  }

  it("of the harmonic oscillator: k + 1/2 (closed form)", () => {
    const found = levels(24, (x) => 0.5 * x * x, 6);
    // Left: the product of the four h^2, 4e-10, times a number of order one.
    expect(largestDifference(found, [0.5, 1.5, 2.5, 3.5, 4.5, 5.5])).toBeLessThan(1e-9);
  });

  it("of a well of depth l (l + 1) / 2 cosh^2 x, l = 3: -9/2, -2, -1/2 (Poeschl and Teller, Z. Phys. 83, 143 (1933), citation from memory)", () => {
    const found = levels(32, (x) => -6 / Math.cosh(x) ** 2, 3);
    // The weakest state has fallen to exp(-16) at the ends, 1e-14 in energy; left: the product of the four h^2, 4e-9, times some.
    expect(largestDifference(found, [-4.5, -2, -0.5])).toBeLessThan(2e-8);
  });

  it("are those that a dense method finds (ml-matrix)", () => {
    for (const [diagonal, offDiagonal] of Object.values(CASES)) {
      const n = diagonal.length;
      const dense = Matrix.zeros(n, n);
      for (let j = 0; j < n; j++) {
        dense.set(j, j, diagonal[j]);
        if (j === 0) continue;
        dense.set(j, j - 1, offDiagonal[j - 1]);
        dense.set(j - 1, j, offDiagonal[j - 1]);
      }
      const expected = new EigenvalueDecomposition(dense, { assumeSymmetric: true }).realEigenvalues;
      const found = tridiagonalEigen(diagonal, offDiagonal).values;
      expect(
        largestDifference(
          found,
          expected.sort((a, b) => a - b),
        ),
      ).toBeLessThan(1e-14 * normOf([diagonal, offDiagonal]));
    }
  });

  it("are refused for lengths that do not fit and entries that are no numbers", () => {
    expect(() => tridiagonalEigen(new Float64Array(3), new Float64Array(3))).toThrow(RangeError);
    expect(() => tridiagonalEigen(new Float64Array(0), new Float64Array(0))).toThrow(RangeError);
    expect(() => tridiagonalEigen(Float64Array.of(1, Number.NaN), Float64Array.of(1))).toThrow(RangeError);
    expect(() => tridiagonalEigen(Float64Array.of(1, 2), Float64Array.of(Number.POSITIVE_INFINITY))).toThrow(
      RangeError,
    );
  });
});
