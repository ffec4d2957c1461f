import { interpolateCividis, interpolateViridis } from "d3-scale-chromatic";

/** Number of colours in a table: as many as one byte tells apart. */
const COLOURS = 256;

/**
 * Sequential colours that rise evenly in lightness, dark to bright, and are told apart by people with every kind of
 * colour blindness. Sources: viridis, S. van der Walt and N. Smith (2015); cividis, J. R. Nunez, C. R. Anderton and
 * R. S. Renslow, PLoS ONE 13, e0199239 (2018) (both from memory).
 */
export const COLOUR_MAPS = { viridis: interpolateViridis, cividis: interpolateCividis } as const;
export type ColourMapName = keyof typeof COLOUR_MAPS;
export const DEFAULT_COLOUR_MAP: ColourMapName = "viridis";

/** The colours of a map as red, green, blue bytes, from the lowest value to the highest. */
export function colourTable(name: ColourMapName): Uint8Array {
  const table = new Uint8Array(3 * COLOURS);
  for (let i = 0; i < COLOURS; i++) table.set(parseColour(COLOUR_MAPS[name](i / (COLOURS - 1))), 3 * i);
  return table;
}

/** Reads "#rrggbb" and "rgb(r, g, b)", the two forms that the colour library writes. */
function parseColour(text: string): [number, number, number] {
  const parts = text.startsWith("#")
    ? [1, 3, 5].map((at) => Number.parseInt(text.slice(at, at + 2), 16))
    : (text.match(/\d+/g) ?? []).map(Number);
  if (parts.length !== 3 || parts.some((part) => !(part >= 0 && part <= 255)))
    throw new TypeError(`a colour as #rrggbb or rgb(r, g, b) is needed; got "${text}"`);
  return parts as [number, number, number];
}

/** Colour number `index` of a table as "#rrggbb". */
export function hexColour(table: Uint8Array, index: number): string {
  return `#${[...table.subarray(3 * index, 3 * index + 3)].map((byte) => byte.toString(16).padStart(2, "0")).join("")}`;
}

/**
 * Paints values as opaque pixels.
 *
 * @param values row-major, row 0 to be drawn at the bottom
 * @param position 0 for the lowest colour to 1 for the highest; outside, the nearest end is taken
 * @returns RGBA bytes, row-major from the top
 */
export function paint(
  values: Float64Array,
  columns: number,
  rows: number,
  position: (value: number) => number,
  table: Uint8Array,
): Uint8Array {
  const pixels = new Uint8Array(4 * columns * rows);
  for (let row = 0; row < rows; row++) {
    let at = 4 * columns * (rows - 1 - row);
    for (let n = row * columns; n < (row + 1) * columns; n++) {
      const index = 3 * Math.round(Math.min(Math.max(position(values[n]), 0), 1) * (COLOURS - 1));
      pixels[at++] = table[index];
      pixels[at++] = table[index + 1];
      pixels[at++] = table[index + 2];
      pixels[at++] = 255;
    }
  }
  return pixels;
}
