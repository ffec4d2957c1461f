import { describe, expect, it } from "vitest";
import { shapeNamed, shapes } from "../../src/potentials/registry.js";
import type { QuantityParameter } from "../../src/potentials/shape.js";
import { parseQuantity } from "../../src/units/quantity.js";
import { MASS, samples } from "./samples.js";

const REQUIRED = ["rectangular", "layers", "step", "gaussian", "sech2", "eckart", "harmonic", "delta"];

describe("registry of shapes", () => {
  it("has the shapes that a design may name", () => {
    expect(shapes.map((shape) => shape.name)).toEqual(expect.arrayContaining(REQUIRED));
  });

  it("finds each by its name and nothing else", () => {
    for (const shape of shapes) expect(shapeNamed(shape.name)).toBe(shape);
    expect(shapeNamed("rectangle")).toBeUndefined();
    expect(shapeNamed("")).toBeUndefined();
  });

  it("names each once", () => {
    expect(new Set(shapes.map((shape) => shape.name)).size).toBe(shapes.length);
  });
});

describe.each(shapes.map((shape) => [shape.name, shape] as const))("shape %s", (name, shape) => {
  const quantities: [string, QuantityParameter][] = Object.entries(shape.parameters).flatMap(
    ([key, parameter]) =>
      parameter.kind === "list"
        ? Object.entries(parameter.fields).map(([field, p]): [string, QuantityParameter] => [
            `${key}[].${field}`,
            p,
          ])
        : [[key, parameter] as [string, QuantityParameter]],
  );

  it("says what it is, its formula and its source", () => {
    expect(shape.summary.length).toBeGreaterThan(10);
    expect(shape.formula).toContain("V(x)");
    expect(shape.source.length).toBeGreaterThan(10);
  });

  it("has a summary and a valid example for every parameter, and a valid fallback", () => {
    expect(quantities.length).toBeGreaterThan(0);
    for (const parameter of Object.values(shape.parameters))
      expect(parameter.summary.length).toBeGreaterThan(10);
    for (const [key, parameter] of quantities) {
      expect(parameter.summary.length, key).toBeGreaterThan(10);
      const need = { range: parameter.range };
      expect(() => parseQuantity(parameter.example, parameter.kind, need), key).not.toThrow();
      if (parameter.fallback !== undefined) {
        expect(parameter.optional, key).toBe(true);
        expect(() => parseQuantity(parameter.fallback, parameter.kind, need), key).not.toThrow();
      }
    }
  });

  it("builds from its own examples, and carries its name", () => {
    const value = (parameter: QuantityParameter) => parseQuantity(parameter.example, parameter.kind);
    const values = Object.fromEntries(
      Object.entries(shape.parameters).map(([key, parameter]) => [
        key,
        parameter.kind === "list"
          ? [Object.fromEntries(Object.entries(parameter.fields).map(([field, p]) => [field, value(p)]))]
          : value(parameter),
      ]),
    );
    expect(shape.build(values, MASS).shape).toBe(name);
  });

  it("is covered by the samples of the contract tests", () => {
    expect(samples.some((sample) => sample.shape === name)).toBe(true);
  });
});
