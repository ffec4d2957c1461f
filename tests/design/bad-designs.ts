/** A wrong design: what was changed in a right one, or a whole text, and the options it is read with. */
export interface BadDesign {
  readonly what: string;
  readonly text: string;
  readonly set?: readonly string[];
  readonly accuracy?: number;
  readonly stepper?: string;
  readonly order?: number;
  /** The whole line of the error, without the program's name. */
  readonly message: string;
}

/** A right design, in block style so that every line has one value. */
export const RIGHT = `title: Blocking barrier
particle:
  mass: 0.067 m_e
potential:
  shape: layers
  layers:
    - width: 2.5 nm
      height: 0.30 eV
      mass: 0.092 m_e
    - width: 5.0 nm
      height: 0 eV
packet:
  energy: 0.15 eV
  width: 12 nm
numerics:
  accuracy: 1e-6
`;

/** The right design with one line replaced; line numbers from 1. */
function line(number: number, ...replacement: string[]): string {
  const lines = RIGHT.split("\n");
  lines.splice(number - 1, 1, ...replacement);
  return lines.join("\n");
}

const step = `title: Step
potential: { shape: step, height: 0.3 eV }
packet: { energy: 0.2 eV, width: 12 nm }
`;

const bomb = `a: &a [1, 1, 1, 1, 1, 1, 1, 1, 1]
b: &b [*a, *a, *a, *a, *a, *a, *a, *a, *a]
c: &c [*b, *b, *b, *b, *b, *b, *b, *b, *b]
d: &d [*c, *c, *c, *c, *c, *c, *c, *c, *c]
`;

