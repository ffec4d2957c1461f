import { existsSync, readdirSync, readFileSync } from "node:fs";
import { PNG } from "pngjs";
import { describe, expect, it } from "vitest";
import { MASS } from "../grid/samples.js";
import { slabs } from "../potentials/closed-forms.js";
import { RECTANGULAR, workplace } from "./run.js";

const { folder, path, postern, write } = workplace();
write("rect.yaml", RECTANGULAR);
write("uphill.yaml", RECTANGULAR.replace(/^potential.*$/m, "potential: { shape: step, height: 0.1 eV }"));
write(
  "double.yaml",
  RECTANGULAR.replace(
    /^potential.*$/m,
    "potential: { shape: layers, layers: [ { width: 2 nm, height: 0.3 eV }, { width: 6 nm, height: 0 eV }, { width: 2 nm, height: 0.3 eV } ] }",
  ),
);

const exact = slabs([{ width: 5, height: 0.3 }]);

interface Row {
  readonly energy_eV: number;
  readonly transmission: number;
  readonly error: number;
}

describe.each(["packet", "stationary"])("postern spectrum --method %s --json", (method) => {
  it("prints one document whose rows are those asked for, within their bounds of the closed form, and exits 0", () => {
    const list = ["--energies", "100 meV, 0.15 eV,0.2 eV"];
    const { code, out, err } = postern("spectrum", "rect.yaml", ...list, "--method", method, "--json");
    expect({ code, err }).toEqual({ code: 0, err: "" });
    const answer = JSON.parse(out);
    expect(answer).toMatchObject({
      design: { title: "Rectangular barrier", sha256: expect.stringMatching(/^[0-9a-f]{64}$/) },
      method,
      resonances: [],
      verdict: "trusted",
      accuracy: { asked: 1e-6, reached: expect.any(Number) },
      floor: expect.any(Number),
      version: "0.1.0",
    });
    expect(answer.rows.map(({ energy_eV }: Row) => energy_eV)).toEqual([0.1, 0.15, 0.2]);
    for (const row of answer.rows) {
      expect(Object.keys(row)).toEqual([
        "energy_eV",
        "transmission",
        "error",
        "reflection",
        "reflectionError",
      ]);
      const truth = exact(row.energy_eV, MASS);
      // The closed form itself is good to some units of the last place, which the witness' bound may fall below.
      expect(Math.abs(row.transmission - truth)).toBeLessThanOrEqual(row.error + 1e-13 * truth);
      expect(row.error).toBeLessThanOrEqual(1e-6 * truth);
      expect(Math.abs(row.reflection - (1 - truth))).toBeLessThanOrEqual(row.reflectionError + 1e-15);
    }
    expect(answer.packets.length > 0).toBe(method === "packet");
  });
});

describe("the energies of postern spectrum", () => {
  const energies = (...args: string[]): number[] => {
    const { code, out, err } = postern("spectrum", "rect.yaml", "--method", "stationary", "--json", ...args);
    expect({ code, err }).toEqual({ code: 0, err: "" });
    return JSON.parse(out).rows.map(({ energy_eV }: Row) => energy_eV);
  };

  it("go from --low to --high, both of them included", () => {
    const found = energies("--low", "0.05 eV", "--high", "0.25 eV", "--points", "5");
    expect(found).toHaveLength(5);
    [0.05, 0.1, 0.15, 0.2, 0.25].forEach((energy, n) => {
      expect(found[n]).toBeCloseTo(energy, 14);
    });
    expect([found[0], found[4]]).toEqual([0.05, 0.25]);
    expect(energies("--low", "0.05 eV", "--high", "0.25 eV")).toHaveLength(101);
  });

  it("are those of the packet where none are asked for, and an end left out is the packet's", () => {
    const own = energies();
    expect([own[0], own[own.length - 1]]).toEqual([0.056, 0.288]);
    expect(own).toHaveLength(117);
    const low = energies("--low", "0.1 eV", "--points", "11");
    expect(low[0]).toBe(0.1);
    expect(low[10]).toBeCloseTo(0.28957, 5);
    const high = energies("--high", "0.1 eV", "--points", "11");
    expect(high[0]).toBeCloseTo(0.05592, 5);
    expect(high[10]).toBe(0.1);
    expect(energies("--points", "2")).toHaveLength(2);
  });
});

