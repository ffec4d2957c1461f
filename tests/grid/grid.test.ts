import { describe, expect, it } from "vitest";
import { closedGrid, periodicGrid, uniformClosedGrid } from "../../src/grid/grid.js";

describe("closed grid", () => {
  it("has cells that reach half-way to the neighbours and one spacing beyond either end", () => {
    const grid = closedGrid(Float64Array.of(0, 1, 3, 6));
    expect([...grid.spacing]).toEqual([1, 2, 3]);
    expect([...grid.weight]).toEqual([1, 1.5, 2.5, 3]);
    expect([grid.finest, grid.coarsest, grid.ends]).toEqual([1, 3, "closed"]);
  });

  it("refuses too few nodes, and nodes that do not ascend or are NaN", () => {
    expect(() => closedGrid(Float64Array.of(0, 1))).toThrow(/at least 3 nodes; got 2/);
    expect(() => closedGrid(Float64Array.of(0, 1, 1))).toThrow(/must ascend; node 2 at 1 nm follows 1 nm/);
    expect(() => closedGrid(Float64Array.of(0, Number.NaN, 1))).toThrow(RangeError);
  });
});

describe("uniform grids", () => {
  it("have the same nodes, closed and on a circle", () => {
    const closed = uniformClosedGrid(-2, 0.5, 8);
    const circle = periodicGrid(-2, 0.5, 8);
    expect([...closed.x]).toEqual([...circle.x]);
    expect([...closed.weight]).toEqual([...circle.weight]);
    expect(circle.ends).toBe("periodic");
  });
});
