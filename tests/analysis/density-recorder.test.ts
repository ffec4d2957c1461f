import { describe, expect, it } from "vitest";
import { DensityRecorder } from "../../src/analysis/density-recorder.js";
import { closedGrid, type Grid, uniformClosedGrid } from "../../src/grid/grid.js";

const window = { xFrom: -10, xTo: 10, tFrom: 0, tTo: 8, columns: 7, rows: 4 };

/** A state whose density is f at the nodes. */
const withDensity = (grid: Grid, f: (x: number) => number) =>
  Float64Array.from({ length: 2 * grid.x.length }, (_, i) => (i % 2 ? 0 : Math.sqrt(f(grid.x[i >> 1]))));

const rowOf = (map: { density: Float64Array; columns: number }, row: number) => [
  ...map.density.subarray(row * map.columns, (row + 1) * map.columns),
];

describe("density recorder", () => {
  it("holds the whole norm when its window covers all of the packet, on any grid and any number of columns", () => {
    const nodes: number[] = [];
    for (let x = -10; x <= 10; x += x < 0 ? 0.11 : 0.05) nodes.push(x);
    const grid = closedGrid(Float64Array.from(nodes));
    const psi = withDensity(grid, (x) => Math.exp(-x * x));
    const norm = grid.x.reduce((sum, x, j) => sum + grid.weight[j] * Math.exp(-x * x), 0);
    for (const columns of [1, 7, 64, 1000]) {
      const recorder = new DensityRecorder(grid, { ...window, columns });
      recorder.record(1, psi);
      const sum = rowOf(recorder.map, 0).reduce((a, b) => a + b, 0);
      expect((sum * 20) / columns).toBeCloseTo(norm, 12);
    }
  });

  it("takes the density linearly between the nodes: a linear one comes out exactly", () => {
    const grid = uniformClosedGrid(-12, 1.3, 20);
    const recorder = new DensityRecorder(grid, window);
    recorder.record(
      0,
      withDensity(grid, (x) => 20 + x),
    );
    rowOf(recorder.map, 0).forEach((value, c) => {
      expect(value).toBeCloseTo(20 - 10 + ((c + 0.5) * 20) / 7, 12);
    });
  });

  it("averages the looks of a row, counts the last instant to the last row, and leaves out what lies outside", () => {
    const grid = uniformClosedGrid(-12, 1, 25);
    const recorder = new DensityRecorder(grid, window);
    const look = (time: number, density: number) =>
      recorder.record(
        time,
        withDensity(grid, () => density),
      );
    look(-0.1, 1e9);
    look(0, 1);
    look(1.9, 3);
    look(2, 5);
    look(4.5, 6);
    look(8, 7);
    look(8.1, 1e9);
    const column = [0, 1, 2, 3].map((row) => rowOf(recorder.map, row)[3]);
    [2, 5, 6, 7].forEach((value, row) => {
      expect(column[row]).toBeCloseTo(value, 12);
    });
  });

  it("fills rows that no look fell into between their neighbours, and beyond the first and last look with these", () => {
    const grid = uniformClosedGrid(-12, 1, 25);
    const recorder = new DensityRecorder(grid, { ...window, rows: 8 });
    recorder.record(
      1.5,
      withDensity(grid, () => 1),
    );
    recorder.record(
      5.5,
      withDensity(grid, () => 9),
    );
    const column = Array.from({ length: 8 }, (_, row) => rowOf(recorder.map, row)[0]);
    [1, 1, 3, 5, 7, 9, 9, 9].forEach((value, row) => {
      expect(column[row]).toBeCloseTo(value, 12);
    });
  });

  it("keeps rows times columns numbers, however many looks there are", () => {
    const grid = uniformClosedGrid(-12, 1, 25);
    const recorder = new DensityRecorder(grid, window);
    const psi = withDensity(grid, () => 1);
    const held = () =>
      Object.values(recorder as unknown as Record<string, unknown>)
        .filter((value): value is Float64Array => value instanceof Float64Array && value !== grid.x)
        .reduce((sum, values) => sum + values.length, 0);
    const before = held();
    for (let i = 0; i < 5000; i++) recorder.record((8 * i) / 5000, psi);
    expect(held()).toBe(before);
    expect(held()).toBe(4 * 7 + 4);
    expect(recorder.map.density.length).toBe(28);
    for (const value of recorder.map.density) expect(value).toBeCloseTo(1, 12);
  });

  it("is empty before anything was seen, and refuses a window without a range", () => {
    const grid = uniformClosedGrid(-12, 1, 25);
    expect([...new DensityRecorder(grid, window).map.density]).toEqual(new Array(28).fill(0));
    expect(() => new DensityRecorder(grid, { ...window, xTo: -10 })).toThrow(/positive length/);
    expect(() => new DensityRecorder(grid, { ...window, tTo: Number.NaN })).toThrow(RangeError);
  });
});
