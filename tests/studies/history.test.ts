import { beforeAll, describe, expect, it } from "vitest";
import type { Numerics } from "../../src/problem/design.js";
import { estimate } from "../../src/studies/estimate.js";
import { type History, type HistoryOptions, history } from "../../src/studies/history.js";
import { designOf, potentialOf } from "../grid/samples.js";

const barrier = potentialOf("rectangular", { height: 0.3, width: 5 });
const packet = { energy: 0.15, width: 8 };
const small = { columns: 60, rows: 30 };
const follow = (numerics: Numerics = {}, options: HistoryOptions = small) =>
  history(designOf(barrier, packet, numerics), options);

const column = (seen: History, name: string): Float64Array => {
  const found = seen.series.find((c) => c.name === name);
  if (!found) throw new Error(`no column ${name}`);
  return found.values;
};
const last = (values: Float64Array) => values[values.length - 1];

describe("what happens over time", () => {
  let seen: History;
  beforeAll(async () => {
    seen = await follow();
  });

  it("ends with the transmission of the estimate, to the errors that it states", async () => {
    const { transmission } = await estimate(designOf(barrier, packet));
    // The run ends when 3 spreads of k have passed: what is still on its way is not its error.
    const gap = Math.abs(last(column(seen, "transmission")) - transmission.value);
    expect(gap).toBeLessThan(seen.errors.transmission + 2e-4);
    expect(seen.errors.transmission).toBeLessThan(0.01);
  });

  it("keeps norm and energy, and its shares add up to one", () => {
    const [t, r, inside] = ["transmission", "reflection", "inside"].map((name) => column(seen, name));
    t.forEach((_, i) => {
      expect(t[i] + r[i] + inside[i]).toBeCloseTo(1, 9);
    });
    expect(Math.max(...column(seen, "norm_drift").map(Math.abs))).toBeLessThan(1e-11);
    expect(Math.max(...column(seen, "energy_drift").map(Math.abs))).toBeLessThan(1e-11);
  });

  it("shows the encounter: the map begins before the packet has met the barrier and never holds more than all of it", () => {
    const { map } = seen;
    expect([map.columns, map.rows]).toEqual([60, 30]);
    const dx = (map.xTo - map.xFrom) / map.columns;
    for (let row = 0; row < map.rows; row++) {
      const sum = map.density.subarray(row * 60, (row + 1) * 60).reduce((a, b) => a + b, 0) * dx;
      expect(sum).toBeLessThanOrEqual(1 + 1e-6);
      if (row > 10 && row < 14) expect(sum).toBeGreaterThan(0.9);
    }
    expect(map.tFrom).toBeGreaterThan(0);
    expect(map.xFrom).toBeLessThan(-40);
    expect(map.xTo).toBeGreaterThan(40);
  });

  it("states errors that shrink with a finer grid and a shorter time step", async () => {
    const crank: Numerics = { stepper: "crank-nicolson" };
    const [coarse, fine] = [await follow({ ...crank, step: 0.4 }), await follow({ ...crank, step: 0.2 })];
    // Second order in the spacing.
    expect(coarse.errors.spacing / fine.errors.spacing).toBeGreaterThan(3);
    expect(coarse.errors.spacing / fine.errors.spacing).toBeLessThan(5);
    const [long, short] = [1, 0.5].map((timeStep) => follow({ ...crank, order: 2, timeStep }));
    const ratio = (await long).errors.timeStep / (await short).errors.timeStep;
    // Second order in the time step, measured where the difference is not small any more.
    expect(ratio).toBeGreaterThan(3);
    expect(ratio).toBeLessThan(5);
  });

  it("bounds what a finer run shows to be misplaced", async () => {
    const window = { xFrom: -60, xTo: 60, tFrom: 0, tTo: 200 };
    const crank: Numerics = { stepper: "crank-nicolson", end: 200 };
    const [coarse, fine] = [
      await follow({ ...crank, step: 0.4 }, { ...small, window }),
      await follow({ ...crank, step: 0.1 }, { ...small, window }),
    ];
    let worst = 0;
    for (let row = 0; row < 30; row++) {
      let sum = 0;
      for (let c = row * 60; c < (row + 1) * 60; c++)
        sum += Math.abs(coarse.map.density[c] - fine.map.density[c]);
      worst = Math.max(worst, 0.5 * sum * 2);
    }
    expect(worst).toBeGreaterThan(0.2 * coarse.errors.spacing);
    // The estimate is that of the leading term; half as much again is for the others.
    expect(worst).toBeLessThan(1.5 * coarse.errors.spacing);
  });
});

describe("the window of a map", () => {
  it.each<[string, Numerics, HistoryOptions["window"], readonly number[]]>([
    ["a run that ends before the encounter, from its start to its end", { end: 40 }, {}, [0, 40]],
    ["an end that was asked for before the encounter", {}, { tTo: 20 }, [0, 20]],
    ["what was asked for, as it was asked for", {}, { tFrom: 30, tTo: 90, xFrom: -20, xTo: 5 }, [30, 90]],
  ])("shows %s", async (_title, numerics, window, [tFrom, tTo]) => {
    const { map } = await follow(numerics, { ...small, window });
    expect(map.tFrom).toBeCloseTo(tFrom, 9);
    expect(map.tTo).toBeCloseTo(tTo, 9);
    if (window?.xFrom !== undefined) expect([map.xFrom, map.xTo]).toEqual([window.xFrom, window.xTo]);
  });

  it("reaches to the end of the box where one side was asked for beyond what is chosen", async () => {
    const { map } = await follow({}, { ...small, window: { xFrom: 80 } });
    expect(map.xFrom).toBe(80);
    expect(map.xTo).toBeGreaterThan(80);
  });
});

describe("following for longer", () => {
  it("while a resonance still holds a fiftieth of what was inside, unless the end is the user's", async () => {
    const wall = { width: 2.5, height: 0.4 };
    const resonant = potentialOf("layers", { layers: [wall, { width: 5, height: 0 }, wall] });
    const [free, cut] = [
      await history(designOf(resonant, { energy: 0.1, width: 12 }), small),
      await history(designOf(resonant, { energy: 0.1, width: 12 }, { end: 250 }), small),
    ];
    expect(cut.time.end_fs).toBeCloseTo(250, 9);
    expect(last(column(cut, "inside"))).toBeGreaterThan(0.02 * Math.max(...column(cut, "inside")));
    expect(last(column(free, "inside"))).toBeLessThanOrEqual(0.02 * Math.max(...column(free, "inside")));
  });
});

describe("a history by a stepper that is exact in time", () => {
  it.each([
    ["eigenstates", { points: 700 }],
    ["chebyshev", { points: 512 }],
  ])(
    "by %s has no error of the time step, and is that of the others within theirs",
    async (stepper, numerics) => {
      const smooth = designOf(potentialOf("sech2", { height: 0.3, width: 2 }), packet, {
        ...numerics,
        stepper,
        end: 200,
      });
      const seen = await history(smooth, small);
      expect(seen).toMatchObject({ stepper, order: "exact", errors: { timeStep: 0 } });
      const other = stepper === "chebyshev" ? "split-operator" : "crank-nicolson";
      const by = await history({ ...smooth, numerics: { ...smooth.numerics, stepper: other } }, small);
      const gap = Math.abs(last(column(seen, "transmission")) - last(column(by, "transmission")));
      expect(gap).toBeLessThan(1e-6 + by.errors.timeStep);
    },
  );
});
