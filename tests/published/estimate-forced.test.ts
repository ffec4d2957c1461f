import { describe, expect, it } from "vitest";
import { estimateRow, expectBoundsHold } from "./estimate-helpers.js";

/** Computed by adaptive quadrature, at 30 digits, of the closed form (Landau & Lifshitz, par. 25, problem 2 [memory]). */
const REFERENCE = 0.02662290308416971;
const ROW = { potential: "{ shape: rectangular, height: 0.3 eV, width: 5 nm }", energy: 0.15, width: 10 };

const BY_SPLIT = "stepper: split-operator";
const BY_CRANK = "stepper: crank-nicolson";

/** Numerics that no automatic choice would make; `wrong` are those that miss the accuracy asked for, whatever else they do. */
const WRONG = [
  // The one that issue 2 names: off by tens of per cents.
  `${BY_SPLIT}, order: 2, step: 0.4 nm, timeStep: 0.4 fs`,
  `${BY_SPLIT}, order: 4, step: 0.4 nm, timeStep: 0.4 fs`,
  `${BY_SPLIT}, order: 2, step: 0.2 nm, timeStep: 0.2 fs`,
  `${BY_SPLIT}, order: 2, points: 2048, timeStep: 1 fs`,
  `${BY_SPLIT}, points: 1024, timeStep: 0.25 fs`,
  `${BY_CRANK}, step: 0.5 nm`,
  `${BY_CRANK}, step: 0.1 nm, timeStep: 2 fs`,
  `${BY_CRANK}, points: 300, end: 700 fs`,
  `${BY_CRANK}, points: 2000, order: 4`,
  // Ended before the packet has passed, and while it passes.
  `${BY_CRANK}, end: 40 fs`,
  `${BY_CRANK}, end: 150 fs`,
  // A box that holds the packet at the start, but not until the end: what comes back is counted once more.
  `${BY_CRANK}, length: 260 nm, end: 600 fs`,
  `${BY_SPLIT}, length: 260 nm, points: 1024, timeStep: 0.5 fs, end: 600 fs`,
];

/** Forced, but harmless: a Crank-Nicolson result does not depend on the time step, and a later end or a larger box spoil nothing. */
const HARMLESS = [
  `${BY_CRANK}, timeStep: 0.5 fs`,
  `${BY_CRANK}, order: 4`,
  `${BY_CRANK}, order: 6`,
  `${BY_CRANK}, end: 2 ps`,
  `${BY_CRANK}, length: 1.5 um`,
];

describe("forced numerics, rectangular barrier of 0.3 eV and 5 nm, 0.15 eV, 10 nm (quadrature of the closed form)", () => {
  it.each(WRONG)("{ %s }: wrong, doubtful, and the bound holds", async (numerics) => {
    const answer = await estimateRow({ ...ROW, numerics: `{ ${numerics} }` });
    // Wrong by more than was asked for, or the row would show nothing.
    expect(Math.abs(answer.transmission.value - REFERENCE)).toBeGreaterThan(1e-6 * REFERENCE);
    expect(answer.verdict).toBe("doubtful");
    expect(answer.checks.some(({ passed }) => !passed)).toBe(true);
    expectBoundsHold(answer, REFERENCE);
  });

  it.each(HARMLESS)("{ %s }: right, and the bound holds", async (numerics) => {
    const answer = await estimateRow({ ...ROW, numerics: `{ ${numerics} }` });
    expectBoundsHold(answer, REFERENCE);
    expect(answer.verdict).toBe("trusted");
    expect(answer.transmission.error).toBeLessThanOrEqual(1e-6 * REFERENCE);
  });
});
