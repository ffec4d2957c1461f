import { PNG } from "pngjs";
import { describe, expect, it } from "vitest";
import { figureToSvg } from "../../src/figures/figure.js";
import {
  type DrawnSpectrum,
  type SpectrumFigureOptions,
  spectrumFigure,
} from "../../src/figures/spectrum-figure.js";
import type { SpectrumDesign } from "../../src/figures/spectrum-marks.js";
import { renderPng } from "../../src/files/render-figure.js";
import { evenEnergies } from "../../src/studies/spectrum-energies.js";
import { ELECTRON_MASS } from "../../src/units/constants.js";
import { textBoxes, texts } from "./read-figure.js";

const design: SpectrumDesign = {
  particleMass: 0.067 * ELECTRON_MASS,
  potential: { levelLeft: 0, levelRight: 0, highest: 0.3 },
  packet: { energy: 0.15, width: 10, from: "left" },
};

/** An invented curve. */
function drawn(
  energies: readonly number[],
  at: (energy: number) => number,
  more: Partial<DrawnSpectrum> & { error?: (energy: number) => number } = {},
): DrawnSpectrum {
  const { error = () => 0, ...rest } = more;
  const rows = energies.map((energy) => ({
    energy,
    transmission: { value: at(energy), error: error(energy) },
    reflection: { value: 1 - at(energy), error: error(energy) },
  }));
  return { method: "stationary", rows, floor: 0, resonances: [], ...rest };
}

const rising = (energy: number) => Math.exp(-12 * (1 - energy));
const many = evenEnergies(0.02, 0.5, 400);
const plain = drawn(many, rising);
const resonances = [
  { energy: 0.04006, width: 2.1e-4 },
  { energy: 0.1541, width: 3.2e-3 },
  { energy: 0.32, width: 0.029 },
];
const draw = (spectrum: DrawnSpectrum, options: Partial<SpectrumFigureOptions> = {}, from = design) =>
  spectrumFigure(spectrum, from, { title: "A title", ...options });

/** Numbers of the path that is drawn in a colour, as points. */
function points(content: string, colour: string): [number, number][][] {
  const paths = [...content.matchAll(new RegExp(`<path d="([^"]*)" fill="none" stroke="${colour}"`, "g"))];
  return paths.map(([, d]) =>
    [...d.matchAll(/(-?[\d.]+),(-?[\d.]+)/g)].map(([, x, y]) => [Number(x), Number(y)] as [number, number]),
  );
}

