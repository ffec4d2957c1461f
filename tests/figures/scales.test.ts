import { describe, expect, it } from "vitest";
import { axisUnit } from "../../src/figures/axis-unit.js";
import { colourTable, paint } from "../../src/figures/colour.js";
import { densityScale } from "../../src/figures/density-scale.js";
import { labelNumber, linearTicks, powerOfTen } from "../../src/figures/ticks.js";

describe("axisUnit", () => {
  it.each([
    ["length", 0.0008, "pm"],
    ["length", 0.5, "pm"],
    ["length", 1, "nm"],
    ["length", 150, "nm"],
    ["length", 1000, "µm"],
    ["length", 3e6, "mm"],
    ["time", 0.2, "as"],
    ["time", 320, "fs"],
    ["time", 2e4, "ps"],
    ["time", 5e7, "ns"],
    ["time", 5e9, "µs"],
    ["time", 3e13, "ms"],
    ["time", 2e15, "s"],
    ["energy", 3e-12, "peV"],
    ["energy", 2e-8, "neV"],
    ["energy", 5e-5, "µeV"],
    ["energy", 0.05, "meV"],
    ["energy", -0.3, "eV"],
    ["energy", 12, "eV"],
    ["energy", 0, "peV"],
  ] as const)("shows a %s of %s in %s", (kind, largest, name) => {
    expect(axisUnit(kind, largest).name).toBe(name);
  });

  it("gives the size of the unit in nm, fs and eV", () => {
    expect(axisUnit("length", 0.05).size).toBe(1e-3);
    expect(axisUnit("time", 1e13).size).toBe(1e12);
    expect(axisUnit("energy", 1e-12).size).toBe(1e-12);
  });
});

describe("tick labels", () => {
  it("are round, with equal decimals and a true minus sign", () => {
    expect(linearTicks(-150, 150, 7).map(({ label }) => label)).toEqual([
      "−150",
      "−100",
      "−50",
      "0",
      "50",
      "100",
      "150",
    ]);
    expect(linearTicks(0, 0.09, 5).map(({ label }) => label)).toEqual([
      "0.00",
      "0.02",
      "0.04",
      "0.06",
      "0.08",
    ]);
    expect(linearTicks(0, 20000, 4).map(({ label }) => label)).toContain("5000");
  });

  it("never print round-off", () => {
    for (const { label } of linearTicks(-0.3, 0.3, 7)) expect(label).toMatch(/^−?0\.\d$/);
  });

  it("write numbers and powers of ten as a person would", () => {
    expect([0, 0.15, -0.3, 2.1, 12345, 3.2e-7].map((value) => labelNumber(value))).toEqual([
      "0",
      "0.15",
      "−0.3",
      "2.1",
      "1.23×10⁴",
      "3.2×10⁻⁷",
    ]);
    expect([-12, 0, 1, 2].map(powerOfTen)).toEqual(["10⁻¹²", "1", "10", "10²"]);
  });
});

describe("densityScale", () => {
  it("runs linearly from zero to the maximum", () => {
    const scale = densityScale(Float64Array.of(0, 0.02, 0.08), "linear");
    expect([scale.low, scale.high, scale.position(0.02), scale.position(0)]).toEqual([0, 0.08, 0.25, 0]);
    expect(scale.ticks.map(({ label }) => label)).toEqual(["0.00", "0.02", "0.04", "0.06", "0.08"]);
    expect(scale.exponent).toBe(0);
  });

  it("moves a power of ten from long labels to the axis label", () => {
    const scale = densityScale(Float64Array.of(4.5e-5), "linear");
    expect(scale.exponent).toBe(-6);
    expect(scale.ticks.map(({ label }) => label)).toEqual(["0", "10", "20", "30", "40"]);
    expect(scale.position(scale.ticks[4].value)).toBeCloseTo(40 / 45, 12);
  });

  it("covers at least six decades below the maximum, down to a power of ten, in a logarithmic scale", () => {
    const scale = densityScale(Float64Array.of(0, 1e-30, 0.05), "log");
    expect(scale.low).toBe(1e-8);
    expect(scale.ticks.map(({ label }) => label)).toEqual([
      "≤ 10⁻⁸",
      "10⁻⁷",
      "10⁻⁶",
      "10⁻⁵",
      "10⁻⁴",
      "10⁻³",
      "10⁻²",
    ]);
    expect(scale.position(0.05)).toBeCloseTo(1, 12);
    expect(scale.position(1e-8)).toBe(0);
    expect(scale.position(Math.sqrt(0.05 * 1e-8))).toBeCloseTo(0.5, 12);
    expect(densityScale(Float64Array.of(0, 1e-30, 1), "log").low).toBe(1e-6);
  });

  it("reaches only as deep as the data do", () => {
    expect(densityScale(Float64Array.of(2e-3, 0.5), "log").low).toBe(1e-3);
    expect(densityScale(Float64Array.of(0.5, 0.5), "log").low).toBe(0.1);
    expect(densityScale(Float64Array.of(1, 1), "log").low).toBe(0.1);
  });

  it("takes zeros, negative round-off and an empty map", () => {
    const log = densityScale(Float64Array.of(0, -1e-18, 1), "log");
    expect([0, -1e-18, Number.MIN_VALUE].map((value) => log.position(value))).toEqual([0, 0, 0]);
    for (const kind of ["linear", "log"] as const) {
      const empty = densityScale(new Float64Array(9), kind);
      expect(empty.position(0)).toBe(0);
      expect(empty.high).toBeGreaterThan(empty.low);
    }
    expect(densityScale(Float64Array.of(5e-324), "log").position(5e-324)).toBeGreaterThanOrEqual(0);
  });

  it("thins the labels of very many decades", () => {
    const scale = densityScale(Float64Array.of(1e-200, 1), "log", 40);
    expect(scale.ticks.length).toBeLessThanOrEqual(9);
    expect(scale.low).toBe(1e-40);
  });

  it("refuses what no colour can show", () => {
    expect(() => densityScale(Float64Array.of(1, Number.NaN), "linear")).toThrow("finite");
    expect(() => densityScale(Float64Array.of(Number.POSITIVE_INFINITY), "log")).toThrow("finite");
    expect(() => densityScale(Float64Array.of(1), "log", 0)).toThrow(RangeError);
  });
});

describe("colours", () => {
  /** Relative luminance by WCAG 2.1. */
  const luminance = (rgb: Uint8Array) => {
    const [r, g, b] = [...rgb].map((byte) => {
      const c = byte / 255;
      return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
    });
    return 0.2126 * r + 0.7152 * g + 0.0722 * b;
  };

  it.each(["viridis", "cividis"] as const)(
    "%s brightens all the way, so that it can be read without hues",
    (name) => {
      const table = colourTable(name);
      let before = -1;
      for (let i = 0; i < 256; i += 5) {
        const now = luminance(table.subarray(3 * i, 3 * i + 3));
        expect(now).toBeGreaterThan(before);
        before = now;
      }
    },
  );

  it("are painted with row 0 at the bottom, clamped at both ends", () => {
    const table = colourTable("viridis");
    const pixels = paint(Float64Array.of(-1, 0, 2, 0.5), 2, 2, (value) => value, table);
    expect([...pixels.subarray(0, 4)]).toEqual([...table.subarray(765), 255]);
    expect([...pixels.subarray(4, 8)]).toEqual([...table.subarray(384, 387), 255]);
    expect([...pixels.subarray(8, 12)]).toEqual([...table.subarray(0, 3), 255]);
    expect([...pixels.subarray(12)]).toEqual([...table.subarray(0, 3), 255]);
  });
});
