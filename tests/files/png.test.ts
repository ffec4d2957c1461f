import { PNG } from "pngjs";
import { describe, expect, it } from "vitest";
import { encodePng, readPngNotes } from "../../src/files/png.js";

const pixels = Uint8Array.from({ length: 4 * 6 }, (_, n) => (n % 4 === 3 ? 255 : 10 * n));

describe("encodePng", () => {
  it("keeps the pixels, from RGBA and from RGB", () => {
    const rgb = pixels.filter((_, n) => n % 4 !== 3);
    for (const source of [pixels, rgb]) {
      const read = PNG.sync.read(Buffer.from(encodePng(source, 3, 2)));
      expect([read.width, read.height]).toEqual([3, 2]);
      expect([...read.data]).toEqual([...pixels]);
    }
  });

  it("carries resolution and texts, Latin and other", () => {
    const texts = {
      Title: "Blocking barrier, revision C",
      Software: "postern 0.1.0",
      "postern design sha256": "0123456789abcdef".repeat(4),
      Comment: "naïve µ",
      Description: "ψ → barrier, 障壁 🚪",
    };
    const notes = readPngNotes(encodePng(pixels, 3, 2, { dpi: 300, texts }));
    expect(notes.texts).toEqual(texts);
    expect(notes.dpi).toBeCloseTo(300, 1);
  });

  it("puts its chunks between header and pixels", () => {
    const file = Buffer.from(encodePng(pixels, 3, 2, { dpi: 200, texts: { Title: "ψ" } }));
    const order = ["IHDR", "pHYs", "iTXt", "IDAT", "IEND"].map((type) => file.indexOf(type, 0, "latin1"));
    expect(order).toEqual([...order].sort((a, b) => a - b));
    expect(order[0]).toBe(12);
  });

  it("refuses wrong sizes and keywords", () => {
    expect(() => encodePng(pixels, 5, 2)).toThrow(RangeError);
    for (const keyword of ["", " a", "a ", "a  b", "x".repeat(80), "ψ", "a\nb"])
      expect(() => encodePng(pixels, 3, 2, { texts: { [keyword]: "a" } })).toThrow(TypeError);
  });
});

describe("readPngNotes", () => {
  it("refuses other bytes, and notices damage", () => {
    expect(() => readPngNotes(Buffer.from("GIF89a"))).toThrow("no PNG");
    const file = Buffer.from(encodePng(pixels, 3, 2, { texts: { Title: "abc" } }));
    file[file.indexOf("abc")] ^= 1;
    expect(() => readPngNotes(file)).toThrow("damaged");
  });
});
