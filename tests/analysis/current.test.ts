import { describe, expect, it } from "vitest";
import { currentAt } from "../../src/analysis/current.js";
import { norm } from "../../src/analysis/probabilities.js";
import { SeriesRecorder } from "../../src/analysis/series-recorder.js";
import { uniformClosedGrid } from "../../src/grid/grid.js";
import { sampleGaussian, wavenumberOf } from "../../src/packets/gaussian.js";
import { propagate } from "../../src/propagate.js";
import { crankNicolson } from "../../src/steppers/crank-nicolson.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { MASS, potentialOf } from "../grid/samples.js";

const HEAVY = 0.3 * ELECTRON_MASS;
const stack = potentialOf("rectangular", { height: 0.2, width: 4, mass: HEAVY });

/** A packet of 0.2 eV halfway through a heavy layer. */
function during(dt: number) {
  const grid = uniformClosedGrid(-120, 0.25, 961);
  const stepper = crankNicolson.prepare({ grid, potential: stack, particleMass: MASS }, dt, 6);
  const psi = new Float64Array(2 * grid.x.length);
  sampleGaussian(psi, grid.x, { center: -30, width: 6, wavenumber: wavenumberOf(0.2, MASS) });
  return { grid, stepper, psi };
}

describe("probability current", () => {
  it("of a plane wave is hbar sin(k h) / (m h) per density, to the right for k > 0", () => {
    const grid = uniformClosedGrid(0, 0.5, 20);
    for (const k of [0.8, -0.3]) {
      const psi = Float64Array.from({ length: 40 }, (_, i) =>
        (i % 2 ? Math.sin : Math.cos)(k * grid.x[i >> 1]),
      );
      expect(currentAt(psi, grid, 7, MASS)).toBeCloseTo((HBAR * Math.sin(0.5 * k)) / (MASS * 0.5), 13);
    }
  });

  it.each([
    ["outside", 500, MASS],
    ["inside the heavy layer", 480, HEAVY],
  ])(
    "%s is the rate at which H fills the cells to the right of it, (2/hbar) sum w Im(psi* H psi), to round-off",
    (_where, node, mass) => {
      const { grid, stepper, psi } = during(0.5);
      for (let step = 0; step < 72; step++) stepper.advance(psi, step);
      const moved = new Float64Array(psi.length);
      stepper.applyHamiltonian(moved, psi);
      let rate = 0;
      for (let j = node + 1; j < grid.x.length; j++)
        rate += (2 / HBAR) * grid.weight[j] * (psi[2 * j] * moved[2 * j + 1] - psi[2 * j + 1] * moved[2 * j]);
      expect(Math.abs(rate)).toBeGreaterThan(1e-4);
      expect(Math.abs(currentAt(psi, grid, node, mass) / rate - 1)).toBeLessThan(1e-10);
    },
  );

  it("is what the probability beyond it grows by from step to step: the continuity equation, to the stepper's accuracy", async () => {
    const { grid, stepper, psi } = during(0.1);
    const node = 500;
    const seen: { right: number; current: number }[] = [];
    const record = (_time: number, state: Float64Array) => {
      seen.push({ right: norm(state, grid.weight, node + 1), current: currentAt(state, grid, node, MASS) });
    };
    await propagate({ stepper, psi, steps: 362 }, [{ every: 1, record }]);
    const [a, b, c] = seen.slice(-3);
    // Simpson's rule over two steps. What the sharp edges throw into the lattice's fastest waves turns by radians a step: 1e-6 of the flow.
    const flow = (0.1 / 3) * (a.current + 4 * b.current + c.current);
    expect(Math.abs(c.right - a.right)).toBeGreaterThan(1e-5);
    expect(Math.abs(flow / (c.right - a.right) - 1)).toBeLessThan(1e-5);
  });
});

describe("series recorder", () => {
  it("has a row at the start, one every so many steps and one at the end, and its shares follow the current at the face", async () => {
    const { stepper, psi } = during(0.25);
    const recorder = new SeriesRecorder(stepper, 4, 1);
    await propagate({ stepper, psi, steps: 402 }, [recorder]);
    const column = (name: string) => {
      const found = recorder.series.find((c) => c.name === name);
      if (!found) throw new Error(`no column ${name}`);
      return found.values;
    };
    const time = column("time");
    expect([...time.slice(0, 3), time[time.length - 1]]).toEqual([0, 1, 2, 100.5]);
    expect(recorder.series[0]).toMatchObject({ name: "time", unit: "fs" });
    expect(new Set(recorder.series.map((c) => c.values.length))).toEqual(new Set([102]));

    const [through, back, inside] = ["transmission", "reflection", "inside"].map(column);
    time.forEach((_, i) => {
      expect(through[i] + back[i] + inside[i]).toBeCloseTo(1, 10);
      expect(Math.abs(column("norm_drift")[i])).toBeLessThan(1e-12);
      expect(Math.abs(column("energy_drift")[i])).toBeLessThan(1e-11);
    });
    // The current just right of the far face, integrated by the trapezoidal rule over the rows, is what got through.
    const current = column("current");
    let flown = 0;
    for (let i = 1; i < time.length; i++)
      flown += 0.5 * (time[i] - time[i - 1]) * (current[i] + current[i - 1]);
    expect(through[through.length - 1]).toBeGreaterThan(0.05);
    expect(Math.abs(flown - through[through.length - 1])).toBeLessThan(1e-4);
    // Free motion before the encounter: <x> grows by hbar <k> / m.
    const [x, k] = [column("x_mean"), column("k_mean")];
    expect((x[2] - x[0]) / (time[2] - time[0])).toBeCloseTo((HBAR * k[0]) / MASS, 4);
  });

  it("takes the other side as transmission for a packet from the right", async () => {
    const { stepper, psi } = during(0.25);
    const [right, left] = [new SeriesRecorder(stepper, 1, 1), new SeriesRecorder(stepper, 1, -1)];
    await propagate({ stepper, psi, steps: 1 }, [right, left]);
    const first = (recorder: SeriesRecorder, name: string) =>
      recorder.series.find((c) => c.name === name)?.values[0];
    expect(first(right, "reflection")).toBe(first(left, "transmission"));
    expect(first(left, "transmission")).toBeCloseTo(1, 5);
  });
});
