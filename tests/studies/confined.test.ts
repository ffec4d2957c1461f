import { describe, expect, it } from "vitest";
import { SeriesRecorder } from "../../src/analysis/series-recorder.js";
import { propagate } from "../../src/propagate.js";
import { confinedMotion } from "../../src/studies/confined.js";
import { prepare } from "../../src/studies/prepare.js";
import { designOf, potentialOf } from "../grid/samples.js";

/** A coherent state: hbar omega = 0.1 eV, sigma^2 = hbar / 2 m omega; value computed, check-values 3.2. */
const SIGMA = 2.38464682167658;
const PERIOD = 41.35667696923859;
const well = (center = 0) => potentialOf("harmonic", { quantum: 0.1 }, center);

describe("motion in a harmonic well (coherent state: Schrodinger 1926, from memory; 41.35667696923859 fs and 2.38464682167658 nm computed)", () => {
  it("starts in the middle, wherever that is, and follows two classical periods", () => {
    for (const center of [0, -3.7, 250]) {
      const { from, end } = confinedMotion(designOf(well(center), { energy: 0.2, width: SIGMA }));
      expect(Math.abs(from.packet.center - center)).toBeLessThan(1e-9 * (1 + Math.abs(center)));
      // Midpoints miss the square-root ends of 1/v: a per cent of a duration that nothing depends on.
      expect(Math.abs(end / (2 * PERIOD) - 1)).toBeLessThan(2e-2);
    }
  });

  it.each(["crank-nicolson", "split-operator"])(
    "by %s swings with that period and keeps its width",
    async (stepper) => {
      const design = designOf(well(), { energy: 0.2, width: SIGMA, start: 4 }, { stepper, end: PERIOD });
      const run = prepare(design);
      const series = new SeriesRecorder(run.stepper, 4, 1);
      await propagate(run, [series]);
      const column = (name: string) =>
        series.series.find((c) => c.name === name)?.values ?? new Float64Array(0);
      const [time, x, spread] = [column("time"), column("x_mean"), column("x_spread")];
      expect(time[time.length - 1]).toBeCloseTo(PERIOD, 9);
      const omega = (2 * Math.PI) / PERIOD;
      const amplitude = 2 * SIGMA ** 2 * run.from.k0;
      // Crank-Nicolson's grid has a phase of 1/6 a cell: (1/6)^2 / 24 of the frequency, times 2 pi of a swing of ten nm.
      const tolerance = stepper === "split-operator" ? 1e-7 : 0.1;
      time.forEach((t, i) => {
        expect(Math.abs(x[i] - 4 * Math.cos(omega * t) - amplitude * Math.sin(omega * t))).toBeLessThan(
          tolerance,
        );
        expect(Math.abs(spread[i] / SIGMA - 1)).toBeLessThan(stepper === "split-operator" ? 1e-7 : 0.01);
      });
      for (const drift of column("norm_drift")) expect(Math.abs(drift)).toBeLessThan(1e-11);
    },
  );

  it("has a box beyond where the fastest component turns", () => {
    const { stretches, from, circle } = confinedMotion(
      designOf(well(), { energy: 0.2, width: SIGMA, start: 4 }),
    );
    const [{ from: left, to: right }] = stretches;
    expect(well().value(left)).toBeGreaterThan(from.highest);
    expect(well().value(right)).toBeGreaterThan(from.highest);
    const { first, step, points } = circle();
    expect([first, first + step * points]).toEqual([left, right]);
    expect(Math.log2(points) % 1).toBe(0);
    expect(circle(100).points).toBe(128);
  });
});
