import { readdirSync, readFileSync } from "node:fs";
import { PNG } from "pngjs";
import { describe, expect, it } from "vitest";
import { RECTANGULAR, RECTANGULAR_TRANSMISSION, workplace } from "./run.js";

const { path, postern, write } = workplace();
write("rect.yaml", RECTANGULAR);
write("wall.yaml", RECTANGULAR.replace("width: 5 nm }", "width: 3 nm, mass: 0.09 m_e }"));
write(
  "harmonic.yaml",
  RECTANGULAR.replace(/^potential.*$/m, "potential: { shape: harmonic, quantum: 20 meV }"),
);

interface Named {
  readonly name: string;
  readonly transmission: { readonly value: number; readonly error: number };
  readonly norm: { readonly drift: number };
}

const PATIENCE = 120_000;

describe("postern crosscheck", () => {
  it(
    "prints one document with both steppers, the witness and their differences, and exits 0 where they agree",
    () => {
      const { code, out, err } = postern("crosscheck", "rect.yaml", "--json", "--out", "results");
      expect(code).toBe(0);
      const names = ["crosscheck.json", "crosscheck.csv", "crosscheck.png"];
      expect(err).toBe(names.map((name) => `results/${name}\n`).join(""));
      const answer = JSON.parse(out);
      expect(answer).toMatchObject({
        design: { title: "Rectangular barrier", sha256: expect.stringMatching(/^[0-9a-f]{64}$/) },
        witness: {
          name: "stationary",
          transmission: { value: expect.any(Number), error: expect.any(Number) },
        },
        difference: { transmission: expect.any(Number), state: expect.any(Number) },
        agree: true,
        refused: [],
        version: "0.1.0",
      });
      expect(answer.steppers.map(({ name }: Named) => name)).toEqual(["crank-nicolson", "split-operator"]);
      for (const { transmission, name, norm } of answer.steppers as Named[]) {
        expect({
          name,
          apart: Math.abs(transmission.value - RECTANGULAR_TRANSMISSION) <= transmission.error,
        }).toEqual({
          name,
          apart: true,
        });
        expect(norm.drift).toBeLessThan(1e-9);
      }
      const witness = answer.witness.transmission;
      expect(Math.abs(witness.value - RECTANGULAR_TRANSMISSION)).toBeLessThanOrEqual(witness.error);
      const [a, b] = answer.steppers as Named[];
      expect(answer.difference.transmission).toBeCloseTo(
        Math.abs(a.transmission.value - b.transmission.value),
        15,
      );

      expect(readdirSync(path("results")).sort()).toEqual([...names].sort());
      const saved = JSON.parse(readFileSync(path("results/crosscheck.json"), "utf8"));
      expect(saved).toMatchObject({
        agree: true,
        steppers: answer.steppers,
        design: { full: { title: "Rectangular barrier" } },
      });
      const [header, ...rows] = readFileSync(path("results/crosscheck.csv"), "utf8").trimEnd().split("\n");
      expect(header.split(",").slice(0, 3)).toEqual([
        "time_fs",
        "crank_nicolson_transmission",
        "split_operator_transmission",
      ]);
      expect(rows).toHaveLength(answer.matched.instants);
      for (const row of rows) {
        const [, one, other] = row.split(",").map(Number);
        expect(Math.abs(one - other)).toBeLessThan(1e-4);
      }
      const { width, height } = PNG.sync.read(readFileSync(path("results/crosscheck.png")));
      expect([width, height]).toEqual([1890, 1984]);
    },
    PATIENCE,
  );

  it(
    "shows tables and a verdict in words, and says why a stepper is left out",
    () => {
      const { code, out, err } = postern("crosscheck", "wall.yaml");
      expect({ code, err }).toEqual({ code: 0, err: "" });
      expect(out.split("\n").every((line) => line.length <= 100)).toBe(true);
      expect(out).toMatch(/^crank-nicolson, order 2 +0\.\d+\(\d+\)(e-\d+)? /m);
      expect(out).toMatch(/^stationary witness +0\.\d+\(\d+\)/m);
      expect(out).toMatch(/^split-operator cannot do this design: .* one mass everywhere/m);
      expect(out).toMatch(/^ {2}passed {2}crank-nicolson, order 6 {2}time step +6 +5\.\d\d$/m);
      expect(out).toMatch(/^agree: crank-nicolson and the stationary witness, within their bounds;/m);
      expect(out).not.toMatch(/FAILED/);
    },
    PATIENCE,
  );
});

const WRONG: readonly (readonly [args: readonly string[], first: string])[] = [
  [
    ["rect.yaml", "--stepper", "crank-nicolson"],
    "postern: --stepper crank-nicolson: a crosscheck takes every stepper that can do the design",
  ],
  [
    ["rect.yaml", "--order", "4"],
    "postern: --order 4: a crosscheck takes every stepper that can do the design",
  ],
  [["rect.yaml", "--out", ""], "postern: --out: the name of a folder is needed"],
  [["rect.yaml", "--width", "80 mm"], "postern: --width: the figure is drawn with --out only"],
  [
    ["harmonic.yaml"],
    'postern: harmonic.yaml:3:12: potential: the harmonic potential confines the particle on both sides, so nothing is transmitted; use "postern map" to see the packet move',
  ],
  [[], 'postern: missing required argument "FILE"'],
];

describe("postern crosscheck with a wrong option", () => {
  it.each(WRONG)("%j", (args, first) => {
    const { code, out, err } = postern("crosscheck", ...args);
    expect(err.split("\n")).toEqual([first, expect.stringMatching(/^\S.*\S$/), ""]);
    expect({ code, out }).toEqual({ code: 2, out: "" });
  });
});
