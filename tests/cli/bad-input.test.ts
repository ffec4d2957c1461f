import { readdirSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { RECTANGULAR, workplace } from "./run.js";

const { folder, postern, write } = workplace();
write("right.yaml", RECTANGULAR);

/** The right design with one line replaced; lines from 1. */
function changed(number: number, line: string): string {
  const all = RECTANGULAR.split("\n");
  all[number - 1] = line;
  return all.join("\n");
}

/** Lines of an error; how long a box has to be is the grid builder's affair, so that number is hidden. */
const lines = (err: string): string[] => err.replace(/(here more than )"\d+ nm"/, '$1"x nm"').split("\n");

interface Bad {
  readonly what: string;
  readonly text: string | Uint8Array;
  readonly first: string;
}

/** One of each class; tests/design has many more of them, without the program around it. */
const BAD: readonly Bad[] = [
  {
    what: "a negative width",
    text: changed(3, "potential: { shape: rectangular, height: 0.3 eV, width: -5 nm }"),
    first:
      'postern: bad.yaml:3:57: potential.width: a length above zero is needed, such as "5 nm"; got "-5 nm"',
  },
  {
    what: "a number without a unit",
    text: changed(4, "packet: { energy: 0.15 eV, width: 10 }"),
    first:
      'postern: bad.yaml:4:35: packet.width: a length above zero is needed, such as "12 nm"; got 10 without a unit: add pm, nm, um, mm, Å, angstrom, m or bohr',
  },
  {
    what: "a wrong unit",
    text: changed(4, "packet: { energy: 0.15 nm, width: 10 nm }"),
    first:
      'postern: bad.yaml:4:19: packet.energy: an energy of zero or more is needed, such as "0.15 eV"; "0.15 nm" is a length',
  },
  {
    what: "an unknown key",
    text: changed(4, "packet: { enrgy: 0.15 eV, width: 10 nm }"),
    first: 'postern: bad.yaml:4:11: packet.enrgy: unknown key; did you mean "energy"?',
  },
  {
    what: "a missing key",
    text: changed(4, "packet: { energy: 0.15 eV }"),
    first:
      'postern: bad.yaml:4:1: packet.width: missing; either width, such as "12 nm", or energySpread, such as "10 meV", is needed',
  },
  {
    what: "not a number",
    text: changed(4, "packet: { energy: .nan, width: 10 nm }"),
    first:
      'postern: bad.yaml:4:19: packet.energy: an energy of zero or more is needed, such as "0.15 eV"; got NaN, which is not a finite number',
  },
  {
    what: "infinity",
    text: changed(4, "packet: { energy: .inf, width: 10 nm }"),
    first:
      'postern: bad.yaml:4:19: packet.energy: an energy of zero or more is needed, such as "0.15 eV"; got Infinity, which is not a finite number',
  },
  {
    what: "a mass of zero",
    text: changed(2, "particle: { mass: 0 m_e }"),
    first:
      'postern: bad.yaml:2:19: particle.mass: a mass above zero is needed, such as "0.067 m_e"; got "0 m_e"',
  },
  {
    what: "an energy below the level on the far side",
    text: changed(3, "potential: { shape: step, height: 0.3 eV }"),
    first:
      'postern: bad.yaml:4:19: packet.energy: an energy above 0.3 eV is needed, because the right level of the potential lies 0.3 eV above the left one; got "0.15 eV"',
  },
  {
    what: "an empty list of layers",
    text: changed(3, "potential: { shape: layers, layers: [] }"),
    first:
      "postern: bad.yaml:3:37: potential.layers: a list with at least one entry is needed; got an empty list",
  },
  {
    what: "an absurd number of points",
    text: `${RECTANGULAR}numerics: { points: 1000000000 }\n`,
    first:
      "postern: bad.yaml:5:21: numerics.points: a whole number from 16 to 16777216 (2^24) is needed, such as 4096; got 1000000000",
  },
  {
    what: "a box that is too short",
    text: `${RECTANGULAR}numerics: { length: 50 nm }\n`,
    first:
      'postern: bad.yaml:5:21: numerics.length: a box that holds the packet at its start and the structure is needed, here more than "x nm"; got "50 nm"',
  },
  {
    what: "a potential that lets nothing through",
    text: changed(3, "potential: { shape: harmonic, quantum: 0.1 eV }"),
    first:
      'postern: bad.yaml:3:12: potential: the harmonic potential confines the particle on both sides, so nothing is transmitted; use "postern map" to see the packet move',
  },
  {
    what: "an unknown shape",
    text: changed(3, "potential: { shape: rectangle, height: 0.3 eV, width: 5 nm }"),
    first:
      'postern: bad.yaml:3:21: potential.shape: no shape of that name: got "rectangle"; did you mean "rectangular"?',
  },
  {
    what: "broken YAML",
    text: changed(4, "packet: { energy: 0.15 eV, width: 10 nm"),
    first:
      "postern: bad.yaml:5:1: not readable as YAML: flow map in block collection must be sufficiently indented and end with a }",
  },
  {
    what: "an empty file",
    text: "",
    first: "postern: bad.yaml: the file is empty",
  },
  {
    what: "a file that is not text",
    text: new Uint8Array([0x89, 0x50, 0xff, 0x00, 0xfe]),
    first: "postern: bad.yaml: the file is not text in UTF-8",
  },
];

describe("a wrong design", () => {
  it.each(BAD)("$what: one line, a line of help, exit 2, nothing on stdout", ({ text, first }) => {
    write("bad.yaml", text);
    const { code, out, err } = postern("estimate", "bad.yaml", "--json", "--out", "results");
    expect(lines(err)).toEqual([first, expect.stringMatching(/^\S.*\S$/), ""]);
    expect({ code, out }).toEqual({ code: 2, out: "" });
    expect(readdirSync(folder)).not.toContain("results");
  });

  it.each(["estimate", "map", "validate"])("is refused by %s alike", (command) => {
    write("bad.yaml", "title: Nothing else\n");
    const { code, err } = postern(command, "bad.yaml", ...(command === "map" ? ["--out", "m.png"] : []));
    expect(err).toMatch(/^postern: bad\.yaml:1:1: \w+: missing; /);
    expect(code).toBe(2);
  });

  it("is no fault of the program: --trace adds where the error came up, and nothing else does", () => {
    write("bad.yaml", "title: Nothing else\n");
    expect(postern("validate", "bad.yaml").err).not.toMatch(/\n\s+at /);
    expect(postern("validate", "bad.yaml", "--trace").err).toMatch(/\n\s+at /);
    expect(postern("--trace", "validate", "bad.yaml").err).toMatch(/\n\s+at /);
  });
});

describe("a file that cannot be read", () => {
  it("is missing", () => {
    expect(postern("estimate", "absent.yaml")).toEqual({
      code: 2,
      out: "",
      err: "postern: absent.yaml: no such file\nGive the path of a design file in YAML or JSON.\n",
    });
  });

  it("is a folder", () => {
    const { code, err } = postern("estimate", ".");
    expect({ code, err }).toEqual({
      code: 2,
      err: "postern: .: this is a folder; a file is needed\nGive the path of a design file in YAML or JSON.\n",
    });
  });
});

/** A value that an option brings in is answered like one of the file, and the option is named instead of a place. */
const BAD_OPTIONS: readonly (readonly [args: readonly string[], first: string])[] = [
  [
    ["--set", "packet.width=5"],
    'postern: --set packet.width=5: packet.width: a length above zero is needed, such as "12 nm"; got 5 without a unit: add pm, nm, um, mm, Å, angstrom, m or bohr',
  ],
  [
    ["--set", "packet.wdth=5 nm"],
    'postern: --set packet.wdth=5 nm: packet.wdth: unknown key; did you mean "width"?',
  ],
  [["--set", "packet.width"], 'postern: --set packet.width: a path, "=" and a value are needed'],
  [
    ["--set", "numerics.length=50 nm"],
    'postern: --set numerics.length=50 nm: numerics.length: a box that holds the packet at its start and the structure is needed, here more than "x nm"; got "50 nm"',
  ],
  [
    ["--accuracy", "2"],
    "postern: --accuracy 2: numerics.accuracy: a relative accuracy from 1e-13 to below 0.5 is needed, such as 1e-6; got 2",
  ],
  [
    ["--accuracy", "good"],
    'postern: --accuracy good: numerics.accuracy: a relative accuracy from 1e-13 to below 0.5 is needed, such as 1e-6; got "good"',
  ],
  [
    ["--stepper", "crank-nicholson"],
    'postern: --stepper crank-nicholson: numerics.stepper: "split-operator", "crank-nicolson", "eigenstates" or "chebyshev" is needed; got "crank-nicholson"; did you mean "crank-nicolson"?',
  ],
  [
    ["--stepper", "eigenstates"],
    'postern: --stepper eigenstates: numerics.stepper: eigenstates follows a packet in time, as "postern map" shows it; an estimate, which refines its grid, needs crank-nicolson, split-operator or chebyshev',
  ],
  [
    ["--stepper", "chebyshev", "--order", "4"],
    "postern: --order 4: numerics.order: chebyshev is exact in time, so there is no order to choose; leave this out",
  ],
  [["--order", "3"], "postern: --order 3: numerics.order: an order of 2, 4 or 6 is needed; got 3"],
  [["--order", ""], 'postern: --order : numerics.order: an order of 2, 4 or 6 is needed; got ""'],
  [["--out", ""], "postern: --out: the name of a folder is needed"],
  [
    ["--out", "right.yaml"],
    "postern: right.yaml: this is a file, and a folder is needed; choose another name or remove it",
  ],
  [["--out", "right.yaml/deeper"], "postern: right.yaml/deeper: a part of this path is a file, not a folder"],
];

describe("a wrong option", () => {
  it.each(BAD_OPTIONS)("%j", (args, first) => {
    const { code, out, err } = postern("estimate", "right.yaml", ...args);
    expect(lines(err)).toEqual([first, expect.stringMatching(/^\S.*\S$/), ""]);
    expect({ code, out }).toEqual({ code: 2, out: "" });
  });
});
