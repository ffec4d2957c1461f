import { expect, it } from "vitest";
import { hasPoint } from "../../src/potentials/points.js";
import { potentialOf } from "../grid/samples.js";

it.each([
  ["delta", { strength: 0.5 }, true],
  ["delta", { strength: -1e-6 }, true],
  ["rectangular", { height: 0.3, width: 5 }, false],
  ["rectangular", { height: -1e-12, width: 4e5 }, false],
  ["step", { height: -0.2 }, false],
  ["gaussian", { height: 0.3, width: 2 }, false],
  [
    "layers",
    {
      layers: [
        { width: 2, height: 0.3 },
        { width: 3, height: -0.1 },
      ],
    },
    false,
  ],
])("a point of strength is told from jumps: %s %j", (shape, values, expected) => {
  for (const center of [0, 17.3]) expect(hasPoint(potentialOf(shape, values, center))).toBe(expected);
});
