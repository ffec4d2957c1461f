import { describe, expect, it } from "vitest";
import { alignedGrid } from "../../src/grid/aligned.js";
import type { Numerics } from "../../src/problem/design.js";
import { crankNicolson } from "../../src/steppers/crank-nicolson.js";
import { planClosed } from "../../src/studies/closed-plan.js";
import { estimate } from "../../src/studies/estimate.js";
import { DesignLimitError } from "../../src/studies/limits.js";
import { runToEnd } from "../../src/studies/outcome.js";
import { designOf, MASS, potentialOf } from "../grid/samples.js";
import { delta, packetMean, slabs } from "../potentials/closed-forms.js";

const barrier = potentialOf("rectangular", { height: 0.3, width: 5 });
const packet = { energy: 0.15, width: 10 };
const stack = [
  { width: 2, height: 0.3 },
  { width: 5, height: -0.1 },
  { width: 3, height: 0.2 },
];

describe("the closed box of a Crank-Nicolson calculation", () => {
  /** Transmission on the unrefined grid with all free stretches longer or shorter by a factor. */
  async function inBox(factor: number): Promise<number> {
    const design = designOf(barrier, packet);
    const plan = planClosed(design, 400);
    const last = plan.stretches.length - 1;
    const stretches = plan.stretches.map((s, i) => {
      if (i !== 0 && i !== last) return s;
      // The spacing stays what it was.
      const cells = Math.round(s.cells * factor);
      const length = ((s.to - s.from) / s.cells) * cells;
      return i === 0
        ? { from: s.to - length, to: s.to, cells }
        : { from: s.from, to: s.from + length, cells };
    });
    const system = {
      grid: alignedGrid(stretches, 1),
      potential: barrier,
      particleMass: MASS,
      referenceEnergy: plan.clock.reference,
    };
    const stepper = crankNicolson.prepare(system, plan.timeStep, plan.order);
    return (await runToEnd(stepper, plan.from, plan.steps, undefined, {})).transmitted;
  }

  it("is large enough: twice the room changes T by less than 1e-11, and half the room spoils it", async () => {
    const planned = await inBox(1);
    expect(Math.abs((await inBox(2)) / planned - 1)).toBeLessThan(1e-11);
    expect(Math.abs((await inBox(0.5)) / planned - 1)).toBeGreaterThan(1e-6);
  });
});

describe("invariance", () => {
  it("under a shift of the whole design by `center`: the same to round-off", async () => {
    const [here, there] = await Promise.all(
      [0, 1234.5].map((center) =>
        estimate(designOf(potentialOf("rectangular", { height: 0.3, width: 5 }, center), packet)),
      ),
    );
    // Nodes a thousand nm off are rounded to 1e-13 nm.
    expect(Math.abs(there.transmission.value / here.transmission.value - 1)).toBeLessThan(1e-10);
    expect(there.grid.points).toBe(here.grid.points);
  });

  it("under the choice of a start that is clear", async () => {
    const chosen = await estimate(designOf(barrier, packet));
    const further = await estimate(designOf(barrier, { ...packet, start: -200 }));
    const gap = Math.abs(further.transmission.value - chosen.transmission.value);
    expect(gap).toBeLessThanOrEqual(further.transmission.error + chosen.transmission.error);
    expect(further.verdict).toBe("trusted");
  });

  it("in a mirror: the layers reversed and the packet from the right give the same numbers", async () => {
    const left = await estimate(designOf(potentialOf("layers", { layers: stack }), packet));
    const image = potentialOf("layers", { layers: [...stack].reverse() });
    const right = await estimate(designOf(image, { ...packet, from: "right" }));
    for (const key of ["transmission", "reflection", "atMeanEnergy"] as const)
      expect(Math.abs(right[key].value / left[key].value - 1)).toBeLessThan(1e-11);
    expect(right.time).toEqual(left.time);
    expect(right.grid.points).toBe(left.grid.points);
    expect(right.carryingEnergy).toBeCloseTo(left.carryingEnergy, 9);
  });
});

