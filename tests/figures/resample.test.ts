import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { resample } from "../../src/figures/resample.js";

const whole = (columns: number, rows: number) => ({
  columnFrom: 0,
  columnTo: columns,
  rowFrom: 0,
  rowTo: rows,
});
const mean = (values: Float64Array) => values.reduce((sum, value) => sum + value, 0) / values.length;

describe("resample", () => {
  it("keeps the integral whenever the raster is coarser", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 40 }),
        fc.integer({ min: 1, max: 40 }),
        fc.double({ min: 0.05, max: 1, noNaN: true }),
        fc.double({ min: 0.05, max: 1, noNaN: true }),
        (columns, rows, a, b) => {
          const source = Float64Array.from({ length: columns * rows }, (_, n) => Math.sin(7 * n) + 1.5);
          const [width, height] = [Math.max(1, Math.floor(a * columns)), Math.max(1, Math.floor(b * rows))];
          const target = resample(source, columns, rows, whole(columns, rows), width, height);
          expect(mean(target)).toBeCloseTo(mean(source), 12);
        },
      ),
    );
  });

  it("averages fringes finer than a pixel to grey instead of beating with them", () => {
    const columns = 3000;
    const source = Float64Array.from({ length: columns }, (_, n) => 1 + Math.cos(2 * Math.PI * (n / 2.9)));
    const target = resample(source, columns, 1, whole(columns, 1), 200, 1);
    // 15 cells are 5.2 fringes: what is left of the last one is at most 1/(5.2 pi) of its swing.
    for (const value of target) expect(Math.abs(value - 1)).toBeLessThan(1 / (5.1 * Math.PI));
  });

  it("interpolates linearly when the raster is finer, and is exact for a plane", () => {
    const source = Float64Array.from({ length: 20 }, (_, n) => (n % 5) + 10 * Math.floor(n / 5));
    const target = resample(source, 5, 4, whole(5, 4), 50, 40);
    for (let row = 5; row < 35; row++)
      for (let column = 5; column < 45; column++) {
        const plane = (column + 0.5) / 10 - 0.5 + 10 * ((row + 0.5) / 10 - 0.5);
        expect(target[row * 50 + column]).toBeCloseTo(plane, 11);
      }
    expect(target[0]).toBe(0);
    expect(target[target.length - 1]).toBe(34);
  });

  it("is the identity at equal size, and cuts out a window", () => {
    const source = Float64Array.from({ length: 12 }, (_, n) => n);
    expect([...resample(source, 4, 3, whole(4, 3), 4, 3)]).toEqual([...source]);
    const window = { columnFrom: 1, columnTo: 3, rowFrom: 1, rowTo: 3 };
    expect([...resample(source, 4, 3, window, 2, 2)]).toEqual([5, 6, 9, 10]);
  });

  it("fills a raster from a single cell", () => {
    expect([...resample(Float64Array.of(3), 1, 1, whole(1, 1), 2, 2)]).toEqual([3, 3, 3, 3]);
  });
});
