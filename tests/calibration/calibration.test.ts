import { mkdtempSync, readFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { readDesign } from "../../src/index.js";
import { drawDesign } from "./draw-design.js";
import type { DrawnDesign } from "./drawn-design.js";
import { figuresText } from "./figures-text.js";
import { measure } from "./measure.js";
import { MixingGenerator } from "./mixing-generator.js";
import { compare, hasEscaped, type Row } from "./row.js";
import { figuresOf, quantile } from "./statistics.js";
import { worstOf, writeWorst } from "./worst.js";

const SEED = 3;

/** Designs without those whose packet holds slow parts or that may hold it for long: seconds each, which `npm run calibrate` has and a test has not. */
function* quickDesigns(): Generator<DrawnDesign> {
  for (let index = 0; ; index++) {
    const drawn = drawDesign(SEED, index);
    if (drawn.spreads > 14 && drawn.theme !== "resonance" && drawn.theme !== "stack") yield drawn;
  }
}

async function measured(count: number, study: "estimate" | "spectrum"): Promise<Row[]> {
  const rows: Row[] = [];
  for (const drawn of quickDesigns()) {
    if (rows.length === count) break;
    rows.push(await measure(drawn, { study, patience: 60 }));
  }
  return rows;
}

describe("a small calibration: random designs against the stationary witness", () => {
  /** Wall time on a busy machine; some seconds on an idle one. */
  const PATIENCE = 300_000;

  it("no bound of 40 estimates is escaped, and all are trusted", { timeout: PATIENCE }, async () => {
    const rows = await measured(40, "estimate");
    const { outcomes, escapes, estimate } = figuresOf(rows);
    expect(rows.filter(({ outcome }) => outcome !== "answered")).toEqual([]);
    expect(outcomes.answered).toBe(40);
    expect(rows.filter(hasEscaped), `escaped: ${escapes.join(", ")}`).toEqual([]);
    expect(estimate?.all.trusted).toBe(40);
    // A reference as wide as what it judges would let everything pass.
    for (const { estimate: e } of rows)
      expect(e?.transmission.referenceError).toBeLessThan(0.5 * (e?.transmission.error ?? 0));
  });
});

describe("what is drawn", () => {
  it("is the same for the same seed and index, and another for another", () => {
    expect(drawDesign(5, 17).text).toBe(drawDesign(5, 17).text);
    const texts = [drawDesign(5, 17), drawDesign(6, 17), drawDesign(5, 19)].map(({ text }) => text);
    expect(new Set(texts).size).toBe(3);
  });

  it("is a design that the library reads, of every kind", () => {
    const themes = new Set<string>();
    for (let index = 0; index < 600; index++) {
      const { text, theme, family } = drawDesign(SEED, index);
      const design = readDesign(text);
      themes.add(`${family} ${theme}`);
      expect(design.packet.energy).toBeGreaterThan(0);
    }
    expect([...themes].sort()).toEqual([
      "layered above",
      "layered resonance",
      "layered stack",
      "layered step",
      "layered tail",
      "smooth eckart above",
      "smooth eckart near",
      "smooth eckart tail",
      "smooth eckart tunnel",
      "smooth gaussian above",
      "smooth gaussian near",
      "smooth gaussian tail",
      "smooth gaussian tunnel",
      "smooth gaussian well",
      "smooth sech2 above",
      "smooth sech2 near",
      "smooth sech2 tail",
      "smooth sech2 tunnel",
      "smooth sech2 well",
      "smooth step",
    ]);
  });

  it("is even: mean, variance and lagged product of the unit numbers within five standard errors", () => {
    const random = new MixingGenerator(1, 2, 3);
    const count = 100_000;
    const numbers = Array.from({ length: count }, () => random.unit());
    const mean = numbers.reduce((a, b) => a + b) / count;
    const second = numbers.reduce((a, b) => a + (b - 0.5) ** 2, 0) / count;
    const lagged = numbers.slice(1).reduce((sum, x, i) => sum + (x - 0.5) * (numbers[i] - 0.5), 0) / count;
    // Standard errors: sqrt(1/12 n), sqrt(1/180 n), 1/12 sqrt(1/n).
    expect(Math.abs(mean - 0.5)).toBeLessThan(5 * Math.sqrt(1 / 12 / count));
    expect(Math.abs(second - 1 / 12)).toBeLessThan(5 * Math.sqrt(1 / 180 / count));
    expect(Math.abs(lagged)).toBeLessThan((5 / 12) * Math.sqrt(1 / count));
  });
});

describe("how rows are judged", () => {
  it("a value outside both bounds has escaped; inside their sum it has not", () => {
    const truth = { value: 0.5, error: 1e-6 };
    expect(compare({ value: 0.51, error: 0.005 }, truth)).toMatchObject({ escaped: true, floored: false });
    expect(compare({ value: 0.5000015, error: 1e-6 }, truth).escaped).toBe(false);
    expect(compare({ value: Number.NaN, error: 1e-6 }, truth).escaped).toBe(true);
  });

  it("a difference below what the reference can tell counts as that much", () => {
    const row = compare({ value: 0.5, error: 1e-6 }, { value: 0.5, error: 1e-9 });
    expect(row.floored).toBe(true);
    expect(row.ratio).toBeCloseTo(1000, 9);
  });

  it("quantiles by linear interpolation", () => {
    expect(quantile([4, 1, 3, 2], 0.5)).toBe(2.5);
    expect(quantile([1, 2, 3], 0.95)).toBeCloseTo(2.9, 12);
    expect(quantile([], 0.5)).toBeNaN();
  });

  it("a fault is counted, told and written as a file that can be read again", async () => {
    const drawn = quickDesigns().next().value as DrawnDesign;
    const good = await measure(drawn, { study: "estimate", patience: 60 });
    const crashed: Row = {
      ...good,
      index: 1,
      outcome: "crashed",
      message: "Error: told",
      estimate: undefined,
    };
    const wrong: Row = {
      ...good,
      index: 2,
      estimate: good.estimate && {
        ...good.estimate,
        transmission: { ...good.estimate.transmission, escaped: true, difference: 1 },
      },
    };
    const rows = [good, crashed, wrong];
    const figures = figuresOf(rows);
    expect(figures.escapes).toEqual([2]);
    expect(figures.outcomes).toEqual({ answered: 2, refused: 0, stopped: 0, crashed: 1 });
    expect(figuresText(figures, SEED)).toContain("ESCAPED: designs 2");
    const worst = worstOf(rows);
    expect(worst.map(({ row }) => row.index)).toEqual([1, 2, good.index]);
    const paths = writeWorst(worst, mkdtempSync(join(tmpdir(), "calibration-")));
    const texts = paths.map((path) => readFileSync(path, "utf8"));
    expect(texts[0]).toMatch(/^# crashed; Error: told\n/);
    for (const text of texts) expect(readDesign(text).title).toBe(readDesign(drawn.text).title);
  });

  it("a design that cannot be read is part of the result", async () => {
    const drawn = { ...drawDesign(SEED, 0), text: "title: nothing else\n" };
    expect(await measure(drawn, { study: "estimate", patience: 1 })).toMatchObject({ outcome: "refused" });
  });
});