describe("bounds that were escaped once", () => {
  it.each([
    {
      layers: [{ width: 19.093167895814915, height: 0.38960355769377203 }],
      energy: 0.18819135912845325,
      width: 17,
    },
    {
      layers: [{ width: 16.44874702845065, height: 0.4628263217397034 }],
      energy: 0.04575139233469991,
      width: 173,
    },
  ])(
    "a reflection near one is bounded with its own rounding: $energy eV, $width nm",
    async ({ layers, energy, width }) => {
      const answer = await estimate(designOf(potentialOf("layers", { layers }), { energy, width }));
      const reference = packetMean(slabs(layers), energy, MASS, width);
      expect(answer.verdict).toBe("trusted");
      expect(Math.abs(answer.reflection.value - (1 - reference))).toBeLessThanOrEqual(
        answer.reflection.error,
      );
      expect(answer.reflection.error).toBeLessThan(1e-9);
    },
  );

  it("what rounding throws over a barrier that lets nothing pass is within the bound, and soon told", async () => {
    // The packet's weight above the top is exp(-131): the truth is zero for every purpose.
    const wall = potentialOf("rectangular", { height: 1, width: 100 });
    const { transmission, verdict, time } = await estimate(designOf(wall, packet));
    expect(transmission.value).toBeLessThanOrEqual(transmission.error);
    // Nine times what the last tenth of the time brings in, on the finest grid, is counted too.
    expect(transmission.error).toBeLessThan(1e-25);
    expect(verdict).toBe("doubtful");
    expect(time.steps).toBeLessThan(3000);
  });

  it("T at the mean energy counts what lies beyond the face at the start", async () => {
    const [strength, energy, width] = [0.25904956762210407, 0.025445396517223634, 56.457024665173364];
    const start = -4.641868205275387 * width;
    const answer = await estimate(designOf(potentialOf("delta", { strength }), { energy, width, start }));
    const { value, error } = answer.atMeanEnergy;
    expect(Math.abs(value - delta(strength)(energy, MASS))).toBeLessThanOrEqual(error);
    expect(answer.verdict).toBe("doubtful");
    expect(answer.checks.filter((check) => !check.passed).map((check) => check.name)).toContain("start");
  });
});

describe("the end", () => {
  it("is moved out while a resonance holds the packet, and no further than the user allows", async () => {
    const wall = { width: 2.5, height: 0.4 };
    const resonant = potentialOf("layers", { layers: [wall, { width: 5, height: 0 }, wall] });
    const slow = designOf(resonant, { energy: 0.1, width: 12 });
    const first = planClosed(slow).end;
    const answer = await estimate(slow);
    expect(answer.time.end_fs).toBeGreaterThan(1.5 * first);
    expect(answer.verdict).toBe("trusted");

    const cut = await estimate({ ...slow, numerics: { end: first } });
    expect(cut.time.end_fs).toBeLessThan(1.2 * first);
    expect(cut.verdict).toBe("doubtful");
    expect(cut.checks.find((check) => check.name === "remaining")?.passed).toBe(false);
    expect(Math.abs(cut.transmission.value - answer.transmission.value)).toBeLessThanOrEqual(
      cut.transmission.error,
    );
  });
});

