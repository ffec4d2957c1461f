import { readFileSync } from "node:fs";
import { PNG } from "pngjs";
import { describe, expect, it } from "vitest";
import { RECTANGULAR, workplace } from "./run.js";

const { path, postern, write } = workplace();
write("rect.yaml", RECTANGULAR);

describe("postern map", () => {
  it("writes a PNG and prints its name", () => {
    expect(postern("map", "rect.yaml", "--out", "figures/map.png")).toEqual({
      code: 0,
      out: "figures/map.png\n",
      err: "",
    });
    const { width, height } = PNG.sync.read(readFileSync(path("figures/map.png")));
    expect([width, height]).toEqual([1890, 1323]);
  });

  it("draws the part of space and time, at the size and on the scale that are asked for", () => {
    const window = ["--from", "-40 nm", "--to", "30 nm", "--from", "90 fs", "--to", "0.2 ps"];
    const size = ["--width", "80 mm", "--height", "60 mm"];
    const options = [...window, ...size, "--scale", "log", "--json"];
    const { code, out, err } = postern("map", "rect.yaml", "--out", "part.png", ...options);
    expect({ code, err }).toEqual({ code: 0, err: "" });
    expect(JSON.parse(out)).toMatchObject({
      files: ["part.png"],
      window: { x_from_nm: -40, x_to_nm: 30, t_from_fs: 90, t_to_fs: 200 },
      errors: { timeStep: expect.any(Number), spacing: expect.any(Number), transmission: expect.any(Number) },
    });
    const { width, height } = PNG.sync.read(readFileSync(path("part.png")));
    expect([width, height]).toEqual([945, 709]);
  });

  it("writes an SVG that stands alone", () => {
    expect(postern("map", "rect.yaml", "--out", "map.svg", "--svg").code).toBe(0);
    const svg = readFileSync(path("map.svg"), "utf8");
    expect(svg.slice(0, 60)).toMatch(/^<\?xml version="1\.0"[^>]*\?>\n<svg /);
    // Tests of the parts alone, as a failure would print the whole file with its pixels.
    expect(/ width="160(?:\.\d+)?mm"/.test(svg)).toBe(true);
    expect(svg.includes("data:image/png;base64,")).toBe(true);
    expect(svg.includes("<title>Rectangular barrier</title>")).toBe(true);
  });

  it("shows a packet in a potential that lets nothing through", () => {
    const harmonic = "potential={ shape: harmonic, quantum: 20 meV }";
    const { code, err } = postern("map", "rect.yaml", "--set", harmonic, "--out", "harmonic.png");
    expect({ code, err }).toEqual({ code: 0, err: "" });
  });
});

const WRONG: readonly (readonly [args: readonly string[], first: string])[] = [
  [[], 'postern: required option "--out <FILE>" not specified'],
  [["--out", "map.gif"], 'postern: --out map.gif: a name that ends in .png or .svg is needed; got "map.gif"'],
  [
    ["--out", "m.png", "--svg"],
    'postern: --out m.png: with --svg a name that ends in .svg is needed; got "m.png"',
  ],
  [
    ["--out", "rect.yaml/m.png"],
    "postern: rect.yaml: this is a file, and a folder is needed; choose another name or remove it",
  ],
  [
    ["--out", "m.png", "--from", "5 eV"],
    'postern: --from 5 eV: a length for x or a time for t is needed, such as "-50 nm" or "100 fs"; "5 eV" is an energy',
  ],
  [
    ["--out", "m.png", "--to", "5"],
    'postern: --to 5: a length for x or a time for t is needed, such as "-50 nm" or "100 fs"; got 5 without a unit: add pm, nm, um, mm, Å, angstrom, m or bohr, or as, fs, ps, ns, us, ms or s',
  ],
  [
    ["--out", "m.png", "--from", "5 nm", "--from", "6 nm"],
    "postern: --from 6 nm: one place is enough, and one was given before",
  ],
  [
    ["--out", "m.png", "--from", "5 fs", "--to", "5 fs"],
    "postern: --to: a time after that of --from is needed",
  ],
  [
    ["--out", "m.png", "--from", "1 um"],
    "postern: --from, --to: nothing is left to show: an end left out is chosen near the structure and the encounter; give both ends",
  ],
  [
    ["--out", "m.png", "--width", "1 mm"],
    "postern: --width 1 mm: the width of a figure must lie between 50 and 1000 mm; got 1",
  ],
  [
    ["--out", "m.png", "--height", "112"],
    'postern: --height 112: a length above zero is needed, such as "160 mm"; got 112 without a unit: add pm, nm, um, mm, Å, angstrom, m or bohr',
  ],
  [
    ["--out", "m.png", "--scale", "cubic"],
    'postern: option "--scale <KIND>" argument "cubic" is invalid. Allowed choices are linear, log.',
  ],
];

describe("postern map with a wrong option", () => {
  it.each(WRONG)("%j", (args, first) => {
    const { code, out, err } = postern("map", "rect.yaml", ...args);
    expect(err.split("\n")).toEqual([first, expect.stringMatching(/^\S.*\S$/), ""]);
    expect({ code, out }).toEqual({ code: 2, out: "" });
  });
});
