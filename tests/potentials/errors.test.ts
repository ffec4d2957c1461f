import { describe, expect, it } from "vitest";
import { shapeNamed } from "../../src/potentials/registry.js";
import { ParameterError, type ParameterValues } from "../../src/potentials/shape.js";
import { MASS } from "./samples.js";

const layer = { width: 2, height: 0.3 };

const wrong: readonly (readonly [shape: string, values: ParameterValues, path: string, says: RegExp])[] = [
  ["rectangular", { width: 5 }, "height", /finite value/],
  ["rectangular", { height: Number.NaN, width: 5 }, "height", /finite value/],
  ["rectangular", { height: 0.3, width: 0 }, "width", /above zero/],
  ["rectangular", { height: 0.3, width: -5 }, "width", /above zero/],
  ["rectangular", { height: 0.3, width: 5, mass: 0 }, "mass", /above zero/],
  ["layers", {}, "layers", /at least one layer/],
  ["layers", { layers: [] }, "layers", /at least one layer/],
  ["layers", { layers: 3 }, "layers", /a list/],
  ["layers", { layers: [layer, { width: 0, height: 0 }] }, "layers[1].width", /above zero/],
  ["layers", { layers: [layer, { width: 1 }] }, "layers[1].height", /finite value/],
  ["layers", { layers: [{ ...layer, mass: -1 }] }, "layers[0].mass", /above zero/],
  [
    "layers",
    {
      layers: [
        { width: 1e9, height: 1 },
        { width: 1e-9, height: 0 },
      ],
    },
    "layers[1].width",
    /too thin/,
  ],
  ["layers", { layers: [layer], bias: 0.05 }, "bias", /only 0 V/],
  ["step", { height: 0.2, thickness: -1 }, "thickness", /zero or more/],
  ["gaussian", { height: 0.2, width: Number.POSITIVE_INFINITY }, "width", /finite value/],
  ["sech2", { height: 0.2 }, "width", /finite value/],
  ["eckart", { height: 0, width: 1 }, "height", /above zero/],
  ["eckart", { height: 0.2, drop: 0.3, width: 1 }, "drop", /above the top/],
  ["harmonic", { quantum: 0 }, "quantum", /above zero/],
  ["delta", { strength: 0 }, "strength", /other than zero/],
];

describe("wrong parameters", () => {
  it.each(wrong)("%s %j: names %s", (shape, values, path, says) => {
    let error: unknown;
    try {
      shapeNamed(shape)?.build(values, MASS);
    } catch (caught) {
      error = caught;
    }
    expect(error).toBeInstanceOf(ParameterError);
    expect((error as ParameterError).path).toBe(path);
    expect((error as ParameterError).message).toMatch(says);
  });
});

describe("limits that are allowed", () => {
  const make = (shape: string, values: ParameterValues) => {
    const definition = shapeNamed(shape);
    if (definition === undefined) throw new Error(shape);
    return definition.build(values, MASS);
  };

  it("a barrier of no height is flat but keeps its faces", () => {
    const flat = make("rectangular", { height: 0, width: 5 });
    expect(flat.interfaces).toEqual([]);
    expect(flat.faces).toEqual([-2.5, 2.5]);
    expect(flat.value(-2.5)).toBe(0);
    expect(flat.slopeTransform?.(0.7)).toEqual([0, 0]);
  });

  it("a layer like its neighbour makes no interface", () => {
    const double = make("layers", { layers: [layer, layer] });
    expect(double.interfaces).toEqual([0, 4]);
    expect(double.cellAverage(1.5, 2.5)).toBe(0.3);
  });

  it("a layer of another mass alone makes two", () => {
    const only = make("layers", { layers: [{ width: 2, height: 0, mass: 2 * MASS }] });
    expect(only.interfaces).toEqual([0, 2]);
    expect(only.uniformMass).toBe(false);
    expect(only.massAverage(-1, 1)).toBeCloseTo(1.5 * MASS, 14);
  });

  it("a bias of 0 V is none", () => {
    expect(make("layers", { layers: [layer], bias: 0 }).levelRight).toBe(0);
  });

  it("an eckart path may end as high as its top", () => {
    const path = make("eckart", { height: 0.2, drop: 0.2, width: 1 });
    expect(path.value(20)).toBeCloseTo(0.2, 14);
    expect(Math.abs(path.value(path.faces[1]) - 0.2)).toBeLessThanOrEqual(3e-17);
    expect(path.faces[1]).toBeLessThan(20);
  });

  it("a thin smooth step tends to the sharp one", () => {
    const smooth = make("step", { height: 0.2, thickness: 1e-12 });
    const sharp = make("step", { height: 0.2, thickness: 0 });
    for (const x of [-1, -1e-3, 1e-3, 1]) expect(smooth.value(x)).toBe(sharp.value(x));
    expect(smooth.cellAverage(-1, 3)).toBeCloseTo(sharp.cellAverage(-1, 3), 12);
  });

  it("an eckart path of no drop is a sech2 barrier of twice the width", () => {
    const path = make("eckart", { height: 0.3, width: 1 });
    const barrier = make("sech2", { height: 0.3, width: 2 });
    for (const x of [-300, -7, -0.1, 0, 2, 50]) {
      expect(path.value(x) / barrier.value(x)).toBeCloseTo(1, 13);
      expect(path.cellAverage(x, x + 0.5) / barrier.cellAverage(x, x + 0.5)).toBeCloseTo(1, 13);
    }
  });
});

describe("far tails keep their relative precision", () => {
  const sech2 = shapeNamed("sech2")?.build({ height: 0.3, width: 2 }, MASS);
  const step = shapeNamed("step")?.build({ height: 0.3, thickness: 2 }, MASS);
  const gaussian = shapeNamed("gaussian")?.build({ height: 0.3, width: 2 }, MASS);

  it("sech2 is 4 height exp(-2x/width) where cosh squared overflows", () => {
    expect((sech2?.value(720) ?? 0) / (1.2 * Math.exp(-720))).toBeCloseTo(1, 13);
    expect((sech2?.cellAverage(720, 724) ?? 0) / (0.3 * Math.exp(-720) * -Math.expm1(-4))).toBeCloseTo(1, 13);
  });

  it("the step's left tail is height exp(x/thickness)", () => {
    expect((step?.value(-1200) ?? 0) / (0.3 * Math.exp(-600))).toBeCloseTo(1, 13);
    expect((step?.cellAverage(-1202, -1200) ?? 0) / (0.3 * Math.exp(-600) * -Math.expm1(-1))).toBeCloseTo(
      1,
      13,
    );
  });

  it("the gaussian's cell average over one width at 20 widths is that of its asymptotic series", () => {
    // integral_z^inf exp(-t^2/2) dt = exp(-z^2/2)/z (1 - 1/z^2 + 3/z^4 - 15/z^6 + 105/z^8 - 945/z^10 + ...); the next
    // term at z = 20 is 3e-12, the far end at z = 21 adds exp(-20.5).
    const tail = (z: number) => {
      const s = 1 / (z * z);
      return (Math.exp((-z * z) / 2) / z) * (1 - s * (1 - 3 * s * (1 - 5 * s * (1 - 7 * s * (1 - 9 * s)))));
    };
    const expected = 0.3 * (tail(20) - tail(21));
    expect((gaussian?.cellAverage(40, 42) ?? 0) / expected).toBeCloseTo(1, 11);
  });
});
