import { describe, expect, it } from "vitest";
import { norm } from "../../src/analysis/probabilities.js";
import type { Numerics } from "../../src/problem/design.js";
import { propagate } from "../../src/propagate.js";
import { MOST_EIGENSTATES } from "../../src/steppers/eigenstates.js";
import { steppers } from "../../src/steppers/registry.js";
import { DesignLimitError } from "../../src/studies/limits.js";
import { prepare } from "../../src/studies/prepare.js";
import { planRun } from "../../src/studies/run-plan.js";
import { designOf, MASS, potentialOf } from "../grid/samples.js";

const barrier = potentialOf("rectangular", { height: 0.3, width: 5 });
const packet = { energy: 0.15, width: 8 };

describe("a prepared run", () => {
  it.each(steppers.map(({ name }) => name))(
    "by %s starts with a normalised packet on a grid whose ends nothing reaches",
    async (stepper) => {
      // Eigenstates of the automatic grid would take half a minute; the ends are the same on a coarser one.
      const numerics = stepper === "eigenstates" ? { stepper, points: 1024 } : { stepper };
      const run = prepare(designOf(barrier, packet, numerics));
      const { grid } = run.stepper.system;
      expect(run.stepper.definition.name).toBe(stepper);
      expect(norm(run.psi, grid.weight)).toBeCloseTo(1, 9);
      expect(run.steps * run.stepper.timeStep).toBeCloseTo(run.end, 9);
      expect(run.steps).toBeGreaterThanOrEqual(480);
      await propagate(run);
      const edge = Math.round(grid.x.length / 100);
      // 7.5 spreads of k have room: 3e-14 of the packet, and on a circle the grid's own rounding.
      expect(norm(run.psi, grid.weight, 0, edge)).toBeLessThan(1e-10);
      expect(norm(run.psi, grid.weight, grid.x.length - edge)).toBeLessThan(1e-10);
    },
  );

  it("has twins with half the cells and half the steps that pass the same instants", () => {
    for (const stepper of ["crank-nicolson", "split-operator"]) {
      const design = designOf(barrier, packet, { stepper });
      const run = prepare(design);
      const slower = prepare(design, { end: run.end, stepFineness: 0.5 });
      const coarser = prepare(design, { end: run.end, fineness: 0.5 });
      expect(slower.steps).toBe(run.steps / 2);
      expect(slower.end).toBeCloseTo(run.end, 9);
      expect(coarser.end).toBeCloseTo(run.end, 9);
      const ratio = run.stepper.system.grid.x.length / coarser.stepper.system.grid.x.length;
      expect(ratio).toBeGreaterThan(1.9);
      expect(ratio).toBeLessThan(2.1);
    }
  });

  it("takes what the design forces", () => {
    const run = prepare(
      designOf(barrier, packet, { stepper: "crank-nicolson", order: 2, step: 0.25, timeStep: 0.5, end: 100 }),
    );
    expect(run.stepper.order).toBe(2);
    expect(run.stepper.system.grid.coarsest).toBeLessThan(0.26);
    // Rounded down so that the end is a multiple.
    expect(run.stepper.timeStep).toBeLessThanOrEqual(0.5);
    expect(run.stepper.timeStep).toBeGreaterThan(0.4);
    expect(run.end).toBeCloseTo(100, 9);
    const circle = prepare(designOf(barrier, packet, { stepper: "split-operator", points: 3000 }));
    expect(circle.stepper.system.grid.x.length).toBe(4096);
  });

  it.each<[string, Numerics]>([
    ["numerics.step", { step: 1e-9 }],
    ["numerics.points", { points: 2 ** 24 }],
    ["numerics.length", { length: 1e9 }],
    ["numerics.end", { end: 1e15 }],
    ["numerics.timeStep", { timeStep: 1e-9 }],
  ])("is refused for an absurd %s before anything is allocated, by any stepper", (path, numerics) => {
    for (const { name: stepper } of steppers) {
      const attempt = () => prepare(designOf(barrier, packet, { ...numerics, stepper }));
      expect(attempt).toThrow(DesignLimitError);
      expect(attempt).toThrow(expect.objectContaining({ path }));
    }
  });

  it("is refused for a stepper that cannot do the design, and for a box that does not hold the packet", () => {
    const heavy = potentialOf("rectangular", { height: 0.3, width: 5, mass: 2 * MASS });
    expect(() => prepare(designOf(heavy, packet, { stepper: "split-operator" }))).toThrow(/crank-nicolson/);
    expect(() => prepare(designOf(barrier, packet, { length: 60 }))).toThrow(/a box that holds the packet/);
  });

  it("is refused for an order of a stepper that is exact in time", () => {
    for (const stepper of ["eigenstates", "chebyshev"]) {
      const attempt = () => prepare(designOf(barrier, packet, { stepper, order: 4 }));
      expect(attempt).toThrow(expect.objectContaining({ path: "numerics.order" }));
      expect(attempt).toThrow(/exact in time/);
    }
  });

  it("by eigenstates is refused where it would take too many points, and takes a somewhat coarser grid before that", () => {
    // A faster packet needs a finer grid: at 1 eV more than eigenstates are found for, at 3 eV more than twice as much.
    const points = (energy: number, stepper: string) =>
      planRun(designOf(barrier, { energy, width: 20 }, { stepper })).points;
    expect(points(1, "crank-nicolson")).toBeGreaterThan(MOST_EIGENSTATES);
    expect(points(1, "eigenstates")).toBeLessThanOrEqual(MOST_EIGENSTATES);
    expect(points(1, "eigenstates")).toBeGreaterThan(0.99 * MOST_EIGENSTATES);
    const slower = planRun(designOf(barrier, { energy: 1, width: 20 }, { stepper: "eigenstates" }), {
      fineness: 0.5,
    });
    expect(Math.abs(slower.points - points(1, "eigenstates") / 2)).toBeLessThan(4);
    const attempt = () => points(3, "eigenstates");
    expect(attempt).toThrow(DesignLimitError);
    expect(attempt).toThrow(expect.objectContaining({ path: "numerics.stepper" }));
    expect(attempt).toThrow(/at most 4096 grid points.*numerics\.points: 4000/);
  });

  it("shows the same by steppers that are exact in time as by the others on their kind of grid", async () => {
    const end = 200;
    for (const [exact, other, numerics] of [
      ["eigenstates", "crank-nicolson", { points: 801 }],
      ["chebyshev", "split-operator", { points: 1024, order: undefined }],
    ] as const) {
      const smooth = potentialOf("sech2", { height: 0.3, width: 2 });
      const [a, b] = [exact, other].map((stepper) =>
        prepare(designOf(smooth, packet, { ...numerics, stepper, end })),
      );
      await propagate(a);
      await propagate(b);
      expect(a.stepper.order).toBe("exact");
      expect(a.steps).toBe(480);
      const { weight } = a.stepper.system.grid;
      const apart = norm(
        a.psi.map((value, i) => value - b.psi[i]),
        weight,
      );
      // dt^6 of the others at the phase per step that maps are made with, squared.
      expect(Math.sqrt(apart)).toBeLessThan(1e-6);
    }
  });
});
