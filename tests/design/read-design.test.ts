import { createHash } from "node:crypto";
import { describe, expect, test } from "vitest";
import { readDesign } from "../../src/design/read-design.js";
import { shapes } from "../../src/potentials/registry.js";
import { ATOMIC_MASS, ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { RIGHT } from "./bad-designs.js";

const RECTANGULAR = `title: Contract
particle: { mass: 0.067 m_e }
potential: { shape: rectangular, height: 0.3 eV, width: 5 nm }
packet: { energy: 0.15 eV, width: 10 nm }
`;

describe("readDesign", () => {
  test("gives internal units and leaves open what the file leaves open", () => {
    const design = readDesign(RIGHT);
    expect(design.title).toBe("Blocking barrier");
    expect(design.sha256).toMatch(/^[0-9a-f]{64}$/);
    expect(design.particleMass).toBe(0.067 * ELECTRON_MASS);
    expect(design.packet).toEqual({ energy: 0.15, width: 12, from: "left" });
    expect(design.numerics).toEqual({ accuracy: 1e-6 });
    expect(design.potential.faces).toEqual([0, 7.5]);
    expect(design.potential.value(1)).toBe(0.3);
    expect(design.potential.mass(1)).toBe(0.092 * ELECTRON_MASS);
  });

  test("title, potential and packet alone are enough; the mass is then that of the electron", () => {
    const design = readDesign(RECTANGULAR.replace(/particle.*\n/, ""));
    expect(design.particleMass).toBe(ELECTRON_MASS);
    expect(design.numerics.accuracy).toBe(1e-6);
  });

  test("takes every numeric that can be forced", () => {
    const numerics = `numerics: { stepper: crank-nicolson, order: 2, step: 1 Å, points: 4096, length: 0.4 um, timeStep: 500 as,
      end: 0.3 ps, boundary: closed, accuracy: 1e-9 }`;
    expect(readDesign(RECTANGULAR + numerics).numerics).toEqual({
      stepper: "crank-nicolson",
      order: 2,
      step: 0.1,
      points: 4096,
      length: 400,
      timeStep: 0.5,
      end: 300,
      boundary: "closed",
      accuracy: 1e-9,
    });
  });

  test("reads JSON, with tabs and a $schema key", () => {
    const value = {
      $schema: "./node_modules/postern/dist/design.schema.json",
      title: "Contract",
      particle: { mass: "0.067 m_e" },
      potential: { shape: "rectangular", height: "0.3 eV", width: "5 nm" },
      packet: { energy: "0.15 eV", width: "10 nm" },
    };
    expect(readDesign(JSON.stringify(value, undefined, "\t")).sha256).toBe(readDesign(RECTANGULAR).sha256);
  });

  test("expands anchors and aliases", () => {
    const text = RIGHT.replace("width: 2.5 nm", "width: &w 2.5 nm").replace("width: 5.0 nm", "width: *w");
    expect(readDesign(text).potential.faces).toEqual([0, 5]);
  });

  test("center moves a shape", () => {
    const potential = readDesign(RECTANGULAR.replace("width: 5 nm", "width: 5 nm, center: 20 nm")).potential;
    expect(potential.interfaces).toEqual([17.5, 22.5]);
    expect(potential.faces).toEqual([17.5, 22.5]);
  });

  test("energySpread gives the width hbar^2 k0 / (2 m spread)", () => {
    const { packet } = readDesign(RECTANGULAR.replace("width: 10 nm", "energySpread: 10 meV"));
    const mass = 0.067 * ELECTRON_MASS;
    // From the other end: the spread of k is 1/(2 width), and dE/dk is hbar times the velocity.
    const velocity = Math.sqrt((2 * 0.15) / mass);
    expect((HBAR * velocity) / (2 * packet.width)).toBeCloseTo(0.01, 14);
  });

  test("a confining potential takes a packet at rest, anywhere", () => {
    const design = readDesign(
      "title: Well\nparticle: { mass: 1 u }\npotential: { shape: harmonic, quantum: 1 meV }\npacket: { energy: 0 eV, width: 1 nm, start: 3 nm }\n",
    );
    expect(design.particleMass).toBe(ATOMIC_MASS);
    expect(design.packet).toEqual({ energy: 0, width: 1, from: "left", start: 3 });
  });

  test("a packet may come down a step that it could not climb", () => {
    const step =
      "title: Step\npotential: { shape: step, height: 0.3 eV }\npacket: { energy: 0.1 eV, width: 9 nm, from: right }\n";
    expect(readDesign(step).packet.from).toBe("right");
  });

  test.each(shapes.map((shape) => [shape.name, shape] as const))(
    "reads the shape %s from its own examples",
    (name, shape) => {
      const parameters = Object.entries(shape.parameters).map(([key, parameter]) => {
        if (parameter.kind !== "list") return [key, parameter.example];
        return [
          key,
          [
            Object.fromEntries(
              Object.entries(parameter.fields).map(([field, { example }]) => [field, example]),
            ),
          ],
        ];
      });
      const design = readDesign(
        JSON.stringify({
          title: name,
          potential: { shape: name, ...Object.fromEntries(parameters) },
          packet: { energy: "50 eV", width: "12 nm" },
        }),
      );
      expect(design.potential.shape).toBe(name);
    },
  );
});

describe("overrides", () => {
  const read = (...set: string[]) => readDesign(RIGHT, { set });

  test("replace and add values, the later one winning", () => {
    expect(read("packet.energy=0.2 eV").packet.energy).toBe(0.2);
    expect(read("packet.energy=0.2 eV", "packet.energy=0.1 eV").packet.energy).toBe(0.1);
    expect(read("potential.layers[1].width=3 nm").potential.faces).toEqual([0, 5.5]);
    expect(
      read("potential.layers[2].width=1 nm", "potential.layers[2].height=0.3 eV").potential.interfaces,
    ).toEqual([0, 2.5, 7.5, 8.5]);
    expect(read("packet.start=-90 nm").packet.start).toBe(-90);
    expect(read("numerics.points=4096").numerics.points).toBe(4096);
    expect(read("title=Barrier: 2").title).toBe("Barrier: 2");
    expect(read("title=2026").title).toBe("2026");
    expect(read("potential={ shape: delta, strength: 1 eV nm }").potential.shape).toBe("delta");
    expect(read("potential.layers=[{ width: 1 nm, height: 0.1 eV }]").potential.interfaces).toEqual([0, 1]);
  });

  test("make the sections that they need", () => {
    const design = readDesign(RECTANGULAR.replace(/particle.*\n/, ""), {
      set: ["particle.mass=0.1 m_e", "numerics.end=90 fs"],
    });
    expect(design.particleMass).toBe(0.1 * ELECTRON_MASS);
    expect(design.numerics.end).toBe(90);
  });

  test("options of their own go over the file and over --set", () => {
    const options = { set: ["numerics.accuracy=1e-4"], accuracy: 1e-3, stepper: "split-operator", order: 4 };
    expect(readDesign(RIGHT, options).numerics).toEqual({
      accuracy: 1e-3,
      stepper: "split-operator",
      order: 4,
    });
  });
});

describe("the hash", () => {
  const hash = (text: string, set: string[] = []) => readDesign(text, { set }).sha256;

  test("is the same for the same problem in other words", () => {
    const same = RIGHT.replace("0.30 eV", "300 meV")
      .replace("12 nm", "120 Å")
      .replace("numerics:\n  accuracy: 1e-6\n", "");
    expect(hash(same)).toBe(hash(RIGHT));
    expect(hash(RIGHT, ["packet.energy=150 meV"])).toBe(hash(RIGHT));
  });

  test("differs for another problem", () => {
    const other = [
      "packet.energy=0.1500000001 eV",
      "title=Other",
      "packet.from=right",
      "numerics.accuracy=1e-7",
      "particle.mass=0.068 m_e",
    ];
    expect(new Set([hash(RIGHT), ...other.map((set) => hash(RIGHT, [set]))]).size).toBe(other.length + 1);
  });

  test("is that of the canonical form: sorted JSON, usual units, defaults filled in", () => {
    const canonical =
      '{"numerics":{"accuracy":0.000001},"packet":{"energy":"0.15 eV","from":"left","width":"10 nm"},' +
      '"particle":{"mass":"0.067 m_e"},"potential":{"center":"0 nm","height":"0.3 eV","shape":"rectangular","width":"5 nm"},' +
      '"title":"Contract"}';
    expect(hash(RECTANGULAR)).toBe(createHash("sha256").update(canonical).digest("hex"));
  });
});

test("a design is read in a few milliseconds", () => {
  readDesign(RIGHT);
  const start = performance.now();
  for (let i = 0; i < 50; i++) readDesign(RIGHT);
  // Measured: 1 to 2 ms; the bound leaves room for a busy machine.
  expect((performance.now() - start) / 50).toBeLessThan(20);
});