describe("verdict", () => {
  it("is trusted exactly when every check passed; each says what it holds against what", async () => {
    for (const numerics of [{}, { step: 0.5 }, { accuracy: 1e-3 }] as Numerics[]) {
      const { checks, verdict, accuracy, transmission } = await estimate(designOf(barrier, packet, numerics));
      for (const { value, limit, passed, explanation } of checks) {
        expect(passed).toBe(value <= limit);
        expect(explanation.length).toBeGreaterThan(10);
      }
      expect(verdict).toBe(checks.every((check) => check.passed) ? "trusted" : "doubtful");
      expect(accuracy.reached).toBe(transmission.error / transmission.value);
      expect(verdict === "trusted").toBe(accuracy.reached <= accuracy.asked);
    }
  });

  it("does not do more than was asked: a low accuracy takes fewer or coarser calculations", async () => {
    const [low, high] = await Promise.all(
      [1e-3, 1e-8].map((accuracy) => estimate(designOf(barrier, packet, { accuracy }))),
    );
    expect(low.verdict).toBe("trusted");
    expect(high.verdict).toBe("trusted");
    expect(high.grid.points * high.time.steps).toBeGreaterThan(1.1 * low.grid.points * low.time.steps);
    expect(high.transmission.error).toBeLessThan(low.transmission.error);
  });

  it("every number of an answer is finite, also where nothing at all gets through", async () => {
    const wall = potentialOf("rectangular", { height: 30, width: 60 });
    const answer = await estimate(designOf(wall, packet));
    const numbers = [answer.transmission, answer.reflection, answer.atMeanEnergy].flatMap((x) => [
      x.value,
      x.error,
    ]);
    for (const x of [
      ...numbers,
      answer.remaining,
      answer.carryingEnergy,
      ...answer.checks.map((check) => check.value),
    ])
      expect(Number.isFinite(x)).toBe(true);
    for (const { value } of [answer.transmission, answer.reflection, answer.atMeanEnergy]) {
      expect(value).toBeGreaterThanOrEqual(0);
      expect(value).toBeLessThanOrEqual(1);
    }
    expect(answer.transmission.value).toBeLessThanOrEqual(answer.transmission.error);
    expect(answer.verdict).toBe("doubtful");
  });
});

describe("what is refused or stopped", () => {
  it("a confining potential, and a stepper that cannot do the design", async () => {
    const well = designOf(potentialOf("harmonic", { quantum: 0.1 }), packet);
    await expect(estimate(well)).rejects.toThrow(DesignLimitError);
    const heavy = potentialOf("rectangular", { height: 0.3, width: 5, mass: 2 * MASS });
    const split = designOf(heavy, packet, { stepper: "split-operator" });
    await expect(estimate(split)).rejects.toMatchObject({ path: "numerics.stepper" });
    const expansion = designOf(heavy, packet, { stepper: "chebyshev" });
    await expect(estimate(expansion)).rejects.toMatchObject({ path: "numerics.stepper" });
  });

  it("eigenstates, which cannot refine a grid, and an order where there is none", async () => {
    const expansion = estimate(designOf(barrier, packet, { stepper: "eigenstates" }));
    await expect(expansion).rejects.toMatchObject({ path: "numerics.stepper" });
    await expect(expansion).rejects.toThrow(/crank-nicolson, split-operator or chebyshev/);
    const ordered = estimate(designOf(barrier, packet, { stepper: "chebyshev", order: 2 }));
    await expect(ordered).rejects.toMatchObject({ path: "numerics.order" });
  });

  it.each<[string, Numerics]>([
    ["numerics.step", { step: 1e-9 }],
    ["numerics.points", { points: 2 ** 24 }],
    ["numerics.length", { length: 1e9 }],
    ["numerics.end", { end: 1e15 }],
    ["numerics.timeStep", { timeStep: 1e-9 }],
  ])(
    "an absurd %s, by name and at once, with any stepper that there is an estimate by",
    async (path, numerics) => {
      for (const stepper of ["crank-nicolson", "split-operator", "chebyshev"]) {
        const before = performance.now();
        const refused = estimate(designOf(barrier, packet, { ...numerics, stepper }));
        await expect(refused).rejects.toThrow(DesignLimitError);
        await expect(refused).rejects.toMatchObject({ path });
        expect(performance.now() - before).toBeLessThan(2000);
      }
    },
  );

  it("a packet of a metre before a barrier of nanometres", async () => {
    await expect(estimate(designOf(barrier, { ...packet, width: 1e9 }))).rejects.toMatchObject({
      path: "potential",
    });
  });

  it("an estimate whose signal is given, before it starts and under way", async () => {
    const signal = AbortSignal.abort(new Error("too late"));
    await expect(estimate(designOf(barrier, packet), { signal })).rejects.toThrow("too late");
    const controller = new AbortController();
    const texts: string[] = [];
    const run = estimate(designOf(barrier, packet, { timeStep: 1e-4 }), {
      signal: controller.signal,
      onProgress: (text, share) => {
        texts.push(text);
        if (share !== undefined) controller.abort(new Error("enough"));
      },
    });
    await expect(run).rejects.toThrow("enough");
    expect(texts[0]).toMatch(/^Crank-Nicolson, \d+ points/);
  });
});
