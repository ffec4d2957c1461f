import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { z } from "zod";
import { describeDesign } from "../../src/design/describe.js";
import { designJsonSchema } from "../../src/design/json-schema.js";
import { readDesign } from "../../src/design/read-design.js";
import { RIGHT } from "./bad-designs.js";

type Sections = Record<string, Record<string, unknown>>;

describe("describeDesign", () => {
  test("writes a design out in full", () => {
    const { yaml, design } = describeDesign(RIGHT, { set: ["numerics.timeStep=0.5 fs"] });
    expect(yaml).toBe(`title: Blocking barrier
particle:
  mass: 0.067 m_e
potential:
  shape: layers
  layers:
    - width: 2.5 nm
      height: 0.3 eV
      mass: 0.092 m_e
    - width: 5 nm
      height: 0 eV
  bias: 0 V
packet:
  energy: 0.15 eV
  width: 12 nm
  from: left
numerics:
  timeStep: 0.5 fs
  accuracy: 0.000001
`);
    expect(design.packet).toEqual({ energy: "0.15 eV", width: "12 nm", from: "left" });
  });

  test("what it writes reads back as the same design, whatever the values", () => {
    const size = fc.double({ min: 1e-6, max: 1e6, noNaN: true });
    fc.assert(
      fc.property(
        size,
        size,
        size,
        fc.double({ min: -1e6, max: 1e6, noNaN: true }),
        (energy, width, mass, center) => {
          const text = JSON.stringify({
            title: "Any: title # of 'all' \"kinds\"",
            particle: { mass: `${mass} m_e` },
            potential: { shape: "gaussian", height: "1 meV", width: `${width} nm`, center: `${center} nm` },
            packet: { energy: `${energy} eV`, width: `${width} um` },
          });
          const written = describeDesign(text);
          const again = describeDesign(written.yaml);
          expect(again.yaml).toBe(written.yaml);
          expect(again.sha256).toBe(readDesign(text).sha256);
          expect(describeDesign(JSON.stringify(written.design)).sha256).toBe(written.sha256);
        },
      ),
      { numRuns: 100 },
    );
  });
});

describe("designJsonSchema", () => {
  const schema = designJsonSchema();
  /** The schema as JSON, read back as a validator. */
  const validator = (part: unknown) => z.fromJSONSchema(JSON.parse(JSON.stringify(part)));
  const { oneOf, ...packet } = (schema.properties as Record<string, Record<string, unknown>>).packet;
  // The validator does not combine oneOf with a closed list of keys, so the two are tried one after the other.
  const whole = validator({ ...schema, properties: { ...(schema.properties as object), packet } });
  const choice = validator({ oneOf });
  const accepts = (value: Record<string, unknown>): boolean =>
    whole.safeParse(value).success && choice.safeParse(value.packet).success;
  const right = () => structuredClone(describeDesign(RIGHT).design) as Sections;

  test("takes right designs", () => {
    expect(accepts(right())).toBe(true);
    expect(accepts({ ...right(), $schema: "design.schema.json" })).toBe(true);
    expect(accepts({ ...right(), potential: { use: "oxide", with: { height: "3 eV" } } })).toBe(true);
    expect(accepts({ ...right(), packet: { energy: "0.1 eV", energySpread: "1 meV" } })).toBe(true);
  });

  test.each([
    ["an unknown key", (d: Sections) => Object.assign(d.packet, { wdth: "1 nm" })],
    ["a bare number", (d: Sections) => Object.assign(d.packet, { width: 5 })],
    ["a wrong unit", (d: Sections) => Object.assign(d.packet, { width: "5 eV" })],
    ["a negative width", (d: Sections) => Object.assign(d.packet, { width: "-5 nm" })],
    ["an unknown shape", (d: Sections) => Object.assign(d.potential, { shape: "pyramid" })],
    ["no layers", (d: Sections) => Object.assign(d.potential, { layers: [] })],
    ["an odd order", (d: Sections) => Object.assign(d, { numerics: { order: 3 } })],
    ["too many points", (d: Sections) => Object.assign(d, { numerics: { points: 1e9 } })],
    ["neither width nor energySpread", (d: Sections) => delete d.packet.width],
    ["both width and energySpread", (d: Sections) => Object.assign(d.packet, { energySpread: "1 meV" })],
    ["no packet", (d: Partial<Sections>) => delete d.packet],
  ])("refuses %s", (_, spoil) => {
    const design = right();
    spoil(design);
    expect(accepts(design)).toBe(false);
  });

  test("describes every key that can be typed", () => {
    const walk = (node: unknown, path: string): void => {
      if (typeof node !== "object" || node === null) return;
      const { properties } = node as {
        properties?: Record<string, { description?: string; const?: string }>;
      };
      for (const [key, value] of Object.entries(properties ?? {})) {
        const described = value.description ?? value.const ?? (value as { anyOf?: unknown }).anyOf;
        expect(described, `${path}.${key}`).toBeDefined();
      }
      for (const [key, value] of Object.entries(node)) if (key !== "oneOf") walk(value, `${path}.${key}`);
    };
    walk(schema, "");
    expect(Object.keys(schema.properties as object)).toEqual([
      "$schema",
      "title",
      "particle",
      "potential",
      "packet",
      "numerics",
    ]);
  });
});
