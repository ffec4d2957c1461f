import { describe, expect, it } from "vitest";
import { figureToSvg } from "../../src/figures/figure.js";
import { mapFigure } from "../../src/figures/map-figure.js";
import { escapeXml } from "../../src/figures/svg.js";
import { textWidth, wrapText } from "../../src/figures/text.js";
import { inventedMap, inventedProfile, smoothProfile } from "./invented.js";
import { textBoxes, texts } from "./read-figure.js";

const small = inventedMap(60, 40);
const barrier = inventedProfile([-5, -2, 2, 5], [0.3, 0, 0.3], { masses: [1.4, 1, 1.4] });

/** A strict reading of XML's bones: tags nest, attributes are quoted, no bare signs. Returns the names of elements. */
function readXml(text: string): string[] {
  const open: string[] = [];
  const names: string[] = [];
  const token = /<\?xml[^?]*\?>|<\/([\w:-]+)>|<([\w:-]+)((?:\s+[\w:-]+="[^"<]*")*)\s*(\/?)>|([^<]+)/gy;
  let at = 0;
  for (let match = token.exec(text); match !== null; match = token.exec(text)) {
    at = token.lastIndex;
    const [, closing, opening, attributes, selfClosing, content] = match;
    if (closing !== undefined && open.pop() !== closing) throw new Error(`</${closing}> closes nothing`);
    if (opening !== undefined) {
      names.push(opening);
      if (selfClosing === "") open.push(opening);
    }
    const bare = (attributes ?? content ?? "").replace(/&(?:amp|lt|gt|quot|#39);/g, "");
    if (bare.includes("&")) throw new Error(`a bare & in "${bare}"`);
  }
  if (at !== text.length || open.length > 0)
    throw new Error(`not well-formed at ${at}: ${text.slice(at, at + 40)}`);
  return names;
}

describe("mapFigure", () => {
  it("labels its axes with quantity and unit at every scale", () => {
    const labels = (unit: number, time: number) =>
      texts(mapFigure(inventedMap(60, 40, unit, time), barrier, { title: "" }).content);
    expect(labels(1, 1)).toEqual(
      expect.arrayContaining(["position x (nm)", "time t (fs)", "density |ψ|² (nm⁻¹)", "V (eV)"]),
    );
    expect(labels(0.001, 1e-3)).toEqual(
      expect.arrayContaining(["position x (pm)", "time t (as)", "density |ψ|² (pm⁻¹)"]),
    );
    expect(labels(100, 1e10)).toEqual(
      expect.arrayContaining(["position x (µm)", "time t (ms)", "density |ψ|² (µm⁻¹)"]),
    );
  });

  it("ticks the axes and the colour bar, and names mean energy and inner mass", () => {
    const found = texts(mapFigure(small, barrier, { title: "T", meanEnergyEv: 0.15 }).content);
    expect(found).toEqual(expect.arrayContaining(["−150", "0", "150", "300", "0.00", "0.04", "0.3"]));
    expect(found).toEqual(expect.arrayContaining(["mean energy", "0.15 eV", "0.0938 mₑ", "T"]));
    expect(found.join("")).not.toContain("-");
    const log = texts(mapFigure(small, barrier, { title: "", scale: "log" }).content);
    expect(log).toEqual(expect.arrayContaining(["≤ 10⁻⁸", "10⁻²"]));
  });

  it("scales energies of an atom to peV", () => {
    const sheet = smoothProfile((x) => 3e-12 * Math.exp(-x * x * 1e-7));
    const found = texts(mapFigure(small, sheet, { title: "", meanEnergyEv: 2.1e-12 }).content);
    expect(found).toEqual(expect.arrayContaining(["V (peV)", "2.1 peV"]));
  });

  it("lays the raster on whole pixels, with time upward", () => {
    for (const dpi of [96, 200, 300]) {
      const { raster, columns, rows, width } = mapFigure(small, barrier, { title: "A", dpi });
      if (raster === undefined) throw new Error("no raster");
      expect(raster.data.length).toBe(4 * raster.columns * raster.rows);
      for (const side of [raster.x, raster.y, raster.width, raster.height, width]) {
        const pixels = (side * dpi) / 96;
        expect(pixels).toBeCloseTo(Math.round(pixels), 9);
      }
      expect(Math.round((raster.width * dpi) / 96)).toBe(raster.columns);
      expect(columns).toBe(Math.round((160 / 25.4) * dpi));
      expect(rows).toBe(Math.round((112 / 25.4) * dpi));
    }
    // The packet starts on the left: bright at the bottom left, dark at the top left corner's middle.
    const { raster } = mapFigure(small, barrier, { title: "", dpi: 100 });
    if (raster === undefined) throw new Error("no raster");
    const green = (x: number, y: number) =>
      raster.data[4 * (Math.floor(y * raster.rows) * raster.columns + Math.floor(x * raster.columns)) + 1];
    expect(green(80 / 300, 0.99)).toBeGreaterThan(green(80 / 300, 0.01) + 40);
  });

  it("shows a part of the map, and refuses one outside", () => {
    const part = { title: "", xFromNm: -30, xToNm: 30, tFromFs: 40, tToFs: 120 };
    const found = texts(mapFigure(small, barrier, part).content);
    expect(found).toEqual(expect.arrayContaining(["−30", "30", "40", "120"]));
    expect(found).not.toContain("150");
    expect(() => mapFigure(small, barrier, { title: "", xFromNm: -200 })).toThrow(/-150 to 150 nm/);
    expect(() => mapFigure(small, barrier, { title: "", tFromFs: 50, tToFs: 50 })).toThrow(RangeError);
  });

  it("refuses a map whose densities do not fill it", () => {
    expect(() => mapFigure({ ...small, rows: 41 }, barrier, { title: "" })).toThrow("60 x 41 cells");
  });

  it.each([
    [{ widthMm: 10 }, "width"],
    [{ heightMm: 2000 }, "height"],
    [{ dpi: 10 }, "resolution"],
    [{ widthMm: 1000, heightMm: 1000, dpi: 1200 }, "too many"],
    [{ widthMm: Number.NaN }, "width"],
  ])("refuses a size of %o", (size, message) => {
    expect(() => mapFigure(small, barrier, { title: "", ...size })).toThrow(message);
  });

  it("keeps every letter at 5.5 pt or more when printed 80 mm wide", () => {
    for (const options of [{}, { widthMm: 80 }, { widthMm: 240 }, { heightMm: 80 }]) {
      const figure = mapFigure(small, barrier, { title: "A", meanEnergyEv: 0.15, scale: "log", ...options });
      const sizes = [...figure.content.matchAll(/font-size="([\d.]+)"/g)].map((match) => Number(match[1]));
      expect(sizes.length).toBeGreaterThan(20);
      const printed = Math.min(1, 80 / 25.4 / (figure.width / 96));
      expect(Math.min(...sizes) * 0.75 * printed).toBeGreaterThanOrEqual(5.5);
    }
  });

  it("keeps every text inside the page and no two of them on one another", () => {
    const cases = [
      mapFigure(small, barrier, { title: "A title", meanEnergyEv: 0.15 }),
      mapFigure(small, barrier, { title: "A title", meanEnergyEv: 0.29, scale: "log" }),
      mapFigure(small, barrier, { title: "x".repeat(300), meanEnergyEv: 0.02, widthMm: 80 }),
      mapFigure(small, barrier, { title: "flat", meanEnergyEv: 0.15, widthMm: 250, heightMm: 100 }),
      mapFigure(small, inventedProfile([0, 9], [0], { strengths: [1, 1] }), {
        title: "deltas",
        meanEnergyEv: 0.15,
      }),
    ];
    for (const { content, width, height } of cases) {
      const boxes = textBoxes(content);
      expect(boxes.length).toBeGreaterThan(15);
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

  it("draws a delta as an arrow with its strength", () => {
    const wall = inventedProfile([0, 9, 100], [0, 0], { strengths: [0.5, 0.5, -0.2] });
    const found = texts(mapFigure(small, wall, { title: "", meanEnergyEv: 0.15 }).content);
    expect(found).toEqual(expect.arrayContaining(["2 × 0.5 eV nm", "−0.2 eV nm"]));
  });

  it("is the same twice", () => {
    const [first, second] = [1, 2].map(() => mapFigure(small, barrier, { title: "Same", scale: "log" }));
    expect(first.content).toBe(second.content);
    expect(Buffer.compare(first.raster?.data as Uint8Array, second.raster?.data as Uint8Array)).toBe(0);
  });
});

describe("figureToSvg", () => {
  it("is well-formed whatever the title", () => {
    const title = `<b>"Ψ & µ"</b> 'α' ]]> \u0000\u0007 \ud800 🚪 naïve`;
    const svg = figureToSvg(mapFigure(small, barrier, { title }), "data:,");
    expect(readXml(svg)).toEqual(
      expect.arrayContaining(["svg", "title", "desc", "image", "text", "path", "clipPath"]),
    );
    expect(svg).toContain(
      "&lt;b&gt;&quot;Ψ &amp; µ&quot;&lt;/b&gt; &#39;α&#39; ]]&gt; \ufffd\ufffd \ufffd 🚪 naïve",
    );
    expect(svg).toContain('width="160.02mm"');
  });

  it("asks for the address of its raster", () => {
    expect(() => figureToSvg(mapFigure(small, barrier, { title: "" }))).toThrow("address");
  });

  it("escapes every sign that means something in XML", () => {
    expect(escapeXml("&<>\"'")).toBe("&amp;&lt;&gt;&quot;&#39;");
    expect(() => readXml("<a>&</a>")).toThrow();
    expect(() => readXml("<a><b></a></b>")).toThrow();
  });
});

describe("wrapText", () => {
  it("breaks between words, cuts what is too long, and marks what is left out", () => {
    expect(wrapText("one two three", 1000, 10, 2, "regular")).toEqual(["one two three"]);
    expect(wrapText("one two three", 45, 10, 2, "regular")).toEqual(["one two", "three"]);
    expect(wrapText("", 45, 10, 2, "bold")).toEqual([]);
    const cut = wrapText("abc ".repeat(50), 60, 10, 2, "bold");
    expect(cut).toHaveLength(2);
    expect(cut[1].endsWith("…")).toBe(true);
    for (const line of [...cut, ...wrapText("m".repeat(90), 60, 10, 2, "bold")])
      expect(textWidth(line, 10, "bold")).toBeLessThanOrEqual(60);
  });
});
