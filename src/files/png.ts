import { crc32 } from "node:zlib";
import { PNG } from "pngjs";

/** What a PNG carries besides its pixels. */
export interface PngOptions {
  /** Resolution in pixels per inch, written as pHYs. */
  readonly dpi?: number;
  /** Text chunks: keyword (1 to 79 Latin letters, signs and inner spaces) and text. */
  readonly texts?: Readonly<Record<string, string>>;
  /** zlib's level, 1 to 9; default DEFLATE_LEVEL. */
  readonly level?: number;
}

/** Tuned against 1890 x 1323 maps: level 9 takes three times as long and saves a tenth. */
export const DEFLATE_LEVEL = 5;

const SIGNATURE_BYTES = 8;
/** Signature and header chunk: length, type, 13 bytes of data, checksum (PNG specification, 3rd ed., 5.2 and 11.2.1). */
const HEADER_END = SIGNATURE_BYTES + 4 + 4 + 13 + 4;

/**
 * Encodes opaque pixels as a PNG of 24 bits.
 *
 * @param pixels RGB or RGBA bytes, row-major from the top; alpha is dropped
 * @throws RangeError when the sizes do not agree, TypeError for a keyword that PNG does not allow
 */
export function encodePng(
  pixels: Uint8Array,
  columns: number,
  rows: number,
  options: PngOptions = {},
): Uint8Array {
  const channels = pixels.length / (columns * rows);
  if (channels !== 3 && channels !== 4)
    throw new RangeError(`${columns} x ${rows} pixels need 3 or 4 bytes each; got ${pixels.length} bytes`);
  const png = new PNG({ width: 1, height: 1 });
  const colours = channels === 4 ? dropAlpha(pixels) : pixels;
  const data = Buffer.from(colours.buffer, colours.byteOffset, colours.byteLength);
  // Set afterwards: the constructor would allocate an image of its own.
  Object.assign(png, { width: columns, height: rows, data });
  // Large areas of one colour: no filter and the plain strategy are both faster and smaller than the defaults.
  const file = PNG.sync.write(png, {
    colorType: 2,
    inputColorType: 2,
    inputHasAlpha: false,
    deflateStrategy: 0,
    deflateLevel: options.level ?? DEFLATE_LEVEL,
    filterType: 0,
  });
  const extra = Object.entries(options.texts ?? {}).map(([keyword, text]) => textChunk(keyword, text));
  if (options.dpi !== undefined) extra.unshift(physicalChunk(options.dpi));
  return Buffer.concat([file.subarray(0, HEADER_END), ...extra, file.subarray(HEADER_END)]);
}

function dropAlpha(pixels: Uint8Array): Uint8Array {
  const colours = new Uint8Array((pixels.length / 4) * 3);
  for (let from = 0, to = 0; from < pixels.length; from += 4) {
    colours[to++] = pixels[from];
    colours[to++] = pixels[from + 1];
    colours[to++] = pixels[from + 2];
  }
  return colours;
}

function chunk(type: string, data: Buffer): Buffer {
  const body = Buffer.concat([Buffer.from(type, "latin1"), data]);
  const whole = Buffer.alloc(body.length + 8);
  whole.writeUInt32BE(data.length, 0);
  body.copy(whole, 4);
  whole.writeUInt32BE(crc32(body), body.length + 4);
  return whole;
}

/** pHYs: pixels per metre in x and y, unit 1 (PNG specification, 11.3.4.3). */
function physicalChunk(dpi: number): Buffer {
  const data = Buffer.alloc(9);
  const perMetre = Math.round(dpi / 0.0254);
  data.writeUInt32BE(perMetre, 0);
  data.writeUInt32BE(perMetre, 4);
  data[8] = 1;
  return chunk("pHYs", data);
}

/** tEXt for Latin-1, iTXt in UTF-8 for anything else (PNG specification, 11.3.3). */
function textChunk(keyword: string, text: string): Buffer {
  if (!/^(?! )[\x20-\x7e\xa1-\xff]{1,79}(?<! )$/.test(keyword) || keyword.includes("  "))
    throw new TypeError(`a PNG keyword of 1 to 79 Latin signs is needed; got "${keyword}"`);
  const clean = text.replaceAll("\0", "\ufffd");
  const head = Buffer.from(`${keyword}\0`, "latin1");
  if (/^[\n\x20-\x7e\xa0-\xff]*$/.test(clean))
    return chunk("tEXt", Buffer.concat([head, Buffer.from(clean, "latin1")]));
  // No compression, no language, no translated keyword.
  return chunk("iTXt", Buffer.concat([head, Buffer.from([0, 0, 0, 0]), Buffer.from(clean, "utf8")]));
}

/** What stands in a PNG besides its pixels. */
export interface PngNotes {
  readonly dpi?: number;
  readonly texts: Readonly<Record<string, string>>;
}

/**
 * Reads resolution and text chunks back.
 *
 * @throws TypeError when the bytes are no PNG or a chunk's checksum is wrong
 */
export function readPngNotes(file: Uint8Array): PngNotes {
  const bytes = Buffer.from(file.buffer, file.byteOffset, file.byteLength);
  if (bytes.toString("latin1", 0, SIGNATURE_BYTES) !== "\x89PNG\r\n\x1a\n")
    throw new TypeError("these bytes are no PNG");
  const texts: Record<string, string> = {};
  let dpi: number | undefined;
  for (let at = SIGNATURE_BYTES; at + 12 <= bytes.length; ) {
    const length = bytes.readUInt32BE(at);
    const type = bytes.toString("latin1", at + 4, at + 8);
    const data = bytes.subarray(at + 8, at + 8 + length);
    if (crc32(bytes.subarray(at + 4, at + 8 + length)) !== bytes.readUInt32BE(at + 8 + length))
      throw new TypeError(`the ${type} chunk of the PNG is damaged`);
    const end = data.indexOf(0);
    if (type === "pHYs" && data[8] === 1) dpi = data.readUInt32BE(0) * 0.0254;
    if (type === "tEXt") texts[data.toString("latin1", 0, end)] = data.toString("latin1", end + 1);
    if (type === "iTXt") texts[data.toString("latin1", 0, end)] = data.toString("utf8", end + 5);
    at += length + 12;
  }
  return { dpi, texts };
}
