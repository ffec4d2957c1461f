import { textWidth } from "../../src/figures/text.js";

/** All texts of a figure, in order, with the tags inside removed. */
export const texts = (svg: string): string[] =>
  [...svg.matchAll(/<text[^>]*>(.*?)<\/text>/g)].map((match) => match[1].replace(/<[^>]*>/g, ""));

/** Rough boxes of all texts, from the font's own widths: capitals' height above the baseline, descenders left out. */
export function textBoxes(content: string) {
  return [...content.matchAll(/<text ([^>]*)>(.*?)<\/text>/g)].map(([, attributes, inner]) => {
    const read = (name: string) => attributes.match(new RegExp(`(?:^| )${name}="([^"]*)"`))?.[1];
    const text = inner.replace(/<[^>]*>/g, "").replace(/&\w+;/g, "&");
    const [x, y, size] = ["x", "y", "font-size"].map((name) => Number(read(name)));
    const length = textWidth(text, size, read("font-weight") === "bold" ? "bold" : "regular");
    const before = { start: 0, middle: length / 2, end: length }[read("text-anchor") ?? "start"] as number;
    return read("transform")
      ? { text, left: x - 0.73 * size, right: x, top: y - (length - before), bottom: y + before }
      : { text, left: x - before, right: x - before + length, top: y - 0.73 * size, bottom: y };
  });
}
