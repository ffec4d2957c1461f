import { createRequire } from "node:module";
import { dirname, join } from "node:path";
import { type Figure, figureToSvg, overlaySvg, type Raster } from "../figures/figure.js";
import { encodePng } from "./png.js";

/** The faces that figures use; read from their package, so that a figure looks the same on every machine. */
const FONT_FILES = ["DejaVuSans.ttf", "DejaVuSans-Bold.ttf", "DejaVuSans-Oblique.ttf"];

function fontFiles(): string[] {
  const folder = dirname(createRequire(import.meta.url).resolve("dejavu-fonts-ttf/package.json"));
  return FONT_FILES.map((file) => join(folder, "ttf", file));
}

/** The figure as an SVG document that stands alone: its pixels are inside, as a PNG. */
export function renderSvg(figure: Figure): string {
  const { raster } = figure;
  if (raster === undefined) return figureToSvg(figure);
  const png = Buffer.from(encodePng(raster.data, raster.columns, raster.rows, { level: 9 }));
  return figureToSvg(figure, `data:image/png;base64,${png.toString("base64")}`);
}

/**
 * The figure as a PNG of its own resolution, with the resolution and texts in its chunks.
 *
 * @param texts further text chunks, such as Software or the hash of the design; the title is always there
 */
export async function renderPng(
  figure: Figure,
  texts: Readonly<Record<string, string>> = {},
): Promise<Uint8Array> {
  // Loaded here and not above: commands without a figure start faster.
  const { Resvg } = await import("@resvg/resvg-js");
  const { columns, rows, dpi, title, raster } = figure;
  const lines = new Resvg(overlaySvg(figure), {
    fitTo: { mode: "width", value: columns },
    font: { fontFiles: fontFiles(), loadSystemFonts: false, defaultFontFamily: "DejaVu Sans" },
  }).render();
  if (lines.width !== columns || lines.height !== rows)
    throw new Error(`the figure came out ${lines.width} x ${lines.height} pixels, not ${columns} x ${rows}`);
  // The raster is put in by hand, pixel by pixel: no resampling, and no detour through a PNG inside the SVG.
  const pixels = new Uint8Array(3 * columns * rows).fill(255);
  if (raster !== undefined) copyRaster(pixels, figure, raster);
  cover(pixels, lines.pixels);
  return encodePng(pixels, columns, rows, { dpi, texts: { Title: title, ...texts } });
}

/** Copies a raster to its place among RGB pixels. */
function copyRaster(pixels: Uint8Array, figure: Figure, raster: Raster): void {
  const left = Math.round((raster.x * figure.dpi) / 96);
  const top = Math.round((raster.y * figure.dpi) / 96);
  for (let row = 0, from = 0; row < raster.rows; row++) {
    let to = 3 * ((top + row) * figure.columns + left);
    for (let column = 0; column < raster.columns; column++, from += 4) {
      pixels[to++] = raster.data[from];
      pixels[to++] = raster.data[from + 1];
      pixels[to++] = raster.data[from + 2];
    }
  }
}

/** Lays RGBA pixels over RGB ones. The renderer has multiplied colours by alpha: result = over + under (1 - alpha). */
function cover(under: Uint8Array, over: Uint8Array): void {
  // Most pixels are empty: looking at all four bytes at once takes a third of the time.
  const whole = new Uint32Array(over.buffer, over.byteOffset, over.length / 4);
  for (let pixel = 0; pixel < whole.length; pixel++) {
    if (whole[pixel] === 0) continue;
    const from = 4 * pixel;
    const to = 3 * pixel;
    const rest = 1 - over[from + 3] / 255;
    for (let part = 0; part < 3; part++)
      under[to + part] = Math.round(over[from + part] + under[to + part] * rest);
  }
}
