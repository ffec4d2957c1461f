import { describe, expect, test } from "vitest";
import { describeDesign } from "../../src/design/describe.js";
import { designPathValue } from "../../src/design/path-value.js";
import { readDesign } from "../../src/design/read-design.js";
import { readLibraryEntry } from "../../src/design/use.js";
import { ELECTRON_MASS } from "../../src/units/constants.js";

const WALLS = `name: two-walls
title: Two walls
summary: A well between two equal walls.
source: common practice, no source
particle: { mass: 0.1 m_e }
parameters:
  walls: ["layers[0].width", "layers[2].width"]
  well: layers[1].width
potential:
  shape: layers
  layers:
    - { width: 2 nm, height: 0.3 eV }
    - { width: 4 nm, height: 0 eV }
    - { width: 2 nm, height: 0.3 eV }
reference:
  - { energy: 0.1 eV, transmission: 0.25, source: made up for this test }
  - { energy: 100 meV, width: 1 um, mass: 0.1 m_e, transmission: 0.2, error: 1.0e-3, source: made up for this test }
`;

const library = (text: string) => (name: string) =>
  name === "two-walls" || name === "./mine.yaml" ? { text, file: "lib/two-walls.yaml" } : undefined;

const design = (potential: string, rest = "") =>
  `title: T\npotential: { ${potential} }\npacket: { energy: 0.15 eV, width: 10 nm }\n${rest}`;

const options = { file: "a.yaml", library: library(WALLS), libraryNames: ["two-walls"] };
const read = (potential: string, set: string[] = [], rest = "") =>
  readDesign(design(potential, rest), { ...options, set });

describe("use", () => {
  test("takes the potential, and the mass that it is meant for unless the design has its own", () => {
    expect(read("use: two-walls").potential.interfaces).toEqual([0, 2, 6, 8]);
    expect(read("use: ./mine.yaml").particleMass).toBe(0.1 * ELECTRON_MASS);
    expect(read("use: two-walls", [], "particle: { mass: 1 m_e }").particleMass).toBe(ELECTRON_MASS);
    expect(read("use: two-walls", ["particle.mass=1 m_e"]).particleMass).toBe(ELECTRON_MASS);
  });

  test("with changes named parameters and keys of the potential", () => {
    expect(read("use: two-walls, with: { walls: 3 nm, well: 1 nm }").potential.interfaces).toEqual([
      0, 3, 4, 7,
    ]);
    expect(
      read("use: two-walls, with: { layers: [{ width: 1 nm, height: 1 eV }] }").potential.interfaces,
    ).toEqual([0, 1]);
  });

  test("--set reaches names, places and with", () => {
    for (const path of ["potential.walls", "potential.with.walls"]) {
      expect(read("use: two-walls", [`${path}=3 nm`]).potential.interfaces).toEqual([0, 3, 7, 10]);
    }
    expect(
      read("use: two-walls, with: { walls: 3 nm }", ["potential.layers[1].width=1 nm"]).potential.interfaces,
    ).toEqual([0, 3, 4, 7]);
    expect(
      read("shape: delta, strength: 1 eV nm", ["potential={ use: two-walls }"]).potential.interfaces,
    ).toEqual([0, 2, 6, 8]);
  });

  test("the same problem has the same hash, ready-made or written out", () => {
    const written = describeDesign(design("use: two-walls, with: { walls: 3 nm }"), options).yaml;
    expect(readDesign(written).sha256).toBe(read("use: two-walls, with: { walls: 3 nm }").sha256);
  });

  test.each([
    [
      "use: two-wals",
      'a.yaml:2:19: potential.use: no ready-made potential of that name: got "two-wals"; did you mean "two-walls"?',
    ],
    [
      "use: 7",
      "a.yaml:2:19: potential.use: the name of a ready-made potential, or the path of a file, is needed; got 7",
    ],
    [
      "use: two-walls, wiht: { well: 1 nm }",
      'a.yaml:2:30: potential.wiht: unknown key; did you mean "with"?',
    ],
    [
      "use: two-walls, height: 1 eV",
      'a.yaml:2:30: potential.height: not together with use: changes of a ready-made potential stand under "with"',
    ],
    ["use: two-walls, with: 3 nm", 'a.yaml:2:36: potential.with: a map of parameters is needed; got "3 nm"'],
    [
      "use: two-walls, with: { wals: 3 nm }",
      'a.yaml:2:38: potential.with.wals: unknown key; did you mean "walls"?',
    ],
    [
      "use: two-walls, with: { walls: 3 eV }",
      'a.yaml:2:45: potential.with.walls: a length above zero is needed, such as "2.5 nm"; "3 eV" is an energy',
    ],
  ])("%s is an error", (potential, message) => {
    expect(() => read(potential)).toThrow(message);
  });

  test("errors of options name them as they were typed", () => {
    expect(() => read("use: two-walls", ["potential.with.walls=-3 nm"])).toThrow(
      '--set potential.with.walls=-3 nm: potential.with.walls: a length above zero is needed, such as "2.5 nm"; got "-3 nm"',
    );
    expect(() => read("use: two-walls", ["potential.walls=-3 nm"])).toThrow(
      "--set potential.walls=-3 nm: potential.walls: ",
    );
  });

  test.each<[string, string, string]>([
    [
      "height: 0 eV",
      "height: 0",
      'lib/two-walls.yaml:13:30: potential.layers[1].height: an energy is needed, such as "0.30 eV"; got 0 without',
    ],
    ["summary:", "sumary:", 'lib/two-walls.yaml:3:1: sumary: unknown key; did you mean "summary"?'],
    ["title: Two walls\n", "", "lib/two-walls.yaml:1:1: title: a title is needed; got nothing"],
    [
      "layers[1].width",
      "layers[1]..width",
      "lib/two-walls.yaml:8:9: parameters.well: a place in the potential",
    ],
    [
      "layers[1].width",
      "layers[7].width",
      "lib/two-walls.yaml:8:9: parameters.well: potential.layers has 3 entries, so [7] is out of reach",
    ],
    [
      "name: two-walls",
      "name: Two Walls",
      "lib/two-walls.yaml:1:7: name: a name of lower-case letters, digits and hyphens is needed",
    ],
    [
      "transmission: 0.25",
      "transmission: 25",
      "lib/two-walls.yaml:16:37: reference[0].transmission: a probability from 0 to 1 is needed; got 25",
    ],
  ])("a file with %s -> %s is an error at its own place", (from, to, message) => {
    const broken = { ...options, library: library(WALLS.replace(from, to)) };
    expect(() => readDesign(design("use: two-walls, with: { well: 3 nm }"), broken)).toThrow(message);
  });
});

