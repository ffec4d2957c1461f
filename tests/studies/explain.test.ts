import { describe, expect, it } from "vitest";
import type { Numerics } from "../../src/problem/design.js";
import { steppers } from "../../src/steppers/registry.js";
import { planClosed } from "../../src/studies/closed-plan.js";
import { explainPlan } from "../../src/studies/explain.js";
import { designOf, potentialOf } from "../grid/samples.js";

const barrier = potentialOf("rectangular", { height: 0.3, width: 5 });
const packet = { energy: 0.15, width: 10 };
const explained = (numerics: Numerics = {}, more = {}) =>
  explainPlan(designOf(barrier, { ...packet, ...more }, numerics));
const FORCED = /^as the design asks/;

describe("the explanation of a plan", () => {
  it("gives every choice a value and a reason, and none is said to be the design's where nothing is forced", () => {
    for (const { name: stepper } of steppers) {
      const { choices } = explained({ stepper });
      for (const { name, value, why } of choices) {
        expect(why.length, name).toBeGreaterThan(10);
        if (typeof value === "number") expect(Number.isFinite(value), name).toBe(true);
        if (name !== "stepper") expect(why, name).not.toMatch(FORCED);
      }
      expect(new Set(choices.map(({ name }) => name)).size).toBe(choices.length);
    }
  });

  it.each<[keyof Numerics | "start", string, string, number | string]>([
    ["stepper", "crank-nicolson", "stepper", "split-operator"],
    ["order", "crank-nicolson", "order", 4],
    ["timeStep", "crank-nicolson", "time step", 0.5],
    ["end", "crank-nicolson", "end", 600],
    ["length", "crank-nicolson", "box length", 900],
    ["step", "crank-nicolson", "widest spacing", 0.25],
    ["points", "crank-nicolson", "points", 3000],
    ["order", "split-operator", "order", 6],
    ["timeStep", "split-operator", "time step", 0.5],
    ["end", "split-operator", "end", 600],
    ["length", "split-operator", "box length", 900],
    ["step", "split-operator", "spacing", 0.25],
    ["start", "crank-nicolson", "start", -150],
  ])(
    "covers a forced %s of %s: the choice is the design's and near what was asked for",
    (key, stepper, name, value) => {
      const { choices } =
        key === "start" ? explained({}, { start: value }) : explained({ stepper, [key]: value } as Numerics);
      const choice = choices.find((each) => each.name === name);
      if (!choice) throw new Error(`no choice ${name}`);
      if (!(key === "points")) expect(choice.why).toMatch(FORCED);
      if (typeof value === "number" && typeof choice.value === "number")
        expect(Math.abs(choice.value / value - 1)).toBeLessThan(0.05);
      else expect(choice.value).toBe(value);
    },
  );

  it("shows the plan that the estimate starts from", () => {
    const plan = planClosed(designOf(barrier, packet));
    const value = (name: string) => explained().choices.find((choice) => choice.name === name)?.value;
    expect(value("time step")).toBe(plan.timeStep);
    expect(value("end")).toBe(plan.end);
    expect(value("steps")).toBe(plan.steps);
  });

  it("of a confining shape says that nothing is transmitted", () => {
    const well = potentialOf("harmonic", { quantum: 0.1 });
    const { choices, warnings } = explainPlan(designOf(well, { energy: 0.2, width: 2 }));
    expect(warnings.join()).toMatch(/confines the particle, so nothing is transmitted/);
    expect(choices.map(({ name }) => name)).toContain("points");
  });
});

describe("warnings", () => {
  it("are none for a packet that is narrow in energy and starts clear", () => {
    expect(explained({}, { width: 20 }).warnings).toEqual([]);
  });

  it.each<[string, RegExp, Numerics, Record<string, number>]>([
    ["a broad packet", /energies spread by \d+ % of their mean/, {}, { width: 3 }],
    ["a packet that also moves away", /moves away from the structure/, {}, { width: 2.5 }],
    ["a start on the structure's flank", /does not start clear/, {}, { start: -40 }],
    ["a tail beyond the face", /probability of .* lies beyond the structure's face/, {}, { start: -40 }],
    ["forced numerics", /bound is measured against an automatic calculation/, { step: 0.3 }, {}],
  ])("name %s", (_title, text, numerics, more) => {
    expect(explained(numerics, more).warnings.join("\n")).toMatch(text);
  });

  it("name a depth that a Fourier transform cannot reach", () => {
    const high = potentialOf("rectangular", { height: 3, width: 5 });
    const plan = explainPlan(designOf(high, { energy: 0.15, width: 20 }, { stepper: "split-operator" }));
    expect(plan.warnings.join()).toMatch(/below the rounding of a Fourier transform/);
  });

  it("says of eigenstates that they make maps, and finds none for it", () => {
    const before = performance.now();
    const { choices, warnings } = explained({ stepper: "eigenstates", points: 4000 });
    // Finding them would take some ten seconds.
    expect(performance.now() - before).toBeLessThan(1000);
    expect(choices.find(({ name }) => name === "points")?.why).toMatch(FORCED);
    expect(warnings).toEqual([expect.stringMatching(/eigenstates follows a packet in time.*postern map/)]);
  });
});
