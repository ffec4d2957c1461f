import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { parse } from "yaml";
import type { Potential } from "../../src/potentials/potential.js";
import { shapeNamed } from "../../src/potentials/registry.js";
import type { ParameterValues } from "../../src/potentials/shape.js";
import { sketch } from "../../src/potentials/sketch.js";
import { parseQuantity, type QuantityKind } from "../../src/units/quantity.js";
import {
  delta,
  eckart,
  packetMean,
  type Slab,
  sech2,
  slabs,
  smoothStep,
  type Transmission,
} from "./closed-forms.js";

/** A ready-made potential as its file has it; the format is described in src/design/library-format.ts. */
interface Entry {
  name: string;
  title: string;
  summary: string;
  source: string;
  particle: { mass: string };
  parameters?: Record<string, string | string[]>;
  potential: Record<string, unknown> & { shape: string };
  reference?: {
    energy: string;
    width?: string;
    mass?: string;
    transmission: number;
    error?: number;
    source: string;
  }[];
}

const FOLDER = new URL("../../potentials/", import.meta.url);
const files = readdirSync(FOLDER).filter((file) => file.endsWith(".yaml"));
const texts = new Map(files.map((file) => [file, readFileSync(new URL(file, FOLDER), "utf8")]));
const entries = files.map((file) => [file, parse(texts.get(file) as string) as Entry] as const);

/** Reads the quantities of a potential by the shape's own list of parameters; unknown keys fail. */
function internalValues(potential: Entry["potential"]): ParameterValues {
  const { shape, ...rest } = potential;
  const definition = shapeNamed(shape);
  if (definition === undefined) throw new Error(`unknown shape ${shape}`);
  return Object.fromEntries(
    Object.entries(rest).map(([key, value]) => {
      const parameter = definition.parameters[key];
      if (parameter === undefined) throw new Error(`${shape} has no parameter ${key}`);
      if (parameter.kind !== "list")
        return [key, parseQuantity(value, parameter.kind, { range: parameter.range })];
      const list = (value as Record<string, string>[]).map((record) =>
        Object.fromEntries(
          Object.entries(record).map(([field, text]) => {
            const { kind, range } = parameter.fields[field];
            return [field, parseQuantity(text, kind, { range })];
          }),
        ),
      );
      return [key, list];
    }),
  );
}

function make(potential: Entry["potential"], mass: number): Potential {
  const definition = shapeNamed(potential.shape);
  if (definition === undefined) throw new Error(potential.shape);
  return definition.build(internalValues(potential), mass);
}

/** The transmission of a potential by a route of its own, from the values in the file. */
function closedForm({ potential }: Entry): Transmission | undefined {
  const values = internalValues(potential) as Record<string, number>;
  const { height, width } = values;
  switch (potential.shape) {
    case "rectangular":
      return slabs([values as unknown as Slab]);
    case "layers":
      return slabs(values.layers as unknown as Slab[]);
    case "sech2":
      return sech2(height, width);
    case "eckart":
      return eckart(height, values.drop ?? 0, width);
    case "step":
      return smoothStep(height, values.thickness);
    case "delta":
      return delta(values.strength);
    default:
      return undefined;
  }
}

/** Sets the value at a path such as layers[0].width, which must be there already, and returns the old one. */
function replace(target: unknown, path: string, value: (old: string) => string): string {
  const keys = path.split(/[.[\]]+/).filter((key) => key !== "");
  const last = keys.pop() as string;
  const parent = keys.reduce((node, key) => (node as Record<string, unknown>)[key], target) as Record<
    string,
    string
  >;
  const old = parent[last];
  expect(old, path).toBeTypeOf("string");
  parent[last] = value(old);
  return old;
}

describe("ready-made potentials", () => {
  it("are at least twelve", () => {
    expect(files.length).toBeGreaterThanOrEqual(12);
  });
});

describe.each(entries)("%s", (file, entry) => {
  const mass = parseQuantity(entry.particle.mass, "mass", { range: "positive" });

  it("says what it is and where its numbers come from", () => {
    expect(`${entry.name}.yaml`).toBe(file);
    expect(texts.get(file)).toMatch(/^# \S/);
    expect(entry.title.length).toBeGreaterThan(8);
    expect(entry.title.length).toBeLessThanOrEqual(60);
    expect(entry.summary.length).toBeGreaterThan(40);
    expect(entry.source).toMatch(/\(\d{4}\)|no source/);
  });

  it("builds and can be drawn", () => {
    const potential = make(entry.potential, mass);
    expect(potential.confining).toBe(false);
    expect(sketch(potential).length).toBeGreaterThan(10);
  });

  it("has named parameters that change it", () => {
    const names = Object.entries(entry.parameters ?? {});
    expect(names.length).toBeGreaterThan(0);
    const before = make(entry.potential, mass);
    for (const [name, places] of names) {
      const changed = structuredClone(entry.potential);
      const old = [places]
        .flat()
        .map((place) => replace(changed, place, (text) => text.replace(/^-?[\d.]+/, "0.1234")));
      expect(new Set(old).size, `the places of ${name} start from one value`).toBe(1);
      const after = make(changed, mass);
      const differs =
        [-1, -0.06, 0.005, 0.0617, 1, 3.1, 7, 8, 9.3].some(
          (x) => after.value(x) !== before.value(x) || after.mass(x) !== before.mass(x),
        ) || after.cellAverage(-1, 1) !== before.cellAverage(-1, 1);
      expect(differs, name).toBe(true);
    }
  });

  it("has reference values that a second route confirms", () => {
    const transmission = closedForm(entry);
    const references = entry.reference ?? [];
    expect(references.length > 0).toBe(transmission !== undefined);
    for (const reference of references) {
      const read = (text: string | undefined, kind: QuantityKind) =>
        text === undefined ? undefined : parseQuantity(text, kind, { range: "positive" });
      const energy = read(reference.energy, "energy") as number;
      const sigma = read(reference.width, "length");
      const m = read(reference.mass, "mass") ?? mass;
      const t = transmission as Transmission;
      const value = sigma === undefined ? t(energy, m) : packetMean(t, energy, m, sigma);
      // The file's own error, and the round-off of this route: some dozen operations on phases of up to a hundred.
      const limit = (reference.error ?? 0) + 1e-12 * value;
      expect(Math.abs(value - reference.transmission), reference.energy).toBeLessThanOrEqual(limit);
      expect(reference.source.length).toBeGreaterThan(10);
    }
  });
});