describe("spectrumFigure", () => {
  it("labels its axes with quantity and unit at every scale", () => {
    expect(texts(draw(plain).content)).toEqual(
      expect.arrayContaining(["energy above the left level, E (eV)", "transmission T", "T stationary"]),
    );
    const atom = { ...design, potential: { levelLeft: 0, levelRight: 0, highest: 1.2e-11 } };
    const cold = drawn(evenEnergies(9e-12, 1.1e-11, 90), () => 0.1, { method: "packet" });
    expect(texts(draw(cold, {}, atom).content)).toEqual(
      expect.arrayContaining(["energy above the left level, E (peV)", "T by packet"]),
    );
  });

  it("draws the same curve on a linear and on a logarithmic scale", () => {
    const [linear, log] = points(draw(plain).content, "#1f3352");
    expect(linear).toHaveLength(400);
    expect(log).toHaveLength(400);
    // exp is a straight line on the logarithmic scale: equal steps of x make equal steps of y.
    const [first, middle, last] = [0, 200, 399].map((n) => log[n]);
    const share = (middle[0] - first[0]) / (last[0] - first[0]);
    expect(middle[1]).toBeCloseTo(first[1] + share * (last[1] - first[1]), 2);
    // On the linear one the height over the bottom is in proportion to T; rows 399 and 300 as one example.
    const bottom = Math.max(...linear.map(([, y]) => y));
    const ratio = (bottom - linear[300][1]) / (bottom - linear[399][1]);
    expect(ratio).toBeCloseTo(rising(many[300]) / rising(many[399]), 1);
  });

  it("keeps the summit of a peak that is narrower than a pixel", () => {
    const at = (energy: number) => (Math.abs(energy - 0.2) < 1e-6 ? 1 : 1e-3);
    const energies = evenEnergies(0.1, 0.3, 20_001);
    expect(energies.filter((energy) => at(energy) === 1)).toHaveLength(1);
    const [linear] = points(draw(drawn(energies, at)).content, "#1f3352");
    expect(linear.length).toBeLessThan(10_000);
    const top = Math.min(...linear.map(([, y]) => y));
    expect(linear.filter(([, y]) => y === top)).toHaveLength(1);
    expect(Math.max(...linear.map(([, y]) => y)) - top).toBeGreaterThan(100);
  });

  it("marks what lies in the range: levels, the top, the mean energy, resonances with energy and width", () => {
    const found = texts(draw({ ...plain, resonances }).content);
    expect(found).toEqual(
      expect.arrayContaining([
        "energies of the packet",
        "both levels 0 eV",
        "top of the potential 0.3 eV",
        "mean energy 0.15 eV",
        "resonance: energy, width Γ",
        "0.04006",
        "Γ 210 µeV",
        "0.154",
        "Γ 3.2 meV",
        "0.32",
        "Γ 29 meV",
      ]),
    );
    const above = texts(draw(drawn(evenEnergies(0.6, 0.9, 100), () => 0.9)).content).join();
    for (const absent of ["levels", "top", "mean", "resonance", "energies of the packet"])
      expect(above).not.toContain(absent);
    const step: SpectrumDesign = {
      ...design,
      potential: { levelLeft: -0.05, levelRight: 0.05, highest: 0.05 },
      packet: { energy: 0.1, width: 10, from: "right" },
    };
    const uphill = texts(
      draw(
        drawn(evenEnergies(0.11, 0.4, 100), () => 0.9),
        {},
        step,
      ).content,
    );
    expect(uphill).toEqual(expect.arrayContaining(["right level 0.1 eV", "mean energy 0.2 eV"]));
    expect(uphill.join()).not.toContain("top of");
  });

  it("shows bounds where they can be seen, and what round-off hides", () => {
    const error = (energy: number) => (energy < 0.1 ? 1e-4 : 1e-9);
    const uncertain = draw(drawn(many, rising, { error, floor: 2e-5 }));
    expect(texts(uncertain.content)).toEqual(
      expect.arrayContaining(["T stationary, with its bound", "hidden by round-off"]),
    );
    expect(uncertain.content).toContain('fill-opacity="0.28"');
    const certain = draw(drawn(many, rising, { error: () => 1e-12 }));
    expect(texts(certain.content).join()).not.toMatch(/bound|round-off/);
    expect(certain.content).not.toContain("fill-opacity");
    // A few rows get bars: one upright stroke and two caps on each of two panels.
    const few = drawn([0.1, 0.2, 0.3], () => 0.4, { error: (energy) => (energy === 0.2 ? 0.2 : 1e-9) });
    const bars = [...draw(few).content.matchAll(/<line [^>]*stroke="#1f3352"/g)];
    // One more is the sample in the legend.
    expect(bars).toHaveLength(2 * 3 + 1);
  });

  it("draws the reflection when asked", () => {
    expect(points(draw(plain).content, "#1f6b4a")).toHaveLength(0);
    const both = draw(plain, { reflection: true });
    expect(points(both.content, "#1f6b4a")).toHaveLength(1);
    expect(texts(both.content)).toContain("R");
  });

  it("counts a narrow range from an energy within it", () => {
    const energies = evenEnergies(0.0401655, 0.0401855, 300);
    const at = drawn(energies, () => 0.5, { resonances: [{ energy: 0.0401756, width: 3.6e-6 }] });
    expect(texts(draw(at).content)).toEqual(
      expect.arrayContaining(["energy above the left level, E − 40.18 meV (µeV)", "−4.4", "Γ 3.6 µeV"]),
    );
  });

  it("keeps every letter at 5.5 pt or more when printed 80 mm wide", () => {
    for (const options of [{}, { widthMm: 80 }, { widthMm: 240 }, { heightMm: 90 }]) {
      const figure = draw({ ...plain, resonances }, options);
      const sizes = [...figure.content.matchAll(/font-size="([\d.]+)"/g)].map((match) => Number(match[1]));
      expect(sizes.length).toBeGreaterThan(20);
      const printed = Math.min(1, 80 / 25.4 / (figure.width / 96));
      expect(Math.min(...sizes) * 0.75 * printed).toBeGreaterThanOrEqual(5.5);
    }
  });

  it("keeps every text inside the page and no two of them on one another", () => {
    const crowd = Array.from({ length: 25 }, (_, n) => ({
      energy: 0.021 + 0.019 * n,
      width: 1e-4 * (1 + (n % 7)),
    }));
    const deep = (energy: number) => 10 ** (-200 * (1 - energy));
    const hidden = { error: () => 1e-26, floor: 1e-25, method: "packet" as const };
    const cases = [
      draw(plain),
      draw({ ...plain, resonances }, { reflection: true, title: "x".repeat(300), widthMm: 80 }),
      draw({ ...plain, resonances: crowd }),
      draw({ ...plain, resonances: crowd }, { widthMm: 80 }),
      draw({ ...plain, resonances }, { widthMm: 250, heightMm: 130 }),
      draw(drawn(many, deep)),
      draw(drawn(many, deep, hidden), { widthMm: 80 }),
      draw(drawn([0.15], () => 0.0233)),
      draw(drawn([0.1, 0.15, 0.2], () => 1)),
      draw(drawn(evenEnergies(0.123456, 0.123457, 90), () => 3e-8)),
      draw(
        drawn(evenEnergies(990, 1000, 90), () => 0.1),
        { widthMm: 80 },
      ),
    ];
    for (const { content, width, height } of cases) {
      const boxes = textBoxes(content);
      expect(boxes.length).toBeGreaterThan(8);
      for (const [n, box] of boxes.entries()) {
        expect(box.left, box.text).toBeGreaterThanOrEqual(0);
        expect(box.right, box.text).toBeLessThanOrEqual(width);
        expect(box.top, box.text).toBeGreaterThanOrEqual(0);
        expect(box.bottom, box.text).toBeLessThanOrEqual(height);
        for (const other of boxes.slice(n + 1)) {
          const apart =
            box.right <= other.left ||
            other.right <= box.left ||
            box.bottom <= other.top ||
            other.bottom <= box.top;
          expect(apart, `"${box.text}" and "${other.text}"`).toBe(true);
        }
      }
    }
  });

  it("draws what no probability is known of, and what is none", () => {
    for (const [at, error] of [
      [() => 0, () => 1],
      [() => 0, () => 0],
      [() => 1, () => 0],
      [() => 5e-324, () => 0],
    ] as const)
      for (const floor of [0, 1e-30]) expect(() => draw(drawn(many, at, { error, floor }))).not.toThrow();
  });

  it("refuses a spectrum without rows, and a size out of range", () => {
    expect(() => draw(drawn([], rising))).toThrow("at least one energy");
    expect(() => draw(plain, { widthMm: 10 })).toThrow(RangeError);
  });

  it("becomes a document and a picture, the same twice", async () => {
    const figures = [1, 2].map(() => draw({ ...plain, resonances }, { title: "<Γ> & more", dpi: 96 }));
    expect(figures[0].content).toBe(figures[1].content);
    const svg = figureToSvg(figures[0]);
    expect(svg).toContain("<title>&lt;Γ&gt; &amp; more</title>");
    expect(figures[0].description).toMatch(
      /from -0\.012 to 0\.5 eV above the left level.*400 energies; 3 resonances marked\.$/,
    );
    const png = PNG.sync.read(Buffer.from(await renderPng(figures[0])));
    expect([png.width, png.height]).toEqual([605, 484]);
    const dark = (from: number, to: number) => {
      let count = 0;
      for (let y = Math.floor(from * png.height); y < to * png.height; y++)
        for (let x = 0; x < png.width; x++) if (png.data[4 * (y * png.width + x)] < 100) count++;
      return count;
    };
    // Letters of the title, lines of both panels, letters of the axis below.
    for (const [from, to] of [
      [0, 0.07],
      [0.3, 0.55],
      [0.6, 0.85],
      [0.92, 1],
    ])
      expect(dark(from, to)).toBeGreaterThan(100);
  });
});