describe("postern spectrum as text", () => {
  it("shows rows with bounds, resonances, checks and the verdict", () => {
    const list = ["--low", "0.06 eV", "--high", "0.14 eV", "--points", "5"];
    const { code, out, err } = postern("spectrum", "double.yaml", ...list, "--method", "stationary");
    expect({ code, err }).toEqual({ code: 0, err: "" });
    const hidden = out
      .replace(/(\d\.\d{4})\d*\(\d+\)(?:e-\d+)? */g, "$1... ")
      .replace(/\b\d+(?:\.\d+)?e-\d+\b/g, (size) => (size === "1e-6" ? size : "x"))
      .replace(/(transmission|reflection) +/g, "$1 ")
      .replace(/ +limit/g, " limit")
      .replace(/ +$/gm, "");
    expect(hidden).toMatchInlineSnapshot(`
      "Rectangular barrier

      transmission against energy, by the stationary witness; energies from the left level
        energy   transmission reflection
        0.06 eV  0.2111... 0.7888...
        0.08 eV  0.2169... 0.7830...
        0.1 eV   0.0715... 0.9284...
        0.12 eV  0.0550... 0.9449...
        0.14 eV  0.0579... 0.9420...

      resonances (energy, and full width at half height)
        0.06778 eV  width 9.86 meV

      checks
        passed  accuracy  x limit 1e-6
        passed  sum       0 limit x

      trusted: all checks passed; every bound is within x of its transmission, 1e-6 was asked for
      "
    `);
  });

  it("shows at most forty rows or so, and says how to get the others", () => {
    const { out } = postern("spectrum", "rect.yaml", "--method", "stationary");
    expect(out.match(/^ {2}0\.\d+ eV /gm)?.length).toBe(40);
    expect(out).toContain(
      "\n  40 of 117 energies are shown; --out DIR writes all of them, --json prints them\n",
    );
    expect(out).toMatch(/^ {2}0\.056 eV .*\n/m);
    expect(out).toMatch(/^ {2}0\.288 eV .*\n/m);
  });

  it("names packets and floor, and keeps within 100 columns", () => {
    const { out } = postern("spectrum", "rect.yaml", "--energies", "0.1 eV,0.15 eV");
    expect(out).toMatch(/^transmission against energy, by wavepackets;/m);
    expect(out).toMatch(/^ {2}0\.\d+ eV {2}from the left .* 2 energies .* points .* steps to .* runs$/m);
    expect(out).toMatch(/^floor {2}round-off may hide a transmission below \d\S*e-\d+$/m);
    expect(out.split("\n").filter((line) => line.length > 100)).toEqual([]);
  });

  it("says in words why an answer is doubtful, and ends with 3", () => {
    // Thick walls: rounding alone leaves more than this in what is known of the structure.
    const thick = [0, 2].flatMap((n) => ["--set", `potential.layers[${n}].width=9 nm`]);
    const list = ["--energies", "0.08 eV,0.1 eV", "--method", "stationary", "--accuracy", "1e-13"];
    const { code, out } = postern("spectrum", "double.yaml", ...thick, ...list);
    expect(code).toBe(3);
    expect(out).toMatch(/^ {2}FAILED {2}accuracy /m);
    expect(out).toMatch(
      /\ndoubtful:\n {2}accuracy is .*, above its limit 1e-13: .*\n.*: 1 of 2 energies miss it, worst 0\.08 eV\n/,
    );
  });
});

