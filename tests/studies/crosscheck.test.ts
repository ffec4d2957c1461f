import { describe, expect, it } from "vitest";
import type { Potential } from "../../src/potentials/potential.js";
import { type Crosscheck, crosscheck } from "../../src/studies/crosscheck.js";
import { DesignLimitError } from "../../src/studies/limits.js";
import { ELECTRON_MASS } from "../../src/units/constants.js";
import { designOf, potentialOf } from "../grid/samples.js";

/** Issue: the distance of the final states on smooth designs. */
const SMOOTH_DISTANCE = 1e-6;
const PATIENCE = 240_000;

const packet = { energy: 0.2, width: 8 };
const sech2 = potentialOf("sech2", { height: 0.3, width: 2 });

/** A potential that tells Crank-Nicolson, which alone asks for means over cells, of a barrier so many times as high. */
const lying = (truth: Potential, factor: number): Potential => ({
  ...truth,
  cellAverage: (a, b) => factor * truth.cellAverage(a, b),
});

const failed = ({ checks }: Crosscheck) => checks.filter(({ passed }) => !passed).map(({ name }) => name);

describe("a crosscheck", () => {
  it(
    "of a smooth design: both steppers and the witness agree, the final states to 1e-6 with their phase",
    async () => {
      const answer = await crosscheck(designOf(sech2, packet));
      expect(failed(answer)).toEqual([]);
      expect(answer.agree).toBe(true);
      expect(answer.firstDisagreement).toBeUndefined();
      expect(answer.steppers.map(({ stepper }) => stepper)).toEqual(["crank-nicolson", "split-operator"]);
      expect(answer.refused).toEqual([]);
      const { states, motions } = answer.matched;
      expect(states.map(({ between }) => between.join())).toEqual([
        "crank-nicolson,split-operator",
        "crank-nicolson,stationary",
        "split-operator,stationary",
      ]);
      for (const { distance, limit } of states) {
        expect(distance).toBeLessThan(SMOOTH_DISTANCE);
        expect(limit).toBeLessThan(SMOOTH_DISTANCE);
        // Two independent methods never give the very same bits.
        expect(distance).toBeGreaterThan(1e-14);
      }
      expect(answer.difference.state).toBe(states[0].distance);
      const [a, b] = motions.map(({ series }) => series.find(({ name }) => name === "time")?.values);
      expect(a?.length).toBe(answer.matched.instants);
      a?.forEach((time, i) => {
        expect(time).toBeCloseTo(b?.[i] ?? Number.NaN, 6);
      });
      // From the most basic to the most derived.
      const kinds = answer.checks.map(({ kind }) => kind);
      expect([...new Set(kinds)]).toEqual(["basic", "comparison", "order"]);
      expect(kinds.join()).toBe([...kinds].sort((x, y) => (x === y ? 0 : x < y ? -1 : 1)).join());
    },
    PATIENCE,
  );

  it(
    "of a layered design: the split operator's wider bounds still hold, and its orders are those of a potential with jumps",
    async () => {
      const barrier = potentialOf("rectangular", { height: 0.3, width: 5 });
      const answer = await crosscheck(designOf(barrier, { ...packet, from: "right" }));
      expect(failed(answer)).toEqual([]);
      expect(answer.agree).toBe(true);
      const [own, split] = answer.matched.motions;
      expect(own.error.spacing).toBeLessThan(1e-6);
      expect(split.error.spacing).toBeGreaterThan(1e-6);
      const spacing = answer.orders.find(
        ({ stepper, of }) => stepper === "split-operator" && of === "spacing",
      );
      expect(spacing).toMatchObject({ declared: 2.5, passed: true });
    },
    PATIENCE,
  );

  it(
    "of masses that vary: the split operator is refused with the reason, and the witness stands against the other stepper",
    async () => {
      const wall = potentialOf("rectangular", { height: 0.3, width: 3, mass: 0.09 * ELECTRON_MASS });
      const answer = await crosscheck(designOf(wall, packet, { stepper: "split-operator" }));
      expect(answer.agree).toBe(true);
      expect(failed(answer)).toEqual([]);
      expect(answer.steppers.map(({ stepper }) => stepper)).toEqual(["crank-nicolson"]);
      expect(answer.refused).toEqual([{ name: "split-operator", reason: expect.stringMatching(/mass/) }]);
      expect(answer.difference.between).toEqual(["crank-nicolson", "stationary"]);
      const [state] = answer.matched.states;
      expect(state).toMatchObject({
        between: ["crank-nicolson", "stationary"],
        where: "outside the structure",
      });
      expect(state.distance).toBeLessThan(SMOOTH_DISTANCE);
      expect(answer.notes[0]).toMatch(/names split-operator/);
    },
    PATIENCE,
  );

  it(
    "does not agree when one stepper is told of a barrier a ten-thousandth too high, and says what breaks first",
    async () => {
      const answer = await crosscheck(designOf(lying(sech2, 1.0001), packet));
      expect(answer.agree).toBe(false);
      expect(answer.firstDisagreement).toMatch(
        /^transmission, crank-nicolson and split-operator: .* further apart/,
      );
      const names = failed(answer);
      // What Crank-Nicolson has no part in still agrees; so does its motion with itself.
      expect(names).toContain("transmission, crank-nicolson and stationary");
      expect(names).toContain("state, crank-nicolson and split-operator");
      expect(names).not.toContain("transmission, split-operator and stationary");
      expect(names).not.toContain("state, split-operator and stationary");
      expect(names).not.toContain("norm, crank-nicolson");
      expect(names.filter((name) => name.startsWith("order"))).toEqual([]);
    },
    PATIENCE,
  );

  it("refuses a potential that confines the packet, and stops when asked to", async () => {
    const harmonic = designOf(potentialOf("harmonic", { quantum: 0.02 }), packet);
    await expect(crosscheck(harmonic)).rejects.toThrow(DesignLimitError);
    const reason = new Error("stopped");
    const signal = AbortSignal.abort(reason);
    await expect(crosscheck(designOf(sech2, packet), { signal })).rejects.toBe(reason);
  });
});