export const BAD_DESIGNS: readonly BadDesign[] = [
  // Quantities.
  {
    what: "negative width of a layer",
    text: line(10, "    - width: -3 nm"),
    message:
      'a.yaml:10:14: potential.layers[1].width: a length above zero is needed, such as "2.5 nm"; got "-3 nm"',
  },
  {
    what: "zero width of a layer",
    text: line(10, "    - width: 0 nm"),
    message:
      'a.yaml:10:14: potential.layers[1].width: a length above zero is needed, such as "2.5 nm"; got "0 nm"',
  },
  {
    what: "bare number",
    text: line(14, "  width: 12"),
    message:
      'a.yaml:14:10: packet.width: a length above zero is needed, such as "12 nm"; got 12 without a unit: add pm, nm, um, mm, Å, angstrom, m or bohr',
  },
  {
    what: "bare number as text",
    text: line(14, '  width: "12"'),
    message:
      'a.yaml:14:10: packet.width: a length above zero is needed, such as "12 nm"; got 12 without a unit: add pm, nm, um, mm, Å, angstrom, m or bohr',
  },
  {
    what: "wrong kind",
    text: line(14, "  width: 12 eV"),
    message:
      'a.yaml:14:10: packet.width: a length above zero is needed, such as "12 nm"; "12 eV" is an energy',
  },
  {
    what: "mistyped unit",
    text: line(14, "  width: 12 nmm"),
    message:
      'a.yaml:14:10: packet.width: a length above zero is needed, such as "12 nm"; got "12 nmm", whose unit "nmm" is unknown: did you mean "nm"?',
  },
  {
    what: "unit in wrong case",
    text: line(13, "  energy: 0.15 ev"),
    message:
      'a.yaml:13:11: packet.energy: an energy of zero or more is needed, such as "0.15 eV"; got "0.15 ev", whose unit "ev" is unknown: did you mean "eV"?',
  },
  {
    what: "no space",
    text: line(13, "  energy: 0.15eV"),
    message:
      'a.yaml:13:11: packet.energy: an energy of zero or more is needed, such as "0.15 eV"; got "0.15eV": put a space between number and unit',
  },
  {
    what: "decimal comma",
    text: line(13, "  energy: 0,15 eV"),
    message:
      'a.yaml:13:11: packet.energy: an energy of zero or more is needed, such as "0.15 eV"; got "0,15 eV": write the decimal point as "."',
  },
  {
    what: "YAML nan",
    text: line(14, "  width: .nan"),
    message:
      'a.yaml:14:10: packet.width: a length above zero is needed, such as "12 nm"; got NaN, which is not a finite number',
  },
  {
    what: "YAML infinity",
    text: line(14, "  width: -.inf"),
    message:
      'a.yaml:14:10: packet.width: a length above zero is needed, such as "12 nm"; got -Infinity, which is not a finite number',
  },
  {
    what: "text nan",
    text: line(14, "  width: nan nm"),
    message:
      'a.yaml:14:10: packet.width: a length above zero is needed, such as "12 nm"; got "nan nm", which is not a finite number',
  },
  {
    what: "overflow",
    text: line(8, "      height: 1e999 eV"),
    message:
      'a.yaml:8:15: potential.layers[0].height: an energy is needed, such as "0.30 eV"; got "1e999 eV", which is too large',
  },
  {
    what: "zero mass",
    text: line(3, "  mass: 0 m_e"),
    message: 'a.yaml:3:9: particle.mass: a mass above zero is needed, such as "0.067 m_e"; got "0 m_e"',
  },
  {
    what: "negative mass of a layer",
    text: line(9, "      mass: -0.092 m_e"),
    message:
      'a.yaml:9:13: potential.layers[0].mass: a mass above zero is needed, such as "0.092 m_e"; got "-0.092 m_e"',
  },
  {
    what: "empty value",
    text: line(13, "  energy:"),
    message:
      'a.yaml:13:10: packet.energy: an energy of zero or more is needed, such as "0.15 eV"; got nothing',
  },
  {
    what: "list for a quantity",
    text: line(13, "  energy: [0.15 eV]"),
    message:
      'a.yaml:13:11: packet.energy: an energy of zero or more is needed, such as "0.15 eV"; got a list',
  },
  {
    what: "map for a quantity",
    text: line(13, "  energy: { value: 0.15 eV }"),
    message:
      'a.yaml:13:11: packet.energy: an energy of zero or more is needed, such as "0.15 eV"; got a map of keys',
  },
  {
    what: "true for a quantity",
    text: line(13, "  energy: true"),
    message: 'a.yaml:13:11: packet.energy: an energy of zero or more is needed, such as "0.15 eV"; got true',
  },
  // Keys.
  {
    what: "unknown key, near one",
    text: line(14, "  wdth: 12 nm"),
    message: 'a.yaml:14:3: packet.wdth: unknown key; did you mean "width"?',
  },
  {
    what: "unknown key in a layer",
    text: line(8, "      hieght: 0.30 eV"),
    message: 'a.yaml:8:7: potential.layers[0].hieght: unknown key; did you mean "height"?',
  },
  {
    what: "unknown key, near none",
    text: line(16, "  accuracy: 1e-6", "  colour: red"),
    message: "a.yaml:17:3: numerics.colour: unknown key",
  },
  {
    what: "unknown section",
    text: line(15, "numeric:"),
    message: 'a.yaml:15:1: numeric: unknown key; did you mean "numerics"?',
  },
  {
    what: "key of a section at the top",
    text: line(1, "title: T", "energy: 0.15 eV"),
    message: 'a.yaml:2:1: energy: unknown key; did you mean "packet.energy"?',
  },
  {
    what: "key in other spelling",
    text: line(16, "  time_step: 1 fs"),
    message: 'a.yaml:16:3: numerics.time_step: unknown key; did you mean "timeStep"?',
  },
  {
    what: "center of layers",
    text: line(5, "  shape: layers", "  center: 3 nm"),
    message: "a.yaml:6:3: potential.center: unknown key",
  },
  {
    what: "missing energy",
    text: line(13),
    message: 'a.yaml:12:1: packet.energy: missing; an energy of zero or more is needed, such as "0.15 eV"',
  },
  {
    what: "missing height of a layer",
    text: line(11),
    message: 'a.yaml:10:7: potential.layers[1].height: missing; an energy is needed, such as "0.30 eV"',
  },
  {
    what: "missing title",
    text: line(1),
    message: "a.yaml:1:1: title: missing; a title is needed: one line of text",
  },
  {
    what: "missing potential",
    text: "title: T\npacket: { energy: 0.15 eV, width: 12 nm }\n",
    message:
      'a.yaml:1:1: potential: missing; a map with the key shape (or use) is needed, such as { shape: rectangular, height: "0.3 eV", width: "5 nm" }',
  },
  {
    what: "missing packet",
    text: "title: T\npotential: { shape: delta, strength: 0.5 eV nm }\n",
    message:
      "a.yaml:1:1: packet: missing; a map with the keys energy, width, energySpread, start, from is needed",
  },
  {
    what: "missing shape",
    text: "title: T\npotential: { height: 0.3 eV }\npacket: { energy: 0.2 eV, width: 9 nm }\n",
    message:
      "a.yaml:2:1: potential.shape: missing; the name of a shape is needed, or use with that of a ready-made potential",
  },
  {
    what: "mistyped shape key",
    text: line(5, "  shpae: layers"),
    message: 'a.yaml:5:3: potential.shpae: unknown key; did you mean "shape"?',
  },
  {
    what: "key given twice",
    text: line(14, "  width: 12 nm", "  width: 13 nm"),
    message: "a.yaml:15:3: packet.width: the key is given twice in one map",
  },
  {
    what: "neither width nor energySpread",
    text: line(14),
    message:
      'a.yaml:12:1: packet.width: missing; either width, such as "12 nm", or energySpread, such as "10 meV", is needed',
  },
  {
    what: "both width and energySpread",
    text: line(14, "  width: 12 nm", "  energySpread: 10 meV"),
    message:
      "a.yaml:15:3: packet.energySpread: either width or energySpread is needed, not both: each follows from the other",
  },
  // Shapes and lists.
  {
    what: "unknown shape, near one",
    text: step.replace("step", "setp"),
    message: 'a.yaml:2:21: potential.shape: no shape of that name: got "setp"; did you mean "step"?',
  },
  {
    what: "unknown shape, near none",
    text: step.replace("step", "pyramid"),
    message: 'a.yaml:2:21: potential.shape: no shape of that name: got "pyramid"',
  },
  {
    what: "shape is a number",
    text: step.replace("step", "7"),
    message: "a.yaml:2:21: potential.shape: no shape of that name: got 7",
  },
  {
    what: "empty layers",
    text: "title: T\npotential: { shape: layers, layers: [] }\npacket: { energy: 0.1 eV, width: 9 nm }\n",
    message: "a.yaml:2:37: potential.layers: a list with at least one entry is needed; got an empty list",
  },
  {
    what: "layers as a map",
    text: "title: T\npotential: { shape: layers, layers: { width: 2 nm, height: 1 eV } }\npacket: { energy: 0.1 eV, width: 9 nm }\n",
    message: "a.yaml:2:37: potential.layers: a list with at least one entry is needed; got a map of keys",
  },
  {
    what: "missing layers",
    text: "title: T\npotential: { shape: layers }\npacket: { energy: 0.1 eV, width: 9 nm }\n",
    message: "a.yaml:2:1: potential.layers: missing; a list with at least one entry is needed",
  },
  {
    what: "layer as a quantity",
    text: "title: T\npotential: { shape: layers, layers: [2 nm] }\npacket: { energy: 0.1 eV, width: 9 nm }\n",
    message:
      'a.yaml:2:38: potential.layers[0]: a map with the keys width, height, mass is needed; got "2 nm"',
  },
  {
    what: "potential as a text",
    text: "title: T\npotential: layers\npacket: { energy: 0.1 eV, width: 9 nm }\n",
    message:
      'a.yaml:2:12: potential: a map with the key shape (or use) is needed, such as { shape: rectangular, height: "0.3 eV", width: "5 nm" }; got "layers"',
  },
  {
    what: "packet as a list",
    text: "title: T\npotential: { shape: delta, strength: 1 eV nm }\npacket: [0.1 eV, 9 nm]\n",
    message:
      "a.yaml:3:9: packet: a map with the keys energy, width, energySpread, start, from is needed; got a list",
  },
  {
    what: "contradiction that the shape finds",
    text: "title: T\npotential: { shape: delta, strength: 0 eV nm }\npacket: { energy: 0.1 eV, width: 9 nm }\n",
    message: "a.yaml:2:38: potential.strength: a strength other than zero is needed",
  },
  {
    what: "ready-made potential without a library",
    text: "title: T\npotential: { use: oxide }\npacket: { energy: 0.1 eV, width: 9 nm }\n",
    message: 'a.yaml:2:19: potential.use: no ready-made potential of that name: got "oxide"',
  },
  // The packet and the levels.
  {
    what: "energy below the right level",
    text: step,
    message:
      'a.yaml:3:19: packet.energy: an energy above 0.3 eV is needed, because the right level of the potential lies 0.3 eV above the left one; got "0.2 eV"',
  },
  {
    what: "energy at the right level",
    text: step.replace("0.2 eV", "0.3 eV"),
    message:
      'a.yaml:3:19: packet.energy: an energy above 0.3 eV is needed, because the right level of the potential lies 0.3 eV above the left one; got "0.3 eV"',
  },
  {
    what: "energy below the left level, from the right",
    text: step.replace("0.3 eV", "-0.3 eV").replace("12 nm", "12 nm, from: right"),
    message:
      'a.yaml:3:19: packet.energy: an energy above 0.3 eV is needed, because the left level of the potential lies 0.3 eV above the right one; got "0.2 eV"',
  },
  {
    what: "zero energy",
    text: line(13, "  energy: 0 eV"),
    message: 'a.yaml:13:11: packet.energy: an energy above zero is needed, such as "0.15 eV"; got "0 eV"',
  },
  {
    what: "negative energy",
    text: line(13, "  energy: -0.1 eV"),
    message:
      'a.yaml:13:11: packet.energy: an energy of zero or more is needed, such as "0.15 eV"; got "-0.1 eV"',
  },
  {
    what: "zero energy with energySpread",
    text: "title: T\npotential: { shape: harmonic, quantum: 0.1 eV }\npacket: { energy: 0 eV, energySpread: 10 meV }\n",
    message:
      "a.yaml:3:25: packet.energySpread: at an energy of zero no width follows from energySpread; give width instead",
  },
  {
    what: "from neither side",
    text: line(14, "  width: 12 nm", "  from: below"),
    message: 'a.yaml:15:9: packet.from: "left" or "right" is needed; got "below"',
  },
  {
    what: "start inside",
    text: line(14, "  width: 12 nm", "  start: 3 nm"),
    message:
      'a.yaml:15:10: packet.start: a start left of the structure, below 0 nm, is needed, as the packet comes from the left; got "3 nm"',
  },
  {
    what: "start on the wrong side",
    text: line(14, "  width: 12 nm", "  from: right", "  start: -90 nm"),
    message:
      'a.yaml:16:10: packet.start: a start right of the structure, above 7.5 nm, is needed, as the packet comes from the right; got "-90 nm"',
  },
  // Numerics.
  {
    what: "absurd number of points",
    text: line(16, "  points: 1000000000"),
    message:
      "a.yaml:16:11: numerics.points: a whole number from 16 to 16777216 (2^24) is needed, such as 4096; got 1000000000",
  },
  {
    what: "too few points",
    text: line(16, "  points: 8"),
    message:
      "a.yaml:16:11: numerics.points: a whole number from 16 to 16777216 (2^24) is needed, such as 4096; got 8",
  },
  {
    what: "half a point",
    text: line(16, "  points: 4096.5"),
    message:
      "a.yaml:16:11: numerics.points: a whole number from 16 to 16777216 (2^24) is needed, such as 4096; got 4096.5",
  },
  {
    what: "points as text",
    text: line(16, '  points: "4096"'),
    message:
      'a.yaml:16:11: numerics.points: a whole number from 16 to 16777216 (2^24) is needed, such as 4096; got "4096"',
  },
  {
    what: "accuracy of one",
    text: line(16, "  accuracy: 1"),
    message:
      "a.yaml:16:13: numerics.accuracy: a relative accuracy from 1e-13 to below 0.5 is needed, such as 1e-6; got 1",
  },
  {
    what: "accuracy of zero",
    text: line(16, "  accuracy: 0"),
    message:
      "a.yaml:16:13: numerics.accuracy: a relative accuracy from 1e-13 to below 0.5 is needed, such as 1e-6; got 0",
  },
  {
    what: "accuracy beyond round-off",
    text: line(16, "  accuracy: 1e-14"),
    message:
      "a.yaml:16:13: numerics.accuracy: a relative accuracy from 1e-13 to below 0.5 is needed, such as 1e-6; got 1e-14",
  },
  {
    what: "odd order",
    text: line(16, "  order: 3"),
    message: "a.yaml:16:10: numerics.order: an order of 2, 4 or 6 is needed; got 3",
  },
  {
    what: "mistyped stepper",
    text: line(16, "  stepper: crank-nicholson"),
    message:
      'a.yaml:16:12: numerics.stepper: "split-operator", "crank-nicolson", "eigenstates" or "chebyshev" is needed; got "crank-nicholson"; did you mean "crank-nicolson"?',
  },
  {
    what: "unknown boundary",
    text: line(16, "  boundary: open"),
    message: 'a.yaml:16:13: numerics.boundary: "closed" is needed; got "open"',
  },
  {
    what: "negative time step",
    text: line(16, "  timeStep: -1 fs"),
    message: 'a.yaml:16:13: numerics.timeStep: a time above zero is needed, such as "0.5 fs"; got "-1 fs"',
  },
  {
    what: "step as a time",
    text: line(16, "  step: 1 fs"),
    message: 'a.yaml:16:9: numerics.step: a length above zero is needed, such as "0.1 nm"; "1 fs" is a time',
  },
  // Titles.
  {
    what: "title as a number",
    text: line(1, "title: 2026"),
    message: "a.yaml:1:8: title: one line of text, 1 to 200 characters, is needed; got 2026",
  },
  {
    what: "empty title",
    text: line(1, 'title: ""'),
    message: 'a.yaml:1:8: title: one line of text, 1 to 200 characters, is needed; got ""',
  },
  {
    what: "title of two lines",
    text: line(1, 'title: "a\\nb"'),
    message: 'a.yaml:1:8: title: one line of text, 1 to 200 characters, is needed; got "a b"',
  },
  // Text that is no design.
  { what: "empty file", text: "", message: "a.yaml: the file is empty" },
  { what: "blank file", text: " \n\n", message: "a.yaml: the file is empty" },
  { what: "comments alone", text: "# nothing yet\n", message: "a.yaml: the file holds nothing but comments" },
  {
    what: "list at the top",
    text: "- title: T\n",
    message:
      "a.yaml:1:1: a map with the keys title, potential and packet is needed at the top level; got a list",
  },
  {
    what: "text at the top",
    text: "just a line\n",
    message:
      'a.yaml:1:1: a map with the keys title, potential and packet is needed at the top level; got "just a line"',
  },
  { what: "binary", text: "\u0000\u0001\u0002", message: "a.yaml: the file is not text in UTF-8" },
  { what: "wrong encoding", text: "title: \ufffdxide\n", message: "a.yaml: the file is not text in UTF-8" },
  {
    what: "tab as indentation",
    text: "title: T\npacket:\n\tenergy: 0.1 eV\n",
    message: "a.yaml:3:1: a tab stands where only spaces may indent",
  },
  {
    what: "unclosed quote",
    text: 'title: "T\n',
    message: "a.yaml:2:1: not readable as YAML: missing closing quote",
  },
  {
    what: "unclosed bracket",
    text: "title: T\npacket: { energy: 0.1 eV\n",
    message:
      "a.yaml:3:1: not readable as YAML: flow map in block collection must be sufficiently indented and end with a }",
  },
  {
    what: "bad indentation",
    text: "title: T\npacket:\n  energy: 0.1 eV\n width: 9 nm\n",
    message: "a.yaml:4:1: not readable as YAML: all mapping items must start at the same column",
  },
  {
    what: "colon in a plain text",
    text: "title: Barrier: revision C\n",
    message: "a.yaml:1:8: not readable as YAML: nested mappings are not allowed in compact mappings",
  },
  {
    what: "several documents",
    text: `${RIGHT}---\n${RIGHT}`,
    message: "a.yaml:17:1: a second document begins here; one file holds one design",
  },
  {
    what: "alias without anchor",
    text: line(14, "  width: *w"),
    message: "a.yaml:14:10: this alias has no anchor to stand for",
  },
  {
    what: "aliases that multiply",
    text: bomb,
    message: "a.yaml: too many aliases: they expand to more than a design can hold",
  },
  {
    what: "unknown tag",
    text: line(14, "  width: !length 12 nm"),
    message: "a.yaml:14:10: not readable as YAML: unresolved tag: !length",
  },
  {
    what: "too large",
    text: `# ${"x".repeat(1_000_000)}\n`,
    message: "a.yaml: the file is too large: 1000003 characters, 1000000 at most",
  },
  {
    what: "nested too deeply in brackets",
    text: `title: ${"[".repeat(100_000)}\n`,
    message: "a.yaml:1:1: nested too deeply: 60 levels at most",
  },
  {
    what: "nested too deeply in dashes",
    text: `${"- ".repeat(100_000)}a\n`,
    message: "a.yaml:1:1: nested too deeply: 60 levels at most",
  },
  {
    what: "broken JSON",
    text: '{ "title": "T", "packet": { "energy": "0.1 eV" }\n',
    message: "a.yaml:2:1: not readable as YAML: flow map must end with a }",
  },
  // Options.
  {
    what: "--set of a bare number",
    text: RIGHT,
    set: ["packet.width=5"],
    message:
      '--set packet.width=5: packet.width: a length above zero is needed, such as "12 nm"; got 5 without a unit: add pm, nm, um, mm, Å, angstrom, m or bohr',
  },
  {
    what: "--set of an unknown key",
    text: RIGHT,
    set: ["packet.wdth=5 nm"],
    message: '--set packet.wdth=5 nm: packet.wdth: unknown key; did you mean "width"?',
  },
  {
    what: "--set without value",
    text: RIGHT,
    set: ["packet.width"],
    message: '--set packet.width: a path, "=" and a value are needed',
  },
  {
    what: "--set of an empty value",
    text: RIGHT,
    set: ["packet.width="],
    message:
      '--set packet.width=: packet.width: a length above zero is needed, such as "12 nm"; got an empty text',
  },
  {
    what: "--set of no path",
    text: RIGHT,
    set: ["packet..width=5 nm"],
    message:
      '--set packet..width=5 nm: "packet..width" is no path of a value, such as potential.layers[1].width',
  },
  {
    what: "--set beyond a list",
    text: RIGHT,
    set: ["potential.layers[5].width=5 nm"],
    message:
      "--set potential.layers[5].width=5 nm: potential.layers[5].width: potential.layers has 2 entries, so [5] is out of reach: the last is [1]",
  },
  {
    what: "--set into a list without index",
    text: RIGHT,
    set: ["potential.layers.width=5 nm"],
    message:
      "--set potential.layers.width=5 nm: potential.layers.width: potential.layers is a list: write potential.layers[0].width for its first entry",
  },
  {
    what: "--set below a quantity",
    text: RIGHT,
    set: ["packet.energy.mean=5 eV"],
    message:
      "--set packet.energy.mean=5 eV: packet.energy.mean: packet.energy has no keys, so there is no mean in it",
  },
  {
    what: "--set of a broken list",
    text: RIGHT,
    set: ["potential.layers=[{ width: 1 nm"],
    message:
      "--set potential.layers=[{ width: 1 nm: potential.layers: not readable as a YAML value: Flow map in block collection must be sufficiently indented and end with a }",
  },
  {
    what: "--set that makes a list where none belongs",
    text: step,
    set: ["potential.layers[0].width=5 nm"],
    message: "--set potential.layers[0].width=5 nm: potential.layers: unknown key",
  },
  {
    what: "--set that leaves out a part",
    text: "title: T\npotential: { shape: delta, strength: 1 eV nm }\n",
    set: ["packet.width=5 nm"],
    message:
      '--set packet.width=5 nm: packet.energy: missing; an energy of zero or more is needed, such as "0.15 eV"',
  },
  {
    what: "--accuracy",
    text: RIGHT,
    accuracy: 2,
    message:
      "--accuracy 2: numerics.accuracy: a relative accuracy from 1e-13 to below 0.5 is needed, such as 1e-6; got 2",
  },
  {
    what: "--stepper",
    text: RIGHT,
    stepper: "split",
    message:
      '--stepper split: numerics.stepper: "split-operator", "crank-nicolson", "eigenstates" or "chebyshev" is needed; got "split"; did you mean "split-operator"?',
  },
  {
    what: "--order",
    text: RIGHT,
    order: 5,
    message: "--order 5: numerics.order: an order of 2, 4 or 6 is needed; got 5",
  },
];
