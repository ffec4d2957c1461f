import { piecewise } from "./piecewise.js";
import { ParameterError, type ParameterValues, type ShapeDefinition } from "./shape.js";
import { entries, optional, optionalPositive, required, requiredPositive } from "./values.js";

/** Layers of constant potential and mass, left to right; the first interface stands at x = 0. */
export const layers: ShapeDefinition = {
  name: "layers",
  summary: "a stack of layers, each of constant height and effective mass",
  formula: "V(x) = height of the layer that x lies in, the first one starting at x = 0; 0 outside the stack",
  source:
    "D. J. BenDaniel and C. B. Duke, Phys. Rev. 152, 683 (1966): psi and (1/m) dpsi/dx are continuous where the mass jumps",
  parameters: {
    layers: {
      kind: "list",
      summary: "the layers from left to right",
      fields: {
        width: { kind: "length", range: "positive", summary: "thickness of the layer", example: "2.5 nm" },
        height: {
          kind: "energy",
          range: "any",
          summary: "potential energy in the layer; negative for a well",
          example: "0.30 eV",
        },
        mass: {
          kind: "mass",
          range: "positive",
          optional: true,
          summary: "effective mass in the layer; that of the particle when left out",
          example: "0.092 m_e",
        },
      },
    },
    bias: {
      kind: "voltage",
      range: "any",
      optional: true,
      fallback: "0 V",
      summary: "voltage across the layers; right of them the potential energy is lower by e times the bias",
      example: "0 V",
    },
  },
  build,
};

function build(values: ParameterValues, particleMass: number) {
  if (optional(values, "bias", 0) !== 0) {
    throw new ParameterError(
      "bias",
      "sloped layers are not built yet: only 0 V can be computed; leave bias out, or approximate the slope by several thin layers",
    );
  }
  const stack = entries(values, "layers");
  if (stack.length === 0) {
    throw new ParameterError(
      "layers",
      'at least one layer is needed, such as { width: "2.5 nm", height: "0.30 eV" }',
    );
  }
  const edges = [0];
  const heights = [0];
  const masses = [particleMass];
  stack.forEach((layer, i) => {
    const at = `layers[${i}]`;
    const left = edges[i];
    const right = left + requiredPositive(layer, "width", `${at}.width`);
    if (!(right > left && Number.isFinite(right))) {
      throw new ParameterError(
        `${at}.width`,
        "the layer is too thin, or too thick, beside the rest of the stack",
      );
    }
    edges.push(right);
    heights.push(required(layer, "height", `${at}.height`));
    masses.push(optionalPositive(layer, "mass", particleMass, `${at}.mass`));
  });
  return piecewise("layers", { edges, values: [...heights, 0], masses: [...masses, particleMass] });
}
