import { PNG } from "pngjs";
import { beforeAll, describe, expect, it } from "vitest";
import type { Figure } from "../../src/figures/figure.js";
import { mapFigure } from "../../src/figures/map-figure.js";
import { readPngNotes } from "../../src/files/png.js";
import { renderPng, renderSvg } from "../../src/files/render-figure.js";
import { inventedMap, inventedProfile } from "../figures/invented.js";

const sha = "fedcba9876543210".repeat(4);
const profile = inventedProfile([-5, -2, 2, 5], [0.3, 0, 0.3], { masses: [1.4, 1, 1.4] });
const options = { title: "Bárrier & <ψ>", meanEnergyEv: 0.15 };

let figure: Figure;
let file: Uint8Array;
let image: PNG;

const decode = (bytes: Uint8Array) => PNG.sync.read(Buffer.from(bytes));

/** Number of pixels in a box (output pixels) that differ between two images of one size. */
function differing(a: PNG, b: PNG, box = { left: 0, top: 0, right: a.width, bottom: a.height }): number {
  let count = 0;
  for (let y = Math.max(box.top, 0); y < Math.min(box.bottom, a.height); y++)
    for (let x = Math.max(box.left, 0); x < Math.min(box.right, a.width); x++) {
      const at = 4 * (y * a.width + x);
      if (a.data.compare(b.data, at, at + 4, at, at + 4) !== 0) count++;
    }
  return count;
}

beforeAll(async () => {
  figure = mapFigure(inventedMap(240, 180), profile, options);
  file = await renderPng(figure, { Software: "postern 0.1.0", "postern design sha256": sha });
  image = decode(file);
});

describe("renderPng", () => {
  it("has the size of its print at 300 dpi, and says so", () => {
    expect([image.width, image.height]).toEqual([1890, 1323]);
    const { dpi, texts } = readPngNotes(file);
    expect(dpi).toBeGreaterThanOrEqual(200);
    expect(dpi).toBeCloseTo(300, 1);
    expect(texts).toEqual({ Title: options.title, Software: "postern 0.1.0", "postern design sha256": sha });
  });

  it("really holds every text: taking one away changes pixels where it stands", async () => {
    const found = [...figure.content.matchAll(/<text ([^>]*)>.*?<\/text>/g)];
    expect(found.length).toBeGreaterThan(25);
    const bare = decode(
      await renderPng({ ...figure, content: figure.content.replace(/<text .*?<\/text>/g, "") }),
    );
    for (const [whole, attributes] of found) {
      const [x, y, size] = ["x", "y", "font-size"].map(
        (name) => (Number(attributes.match(new RegExp(`(?:^| )${name}="([^"]*)"`))?.[1]) * 300) / 96,
      );
      const around = (reach: number) => ({
        left: Math.floor(x - reach),
        top: Math.floor(y - reach),
        right: Math.ceil(x + reach),
        bottom: Math.ceil(y + 0.3 * size),
      });
      // A glyph of this size covers more than a hundredth of its square; the narrowest is a "1".
      expect(differing(image, bare, around(size)), whole).toBeGreaterThan(0.01 * size * size);
    }
  });

  it("sets italics and bold from their own fonts", async () => {
    for (const style of [/ font-style="italic"/g, / font-weight="bold"/g]) {
      expect(figure.content).toMatch(style);
      const other = decode(await renderPng({ ...figure, content: figure.content.replace(style, "") }));
      expect(differing(image, other)).toBeGreaterThan(50);
    }
  });

  it("shows the raster pixel by pixel, and the page white around it", async () => {
    const plain = decode(await renderPng({ ...figure, content: "" }));
    const raster = figure.raster as NonNullable<Figure["raster"]>;
    const [left, top] = [raster.x, raster.y].map((side) => Math.round((side * 300) / 96));
    let white = 0;
    for (let y = 0; y < plain.height; y++)
      for (let x = 0; x < plain.width; x++) {
        const [column, row] = [x - left, y - top];
        const inside = column >= 0 && row >= 0 && column < raster.columns && row < raster.rows;
        const at = 4 * (y * plain.width + x);
        const from = 4 * (row * raster.columns + column);
        const same = inside
          ? plain.data[at] === raster.data[from] &&
            plain.data[at + 1] === raster.data[from + 1] &&
            plain.data[at + 2] === raster.data[from + 2]
          : plain.data[at] === 255 && plain.data[at + 1] === 255 && plain.data[at + 2] === 255;
        if (!same) throw new Error(`pixel ${x}, ${y} is wrong`);
        if (!inside) white++;
      }
    expect(white).toBeGreaterThan(0.3 * plain.width * plain.height);
  });

  it("has a colour bar whose ends are the ends of the colour map", () => {
    const [x, y, width, height] = barBox();
    const colour = (line: number) => {
      const at = 4 * (line * image.width + Math.round(x + width / 2));
      return [...image.data.subarray(at, at + 3)];
    };
    // viridis runs from (68, 1, 84) to (253, 231, 37).
    const close = (a: number[], b: number[]) => Math.max(...a.map((part, n) => Math.abs(part - b[n])));
    expect(close(colour(Math.round(y + height) - 8), [68, 1, 84])).toBeLessThan(8);
    expect(close(colour(Math.round(y) + 8), [253, 231, 37])).toBeLessThan(8);
    const raster = figure.raster as NonNullable<Figure["raster"]>;
    expect(y).toBeCloseTo((raster.y * 300) / 96, 6);
    expect(height).toBeCloseTo((raster.height * 300) / 96, 6);
  });

  function barBox(): number[] {
    const box = figure.content.match(
      /<rect x="([^"]*)" y="([^"]*)" width="([^"]*)" height="([^"]*)" fill="url/,
    );
    if (box === null) throw new Error("no colour bar");
    return box.slice(1).map((side) => (Number(side) * 300) / 96);
  }

  it("draws a figure without a raster too", async () => {
    const { raster: _, ...lines } = figure;
    const drawn = decode(await renderPng(lines));
    expect([drawn.width, drawn.height]).toEqual([1890, 1323]);
    expect([...drawn.data.subarray(0, 4)]).toEqual([255, 255, 255, 255]);
  });
});

describe("renderSvg", () => {
  it("is read by a strict parser and looks like the PNG", async () => {
    const { Resvg } = await import("@resvg/resvg-js");
    const svg = renderSvg(figure);
    const drawn = new Resvg(svg, {
      fitTo: { mode: "width", value: 1890 },
      font: { loadSystemFonts: false },
    }).render();
    // Every reading of .pixels copies them all.
    const pixels = drawn.pixels;
    const raster = figure.raster as NonNullable<Figure["raster"]>;
    let worst = 0;
    const [left, top] = [raster.x, raster.y].map((side) => Math.round((side * 300) / 96));
    // Away from the frame and the dotted guides in the middle.
    for (let row = 20; row < raster.rows - 20; row += 7)
      for (let column = 20; column < raster.columns * 0.4; column += 5) {
        const at = 4 * ((top + row) * 1890 + left + column);
        for (let part = 0; part < 3; part++)
          worst = Math.max(worst, Math.abs(pixels[at + part] - image.data[at + part]));
      }
    expect(worst).toBeLessThan(4);
    expect(() => new Resvg(`${svg}<b>`)).toThrow();
  });
});
