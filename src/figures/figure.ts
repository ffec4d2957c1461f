import { element, escapeXml } from "./svg.js";
import { FONT_FAMILY } from "./text.js";
import { PAPER, PX_PER_MM } from "./theme.js";

/** A rectangle in CSS pixels. */
export interface Box {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

/** Pixels that stand in a box of the figure, made for its resolution: one pixel there is one pixel of the output. */
export interface Raster extends Box {
  readonly columns: number;
  readonly rows: number;
  /** RGBA bytes, row-major from the top. */
  readonly data: Uint8Array;
}

/** A finished figure, before it becomes a file: paper, a raster on it, and lines and text as SVG over both. */
export interface Figure {
  /** Size in CSS pixels (1/96 inch). */
  readonly width: number;
  readonly height: number;
  /** Size in output pixels at `dpi`. */
  readonly columns: number;
  readonly rows: number;
  readonly dpi: number;
  readonly title: string;
  /** What is to be seen, in one or two sentences, for readers who cannot see it. */
  readonly description: string;
  readonly raster?: Raster;
  /** SVG elements, drawn over the raster on white paper. */
  readonly content: string;
}

/** Greatest number of output pixels: about an A3 page at 600 dpi. */
export const MOST_PIXELS = 7e7;

/**
 * Size of a figure whose output pixels are whole numbers.
 *
 * @throws RangeError for sizes beyond 50 to 1000 mm or 50 to 1200 dpi, or more than MOST_PIXELS
 */
export function figureSize(widthMm: number, heightMm: number, dpi: number) {
  for (const [name, value] of [
    ["width", widthMm],
    ["height", heightMm],
  ] as const)
    if (!(value >= 50 && value <= 1000))
      throw new RangeError(`the ${name} of a figure must lie between 50 and 1000 mm; got ${value}`);
  if (!(dpi >= 50 && dpi <= 1200))
    throw new RangeError(`the resolution must lie between 50 and 1200 dpi; got ${dpi}`);
  const perPixel = 96 / dpi;
  const columns = Math.round((widthMm * PX_PER_MM) / perPixel);
  const rows = Math.round((heightMm * PX_PER_MM) / perPixel);
  if (columns * rows > MOST_PIXELS)
    throw new RangeError(`${columns} x ${rows} pixels are too many; lower the resolution or the size`);
  return { columns, rows, width: columns * perPixel, height: rows * perPixel };
}

/** Moves the edges of a box to the nearest output pixels. */
export function snapBox(box: Box, dpi: number): Box {
  const snap = (value: number) => (Math.round((value * dpi) / 96) * 96) / dpi;
  const x = snap(box.x);
  const y = snap(box.y);
  return { x, y, width: snap(box.x + box.width) - x, height: snap(box.y + box.height) - y };
}

/**
 * The figure as one SVG document.
 *
 * @param rasterHref where the raster's pixels are found, such as a data URI of a PNG; needed when there is a raster
 */
export function figureToSvg(figure: Figure, rasterHref?: string): string {
  const { raster, width, height } = figure;
  if (raster !== undefined && rasterHref === undefined)
    throw new TypeError("a figure with a raster needs an address for its pixels");
  const paper = element("rect", { x: 0, y: 0, width, height, fill: PAPER });
  if (raster === undefined) return svgDocument(figure, paper);
  const { columns: _columns, rows: _rows, data: _data, ...box } = raster;
  const image = element("image", { ...box, preserveAspectRatio: "none", href: rasterHref });
  return svgDocument(figure, paper, image);
}

/** Lines and text of the figure alone, on nothing: for laying them over the raster's own pixels. */
export const overlaySvg = (figure: Figure): string => svgDocument(figure);

function svgDocument(figure: Figure, ...beneath: string[]): string {
  const { width, height, title, description, content } = figure;
  const mm = (value: number) => `${Number((value / PX_PER_MM).toFixed(3))}mm`;
  const document = element(
    "svg",
    {
      xmlns: "http://www.w3.org/2000/svg",
      width: mm(width),
      height: mm(height),
      viewBox: `0 0 ${width} ${height}`,
      role: "img",
      "font-family": FONT_FAMILY,
    },
    element("title", {}, escapeXml(title)),
    element("desc", {}, escapeXml(description)),
    ...beneath,
    content,
  );
  return `<?xml version="1.0" encoding="UTF-8"?>\n${document}\n`;
}