describe("postern spectrum --out", () => {
  const list = ["--energies", "0.1 eV,0.15 eV,0.2 eV", "--method", "stationary"];
  const run = postern("spectrum", "rect.yaml", ...list, "--out", "deep/curve", "--width", "80 mm", "--json");

  it("writes three files, names them on standard error, and keeps standard output to one document", () => {
    expect(run.code).toBe(0);
    const names = ["spectrum.csv", "spectrum.json", "spectrum.png"];
    expect(run.err).toBe(names.map((name) => `deep/curve/${name}\n`).join(""));
    expect(readdirSync(path("deep/curve")).sort()).toEqual(names);
  });

  it("puts the answer and the design in full into spectrum.json", () => {
    const answer = JSON.parse(run.out);
    const { design, ...rest } = JSON.parse(readFileSync(path("deep/curve/spectrum.json"), "utf8"));
    const { design: asked, ...same } = answer;
    expect(rest).toEqual(same);
    expect(design).toMatchObject({ ...asked, full: { potential: { shape: "rectangular", width: "5 nm" } } });
  });

  it("puts the rows with both errors into spectrum.csv", () => {
    const lines = readFileSync(path("deep/curve/spectrum.csv"), "utf8").split("\n");
    expect(lines[0]).toBe("energy_eV,transmission,transmission_error,reflection,reflection_error");
    const rows = lines.slice(1, -1).map((line) => line.split(",").map(Number));
    expect(rows).toEqual(
      JSON.parse(run.out).rows.map((row: Record<string, number>) => [
        row.energy_eV,
        row.transmission,
        row.error,
        row.reflection,
        row.reflectionError,
      ]),
    );
  });

  it("draws at the size asked for, with the design's hash in the file", () => {
    const file = readFileSync(path("deep/curve/spectrum.png"));
    const { width, height } = PNG.sync.read(file);
    expect([width, height]).toEqual([945, 756]);
    expect(file.includes(`Design SHA-256\0${JSON.parse(run.out).design.sha256}`)).toBe(true);
  });
});

