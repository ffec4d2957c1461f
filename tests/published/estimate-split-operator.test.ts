import { describe, expect, it } from "vitest";
import { prepare, propagate, readDesign } from "../../src/index.js";
import { designText, estimateRow, expectTrusted } from "./estimate-helpers.js";

const SPLIT = "{ stepper: split-operator }";

describe("sech2 barrier by the split operator, asked for 1e-10 (computed by 40-50 digit quadrature of Landau & Lifshitz par. 25, problem 4 [memory])", () => {
  it.each([
    { energy: 0.2, width: 10, reference: 0.2628402087185223 },
    { energy: 0.4, width: 20, reference: 0.873558769454206 },
  ])("$energy eV, $width nm: $reference", async ({ energy, width, reference }) => {
    const potential = "{ shape: sech2, height: 0.3 eV, width: 2 nm }";
    const answer = await estimateRow({ potential, energy, width, numerics: SPLIT }, 1e-10);
    expect(answer.stepper).toBe("split-operator");
    expectTrusted(answer, reference, { accuracy: 1e-10, referenceError: 1e-15 });
  });

  it("0.2 eV, 10 nm, by Chebyshev expansion, which leaves no error of the time step: 0.2628402087185223", async () => {
    const potential = "{ shape: sech2, height: 0.3 eV, width: 2 nm }";
    const numerics = "{ stepper: chebyshev }";
    const answer = await estimateRow({ potential, energy: 0.2, width: 10, numerics }, 1e-10);
    expect(answer).toMatchObject({ stepper: "chebyshev", order: "exact", parts: { timeStep: 0 } });
    expect(answer.checks.map(({ name }) => name)).not.toContain("time step");
    expectTrusted(answer, 0.2628402087185223, { accuracy: 1e-10, referenceError: 1e-15 });
  });
});

/** hbar^2 / (2 m_e) in eV nm^2, CODATA 2022 (check-values.md, 1: computed). */
const K = 0.038099821109685836;

describe("reflectionless wells -l(l+1) hbar^2/(2 m a^2) / cosh^2(x/a): R = 0 at every energy (Landau & Lifshitz par. 25, problem 4 [memory])", () => {
  const well = (order: number) => ({
    potential: `{ shape: sech2, height: ${(-order * (order + 1) * K) / (0.067 * 2 ** 2)} eV, width: 2 nm }`,
    energy: 0.4,
    // Some 16 standard deviations of k above zero: nothing in the packet is slow or moves backwards.
    width: 15,
  });

  it.each([1, 2, 3])(
    "l = %i: what a split-operator run has left of the well at the end is below 1e-12",
    async (order) => {
      // A step at which the splitting of order 6 itself reflects far less than that.
      const numerics = "{ stepper: split-operator, timeStep: 0.3 fs }";
      const design = readDesign(designText({ ...well(order), numerics }));
      const run = prepare(design, { end: 330 });
      await propagate(run);
      const { x, weight } = run.stepper.system.grid;
      const [left, right] = design.potential.faces;
      const share = (from: number, to: number) =>
        x.reduce(
          (sum, at, j) =>
            at >= from && at < to ? sum + weight[j] * (run.psi[2 * j] ** 2 + run.psi[2 * j + 1] ** 2) : sum,
          0,
        );
      expect(share(Number.NEGATIVE_INFINITY, left)).toBeLessThan(1e-12);
      // It has all come out, to the right.
      expect(share(left, right)).toBeLessThan(1e-12);
      expect(Math.abs(share(right, Number.POSITIVE_INFINITY) - 1)).toBeLessThan(1e-11);
    },
  );

  it("l = 1: the estimate says so, with a bound", async () => {
    const answer = await estimateRow({ ...well(1), numerics: SPLIT }, 1e-10);
    expectTrusted(answer, 1, { accuracy: 1e-10 });
    expect(answer.reflection.value).toBeLessThan(1e-12);
    // The bound adds the roundings of some thousand transforms, counted from the drift of the norm: 1.3e-11 here, the drift being 3e-12.
    expect(answer.reflection.error).toBeLessThan(2e-11);
  });
});

describe("a barrier with jumps by Chebyshev expansion (closed form: Landau & Lifshitz par. 25, problem 2 [memory])", () => {
  it("0.3 eV, 5 nm, a packet of 0.15 eV and 10 nm: 0.02662290308416971, within the bound that a circle can give", async () => {
    const potential = "{ shape: rectangular, height: 0.3 eV, width: 5 nm }";
    const numerics = "{ stepper: chebyshev }";
    const answer = await estimateRow({ potential, energy: 0.15, width: 10, numerics }, 1e-3);
    // The band-limited V leaves h^3: no time step is to blame.
    expectTrusted(answer, 0.02662290308416971, { accuracy: 1e-3 });
    expect(answer.parts.timeStep).toBe(0);
  });
});
