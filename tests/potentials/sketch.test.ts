import { describe, expect, it } from "vitest";
import { shapeNamed } from "../../src/potentials/registry.js";
import { SKETCH_HEIGHT, SKETCH_WIDTH, sketch } from "../../src/potentials/sketch.js";
import { build, MASS, samples } from "./samples.js";

const draw = (shape: string, values: object, options: object = {}): string[] => {
  const definition = shapeNamed(shape);
  if (definition === undefined) throw new Error(shape);
  return sketch(definition.build(values as never, MASS), { width: 32, height: 4, ...options });
};

describe("sketch", () => {
  it("of a barrier", () => {
    expect(draw("rectangular", { height: 0.3, width: 5 })).toEqual([
      "0.3 eV ┤      ████████████████████",
      "       │      ████████████████████",
      "       │      ████████████████████",
      "  0 eV ┤▁▁▁▁▁▁████████████████████▁▁▁▁▁▁",
      "       └────────────────┴───────────────",
      "        -4 nm           0           4 nm",
    ]);
  });

  it("of a barrier, in characters of every terminal", () => {
    const lines = draw("rectangular", { height: 0.3, width: 5 }, { ascii: true });
    expect(lines).toEqual([
      "0.3 eV +      ####################",
      "       |      ####################",
      "       |      ####################",
      "  0 eV +......####################......",
      "       +----------------+---------------",
      "        -4 nm           0           4 nm",
    ]);
  });

  it("of a well, zero at the top", () => {
    expect(draw("rectangular", { height: -0.2, width: 10 })).toEqual([
      "   0 eV ┤██████                    ██████",
      "        │██████                    ██████",
      "        │██████                    ██████",
      "-0.2 eV ┤██████▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁██████",
      "        └────────────────┴───────────────",
      "         -8 nm           0           8 nm",
    ]);
  });

  it("of a double barrier, with its height in few digits", () => {
    const wall = { width: 3, height: 0.2591 };
    expect(draw("layers", { layers: [wall, { width: 4, height: 0 }, wall] })).toEqual([
      "0.259 eV ┤      ██████        ██████",
      "         │      ██████        ██████",
      "         │      ██████        ██████",
      "    0 eV ┤▁▁▁▁▁▁██████▁▁▁▁▁▁▁▁██████▁▁▁▁▁▁",
      "         └──────┴─────────────────────────",
      "          -3 nm 0                    13 nm",
    ]);
  });

  it("of a downward step", () => {
    expect(draw("step", { height: -0.2 })).toEqual([
      "   0 eV ┤████████████████",
      "        │████████████████",
      "        │████████████████",
      "-0.2 eV ┤████████████████▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁",
      "        └────────────────┴───────────────",
      "         -1 nm           0           1 nm",
    ]);
  });

  it("of points of strength, up and down", () => {
    expect(draw("delta", { strength: 0.5 })).toEqual([
      "     │                ▲",
      "     │                │",
      "     │                │",
      "0 eV ┤▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁",
      "     └────────────────┴───────────────",
      "      -1 nm           0           1 nm",
      "      arrow: strength 0.5 eV nm at x = 0 nm",
    ]);
    expect(draw("delta", { strength: -0.5 }).slice(0, 4)).toEqual([
      "0 eV ┤███████████████ │ ██████████████",
      "     │███████████████ │ ██████████████",
      "     │███████████████ │ ██████████████",
      "     │███████████████ ▼ ██████████████",
    ]);
  });

  it("of a harmonic well, with zero as its lowest label", () => {
    const lines = draw("harmonic", { quantum: 0.1 });
    expect(lines[0]).toMatch(/^0\.8 eV ┤.+ {20,}.+$/);
    expect(lines[3]).toMatch(/^ {2}0 eV ┤█+[▁-▇]+█+$/);
  });

  it("chooses units for peV and um", () => {
    const lines = draw("gaussian", { height: 20e-12, width: 2000 });
    expect(lines[0]).toMatch(/^20 peV ┤/);
    expect(lines[3]).toMatch(/^ 0 peV ┤/);
    expect(lines[5]).toMatch(/^ +-[\d.]+ um +0 +[\d.]+ um$/);
  });

  it("shows a layer far thinner than a column", () => {
    for (const spacer of [20, 20.3, 21.7, 23]) {
      const layers = [
        { width: spacer, height: 0.1 },
        { width: 0.02, height: 0.3 },
        { width: 20, height: 0.1 },
      ];
      const lines = draw("layers", { layers });
      expect(lines[0].match(/█/g)?.length).toBe(1);
    }
  });

  it("draws a flat potential, and any window that is asked for", () => {
    expect(draw("rectangular", { height: 0, width: 4 })[2]).toMatch(/^ 0 eV ┤█{32}$/);
    const lines = draw("rectangular", { height: 0.3, width: 5 }, { from: 0, to: 5 });
    expect(lines[0]).toBe(`0.3 eV ┤${"█".repeat(16)}`);
    expect(lines[5]).toBe(`        0 nm${" ".repeat(24)}5 nm`);
  });

  it.each(samples.map((sample) => [sample.title, sample] as const))(
    "of %s keeps to its frame",
    (_, sample) => {
      for (const ascii of [false, true]) {
        const lines = sketch(build(sample), { ascii });
        expect(lines.length).toBe(SKETCH_HEIGHT + 2 + (sample.shape === "delta" ? 1 : 0));
        const edge = lines[SKETCH_HEIGHT].length - SKETCH_WIDTH;
        for (const line of lines) {
          expect(line).toBe(line.trimEnd());
          expect(line.length).toBeLessThanOrEqual(edge + SKETCH_WIDTH);
          if (ascii) expect(line).toMatch(/^[ -~]*$/);
        }
        for (const line of lines.slice(0, SKETCH_HEIGHT)) expect("│┤|+").toContain(line[edge - 1]);
        expect(lines.join("\n")).toMatch(/\d eV/);
      }
    },
  );
});
