import { describe, expect, it } from "vitest";
import { crosscheckFigure } from "../../src/figures/crosscheck-figure.js";
import type { DrawnCrosscheck } from "../../src/figures/drawn-crosscheck.js";
import { textBoxes, texts } from "./read-figure.js";

const bounded = (value: number, error: number) => ({ value, error });
const series = (top: number) => [
  { name: "time", unit: "fs", values: Float64Array.of(0, 50, 100) },
  { name: "transmission", unit: "", values: Float64Array.of(0, top / 2, top) },
];

/** Invented results with the look of real ones; `difference` is the distance of the two steppers. */
function invented(difference = 2e-9, title = "Two walls", end = 100): DrawnCrosscheck {
  const stepper = (name: string, value: number) => ({
    stepper: name,
    transmission: bounded(value, 3e-9),
    reflection: bounded(1 - value, 3e-9),
  });
  return {
    design: { title, sha256: "0".repeat(64) },
    steppers: [stepper("crank-nicolson", 0.03), stepper("split-operator", 0.03 + difference)],
    witness: {
      name: "stationary",
      transmission: bounded(0.03, 1e-15),
      reflection: bounded(0.97, 1e-15),
      energies: 500,
    },
    matched: {
      end_fs: end,
      motions: ["crank-nicolson", "split-operator"].map((name) => ({ name, series: series(0.0299) })),
      states: [
        { between: ["crank-nicolson", "split-operator"], where: "everywhere", distance: 1e-8, limit: 1e-7 },
        {
          between: ["crank-nicolson", "stationary"],
          where: "outside the structure",
          distance: 0,
          limit: 1e-8,
        },
      ],
    },
    checks: [
      {
        name: "transmission over time",
        kind: "comparison",
        value: 1e-8,
        limit: 1e-7,
        passed: true,
        explanation: "",
      },
    ],
    agree: difference < 6e-9,
  } as unknown as DrawnCrosscheck;
}

describe("crosscheckFigure", () => {
  it("names every method and pair, and its axes with their units", () => {
    const shown = texts(crosscheckFigure(invented()).content);
    expect(shown).toEqual(
      expect.arrayContaining([
        "Two walls",
        "crank-nicolson",
        "split-operator",
        "stationary witness, when all has passed",
        "both steppers",
        "crank-nicolson and witness",
        "split-operator and witness",
        "final state",
        "time t (fs)",
        "transmission T",
      ]),
    );
    expect(texts(crosscheckFigure(invented(2e-9, "x", 2.4e13)).content)).toContain("time t (ms)");
  });

  it("shows a difference beyond its bound as a hollow dot, and only then", () => {
    const dots = (content: string) => [...content.matchAll(/<circle[^>]* fill="#ffffff"/g)].length;
    expect(dots(crosscheckFigure(invented()).content)).toBe(0);
    const apart = crosscheckFigure(invented(1e-6));
    // T and R, between the steppers and against the witness, and the sample in the legend.
    expect(dots(apart.content)).toBe(5);
    expect(texts(apart.content)).toContain("hollow: beyond its bound");
    expect(apart.description).toContain("do not agree");
  });

  it("keeps its texts on the page at every size", () => {
    for (const widthMm of [160, 80, 300]) {
      const figure = crosscheckFigure(
        invented(2e-9, "A title that is rather long for a figure of this width, revision C"),
        { widthMm },
      );
      for (const { left, right } of textBoxes(figure.content)) {
        expect(left).toBeGreaterThanOrEqual(0);
        expect(right).toBeLessThanOrEqual(figure.width);
      }
    }
    expect(() => crosscheckFigure(invented(), { widthMm: 20 })).toThrow(RangeError);
  });
});