const WRONG: readonly (readonly [file: string, args: readonly string[], first: string])[] = [
  [
    "rect.yaml",
    ["--low", "-0.1 eV"],
    'postern: --low -0.1 eV: an energy above zero is needed, such as "0.15 eV"; got "-0.1 eV"',
  ],
  [
    "rect.yaml",
    ["--energies", "-0.1 eV,0.1 eV"],
    'postern: --energies -0.1 eV: an energy above zero is needed, such as "0.15 eV"; got "-0.1 eV"',
  ],
  [
    "uphill.yaml",
    ["--set", "packet.energy=0.2 eV", "--low", "0.05 eV", "--high", "0.09 eV"],
    'postern: --low 0.05 eV: an energy above 0.1 eV is needed, because the right level of the potential lies 0.1 eV above the left one; got "0.05 eV"',
  ],
  [
    "uphill.yaml",
    ["--set", "packet.energy=0.2 eV", "--energies", "0.1 eV,0.2 eV"],
    'postern: --energies 0.1 eV: an energy above 0.1 eV is needed, because the right level of the potential lies 0.1 eV above the left one; got "0.1 eV"',
  ],
  [
    "rect.yaml",
    ["--energies", "0.2 eV,0.1 eV"],
    'postern: --energies: ascending energies are needed, each once; "0.1 eV" comes after "0.2 eV"',
  ],
  [
    "rect.yaml",
    ["--energies", "0.1 eV,0.1 eV"],
    'postern: --energies: ascending energies are needed, each once; "0.1 eV" comes after "0.1 eV"',
  ],
  [
    "rect.yaml",
    ["--energies", "0.1 eV,,0.2 eV"],
    'postern: --energies : an energy above zero is needed, such as "0.15 eV"; got an empty text',
  ],
  [
    "rect.yaml",
    ["--energies", "0.1,0.2"],
    'postern: --energies 0.1: an energy above zero is needed, such as "0.15 eV"; got 0.1 without a unit: add peV, neV, ueV, meV, eV, keV, hartree or J',
  ],
  [
    "rect.yaml",
    ["--energies", "nan eV"],
    'postern: --energies nan eV: an energy above zero is needed, such as "0.15 eV"; got "nan eV", which is not a finite number',
  ],
  [
    "rect.yaml",
    ["--energies", "0.1 eV", "--points", "5"],
    "postern: --points: no range is needed beside --energies",
  ],
  [
    "rect.yaml",
    ["--low", "0.2 eV", "--high", "0.1 eV"],
    'postern: --high 0.1 eV: an energy above that of --low is needed; got "0.1 eV"',
  ],
  [
    "rect.yaml",
    ["--low", "5 nm"],
    'postern: --low 5 nm: an energy above zero is needed, such as "0.15 eV"; "5 nm" is a length',
  ],
  [
    "rect.yaml",
    ["--low", "2 eV"],
    "postern: --low 2 eV: the packet's own energies end at 0.29 eV, so --high is needed as well",
  ],
  [
    "rect.yaml",
    ["--high", "0.01 eV"],
    "postern: --high 0.01 eV: the packet's own energies end at 0.0559 eV, so --low is needed as well",
  ],
  ["rect.yaml", ["--points", "1"], 'postern: --points 1: a whole number from 2 to 100000 is needed; got "1"'],
  [
    "rect.yaml",
    ["--points", "1e12"],
    'postern: --points 1e12: a whole number from 2 to 100000 is needed; got "1e12"',
  ],
  [
    "rect.yaml",
    ["--points", "99999999999999999999"],
    'postern: --points 99999999999999999999: a whole number from 2 to 100000 is needed; got "99999999999999999999"',
  ],
  [
    "rect.yaml",
    ["--low", "0.1 eV", "--high", "0.10000000000000001 eV"],
    'postern: --high 0.10000000000000001 eV: an energy above that of --low is needed; got "0.10000000000000001 eV"',
  ],
  [
    "rect.yaml",
    ["--low", "0.1 eV", "--high", "0.1000000000000001 eV", "--points", "100"],
    'postern: --low 0.1 eV --high 0.1000000000000001 eV --points 100: ascending energies are needed, each once; "0.1 eV" comes after "0.1 eV"',
  ],
  [
    "rect.yaml",
    ["--method", "guess"],
    'postern: option "--method <NAME>" argument "guess" is invalid. Allowed choices are packet, stationary.',
  ],
  ["rect.yaml", ["--out", ""], "postern: --out: the name of a folder is needed"],
  [
    "rect.yaml",
    ["--out", "rect.yaml"],
    "postern: rect.yaml: this is a file, and a folder is needed; choose another name or remove it",
  ],
  [
    "rect.yaml",
    ["--width", "80 mm"],
    "postern: --width: --out is needed beside it, as it concerns the figure",
  ],
  [
    "rect.yaml",
    ["--reflection"],
    "postern: --reflection: --out is needed beside it, as it concerns the figure",
  ],
  [
    "rect.yaml",
    ["--out", "r", "--width", "1 mm"],
    "postern: --width 1 mm: the width of a figure must lie between 50 and 1000 mm; got 1",
  ],
  [
    "rect.yaml",
    ["--set", "potential={ shape: harmonic, quantum: 0.1 eV }"],
    'postern: --set potential={ shape: harmonic, quantum: 0.1 eV }: potential: the harmonic potential confines the particle on both sides, so nothing is transmitted; use "postern map" to see the packet move',
  ],
  [
    "double.yaml",
    ["--set", "potential.layers[0].mass=0.09 m_e", "--stepper", "split-operator"],
    "postern: --stepper split-operator: numerics.stepper: the split operator needs one mass everywhere, and the mass of this structure varies; use crank-nicolson",
  ],
];

describe("postern spectrum with a wrong option", () => {
  it.each(WRONG)("%s %j", (file, args, first) => {
    const { code, out, err } = postern("spectrum", file, ...args);
    const lines = err.split("\n");
    expect(lines).toEqual([first, expect.stringMatching(/^\S.*\S$/), ""]);
    expect({ code, out }).toEqual({ code: 2, out: "" });
    expect(existsSync(`${folder}/r`)).toBe(false);
  });
});
