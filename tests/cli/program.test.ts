import { readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { root, workplace } from "./run.js";

const { postern } = workplace();
const manifest = JSON.parse(readFileSync(join(root, "package.json"), "utf8"));
const COMMANDS = ["estimate", "crosscheck", "spectrum", "map", "validate", "potentials"];
const LIST =
  'Commands: estimate, crosscheck, spectrum, map, validate, potentials. Run "postern --help" for what they do.';

describe("postern", () => {
  it("prints its version", () => {
    expect(postern("--version")).toEqual({ code: 0, out: `${manifest.version}\n`, err: "" });
  });

  it("shows what it can do", () => {
    const { code, out, err } = postern("--help");
    expect({ code, err }).toEqual({ code: 0, err: "" });
    expect(out).toMatchInlineSnapshot(`
      "Usage: postern [options] [command]

      How much of a wavepacket gets through a one-dimensional barrier, with an error bound that holds.

      Options:
        --version                    print the version
        --trace                      with an error, show where in the program it came up
        -h, --help                   show this help

      Commands:
        estimate [options] <FILE>    transmission and reflection with bounds and a verdict
        crosscheck [options] <FILE>  both steppers and a stationary witness, side by side
        spectrum [options] <FILE>    transmission against energy, with a bound at each
        map [options] <FILE>         the density over space and time as a figure
        validate [options] <FILE>    the design in full, with what is chosen automatically
        potentials [options] [NAME]  the ready-made potentials and the shapes, or one of them in full

      A design is a short YAML or JSON file with title, particle, potential and packet.
      Exit codes: 0 done, 1 fault of the program, 2 wrong use or design, 3 done but doubtful, 130 stopped.
      "
    `);
  });

  it("starts as a program of its own", () => {
    expect(readFileSync(join(root, manifest.bin.postern), "utf8")).toMatch(/^#!\/usr\/bin\/env node\n/);
  });
});

describe("postern COMMAND --help", () => {
  it.each(COMMANDS)("%s: usage, options and examples within 100 columns", (command) => {
    const { code, out, err } = postern(command, "--help");
    expect({ code, err }).toEqual({ code: 0, err: "" });
    expect(out).toMatch(new RegExp(`^Usage: postern ${command} `));
    expect(out).toMatch(new RegExp(`^Examples:\n  postern ${command}`, "m"));
    expect(out.split("\n").filter((line) => line.length > 100)).toEqual([]);
    expect(postern(command, "-h").out).toBe(out);
  });

  it("names every option of estimate with its default", () => {
    expect(postern("estimate", "--help").out).toMatchInlineSnapshot(`
      "Usage: postern estimate [options] <FILE>

      Computes how much of the packet gets through and how much comes back, each with a bound on its
      error, and says whether the answer can be trusted. Ends with 0 when it can, with 3 when it is
      doubtful.

      Arguments:
        FILE                design file

      Options:
        --out <DIR>         also write summary.json, series.csv and map.png into this folder
        --json              print one JSON document instead of text
        --set <PATH=VALUE>  change a value of the design, as "packet.energy=0.2 eV"; repeatable
        --accuracy <R>      relative accuracy of the transmission (default: 1e-6)
        --stepper <NAME>    one of split-operator, crank-nicolson, eigenstates, chebyshev (default: chosen
                            by the design)
        --order <N>         order in the time step: 2, 4, 6 (split-operator); 2, 4, 6 (crank-nicolson)
        -h, --help          show this help

      Global Options:
        --version           print the version
        --trace             with an error, show where in the program it came up

      Examples:
        postern estimate blocking.yaml
        postern estimate blocking.yaml --out results
        postern estimate blocking.yaml --set "potential.layers[0].width=3 nm" --accuracy 1e-9
        postern estimate blocking.yaml --json
      "
    `);
  });
});

const WRONG_USE: readonly (readonly [args: readonly string[], lines: readonly string[]])[] = [
  [[], ["postern: a command is needed", LIST]],
  [["frobnicate"], ['postern: unknown command "frobnicate"', LIST]],
  [["estimat"], ['postern: unknown command "estimat"; did you mean "estimate"?', LIST]],
  [["sweep"], ['postern: unknown command "sweep"', LIST]],
  [["--jsn"], ['postern: unknown option "--jsn"', LIST]],
  [
    ["estimate"],
    ['postern: missing required argument "FILE"', 'Run "postern estimate --help" for what it takes.'],
  ],
  [
    ["estimate", "a.yaml", "b.yaml"],
    [
      'postern: too many arguments for "estimate". Expected 1 argument but got 2.',
      'Run "postern estimate --help" for what it takes.',
    ],
  ],
  [
    ["estimate", "a.yaml", "--jsno"],
    [
      'postern: unknown option "--jsno"; did you mean "--json"?',
      'Run "postern estimate --help" for what it takes.',
    ],
  ],
  [
    ["estimate", "a.yaml", "--out"],
    ['postern: option "--out <DIR>" argument missing', 'Run "postern estimate --help" for what it takes.'],
  ],
];

describe("wrong use", () => {
  it.each(WRONG_USE)("%j", (args, lines) => {
    expect(postern(...args)).toEqual({ code: 2, out: "", err: `${lines.join("\n")}\n` });
  });
});
