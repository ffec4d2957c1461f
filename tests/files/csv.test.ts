import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { rowsToCsv, seriesToCsv } from "../../src/files/csv.js";

describe("rowsToCsv", () => {
  it("writes a header and rows, quotes what needs it, leaves absent values empty", () => {
    const text = rowsToCsv(
      ["potential.height_eV", "verdict", "a,b"],
      [
        [0.3, "trusted", true],
        [-1.5e-9, 'said "no"', undefined],
      ],
    );
    expect(text).toBe('potential.height_eV,verdict,"a,b"\n0.3,trusted,true\n-1.5e-9,"said ""no""",\n');
  });

  it("writes numbers that read back to the same double", () => {
    fc.assert(
      fc.property(fc.double({ noDefaultInfinity: true }), (value) => {
        const read = Number(rowsToCsv(["a"], [[value]]).split("\n")[1]);
        expect(read).toBe(value + 0);
      }),
    );
  });

  it("writes the header alone, and refuses ragged rows", () => {
    expect(rowsToCsv(["a", "b"], [])).toBe("a,b\n");
    expect(() => rowsToCsv(["a", "b"], [[1, 2], [1]])).toThrow(/row 2/);
  });
});

describe("seriesToCsv", () => {
  const series = [
    { name: "time", unit: "fs", values: Float64Array.of(0, 0.1 + 0.2, 1e3) },
    { name: "x_mean", unit: "nm", values: Float64Array.of(-70, -0, Math.PI) },
    { name: "transmission", unit: "", values: Float64Array.of(1e-17, 2 / 3, Number.NaN) },
  ];

  it("puts units into the names, rounds to 12 digits, and uses an ASCII minus", () => {
    expect(seriesToCsv(series)).toBe(
      "time_fs,x_mean_nm,transmission\n0,-70,1e-17\n0.3,0,0.666666666667\n1000,3.14159265359,NaN\n",
    );
  });

  it("gives all digits on request", () => {
    expect(seriesToCsv(series, 17)).toContain("0.30000000000000004,0,0.6666666666666666");
  });

  it("refuses columns of different lengths", () => {
    expect(() => seriesToCsv([...series, { name: "x", unit: "", values: new Float64Array(2) }])).toThrow(
      '"x"',
    );
    expect(seriesToCsv([])).toBe("\n");
  });
});