test("readLibraryEntry gives the entry with internal units", () => {
  const entry = readLibraryEntry({ text: WALLS, file: "lib/two-walls.yaml" });
  expect(entry.particle?.mass).toBe(0.1 * ELECTRON_MASS);
  expect(entry.parameters).toEqual({
    walls: [
      ["layers", 0, "width"],
      ["layers", 2, "width"],
    ],
    well: [["layers", 1, "width"]],
  });
  expect(entry.reference[1]).toEqual({
    energy: 0.1,
    width: 1000,
    mass: 0.1 * ELECTRON_MASS,
    transmission: 0.2,
    error: 1e-3,
    source: "made up for this test",
  });
});

describe("designPathValue", () => {
  const at = (path: string, potential = "use: two-walls, with: { walls: 30 Å }") =>
    designPathValue(design(potential), path, options);

  test.each([
    ["potential.with.walls", "length", 3, "30 Å", "Å"],
    ["potential.walls", "length", 3, "30 Å", "Å"],
    ["potential.layers[0].width", "length", 3, "30 Å", "Å"],
    ["potential.layers[1].width", "length", 4, "4 nm", "nm"],
    ["potential.bias", "voltage", 0, "0 V", "V"],
    ["packet.energy", "energy", 0.15, "0.15 eV", "eV"],
    ["particle.mass", "mass", 0.1 * ELECTRON_MASS, "0.1 m_e", "m_e"],
    ["numerics.accuracy", "number", 1e-6, "0.000001", ""],
  ])("%s", (path, kind, value, text, unit) => {
    expect(at(path)).toEqual({ path, kind, value, text, unit });
  });

  test("what has a default has it, and center is a path", () => {
    expect(at("potential.center", "shape: delta, strength: 1 eV nm")).toMatchObject({
      value: 0,
      text: "0 nm",
    });
  });

  test.each([
    [
      "packet.enrgy",
      'a.yaml: packet.enrgy: no quantity of the design has this path; did you mean "packet.energy"?',
    ],
    ["packet.from", "a.yaml: packet.from: no quantity of the design has this path"],
    ["potential.layers[1]", "a.yaml: potential.layers[1]: no quantity of the design has this path"],
    ["potential.layers[9].width", "a.yaml: potential.layers[9].width: the design leaves this value open"],
    ["numerics.step", "a.yaml: numerics.step: the design leaves this value open"],
    ["numerics.points", "a.yaml: numerics.points: the design leaves this value open"],
    ["packet energy", "a.yaml: packet energy: this is no path of a value"],
  ])("%s is refused", (path, message) => {
    expect(() => at(path)).toThrow(message);
  });
});
