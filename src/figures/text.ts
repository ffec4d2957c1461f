import { type Attributes, element, escapeXml } from "./svg.js";

/** A piece of a label; symbols of quantities are set in italics (ISO 80000-1, 7.1.1). */
export interface Run {
  readonly text: string;
  readonly italic?: boolean;
}
export type Label = readonly Run[];

export const plain = (text: string): Label => [{ text }];
export const symbol = (text: string): Run => ({ text, italic: true });

/** Fonts named in the SVG: the one that the PNG is drawn with, then those of like widths. */
export const FONT_FAMILY = "DejaVu Sans, Verdana, sans-serif";

// Advance widths in thousandths of the font size for U+0020 to U+007E, read from the tables of DejaVu Sans 2.37.
const REGULAR =
  "318 401 460 838 636 950 780 275 390 390 500 838 318 361 318 337 636 636 636 636 636 636 636 636 636 636 337 337 838 838 838 531 1000 684 686 698 770 632 575 775 752 295 295 656 557 863 748 787 603 787 695 635 611 732 684 989 685 611 685 390 337 390 838 500 500 613 635 550 635 615 352 635 634 278 278 579 278 974 634 612 635 635 411 521 392 634 592 818 592 592 525 636 337 636 838";
const BOLD =
  "348 456 521 838 696 1002 872 306 457 457 523 838 380 415 380 365 696 696 696 696 696 696 696 696 696 696 400 400 838 838 838 580 1000 774 762 734 830 683 683 821 837 372 372 775 637 995 837 850 733 850 770 720 682 812 774 1103 771 724 725 457 365 457 838 500 500 675 716 593 716 678 435 716 712 343 343 665 343 1042 712 687 716 716 493 595 478 712 652 924 645 652 582 712 365 712 838";
const WIDTHS = { regular: REGULAR.split(" ").map(Number), bold: BOLD.split(" ").map(Number) };
/** Signs beyond ASCII that figures use: superscripts, thin space and subscript e; others count as wide letters. */
const NARROW = /[\u2070-\u209f\u00b9\u00b2\u00b3\u2009]/u;

/** Width of a text in units of the given font size, as DejaVu Sans sets it (other signs than ASCII by an estimate). */
export function textWidth(text: string, size: number, weight: "regular" | "bold" = "regular"): number {
  let sum = 0;
  for (const sign of text) {
    const code = sign.codePointAt(0) as number;
    sum += WIDTHS[weight][code - 32] ?? (NARROW.test(sign) ? 420 : code >= 0x1100 ? 1000 : 720);
  }
  return (sum / 1000) * size;
}

/** Where and how a label is set. */
export interface TextPlace {
  readonly x: number;
  readonly y: number;
  readonly size: number;
  readonly anchor?: "start" | "middle" | "end";
  readonly bold?: boolean;
  readonly fill?: string;
  /** Turn to read upwards, about (x, y). */
  readonly upward?: boolean;
}

/** Sets a label with its baseline at (x, y). */
export function textAt(label: Label, place: TextPlace): string {
  const { x, y, size, anchor, bold, fill, upward } = place;
  const attributes: Attributes = {
    x,
    y,
    "font-size": size,
    "text-anchor": anchor === "start" ? undefined : anchor,
    "font-weight": bold ? "bold" : undefined,
    fill,
    transform: upward ? `rotate(-90 ${x.toFixed(3)} ${y.toFixed(3)})` : undefined,
  };
  const runs = label.map((run) =>
    run.italic ? element("tspan", { "font-style": "italic" }, escapeXml(run.text)) : escapeXml(run.text),
  );
  return element("text", attributes, ...runs);
}

/** Offset of the baseline below the middle of capitals and digits: half of DejaVu's cap height of 0.729. */
export const MIDDLE = 0.365;

/**
 * Breaks a text into lines that fit a width; what does not fit into the last one ends in an ellipsis. A single word
 * wider than a line is cut.
 */
export function wrapText(
  text: string,
  width: number,
  size: number,
  lines: number,
  weight: "regular" | "bold",
): string[] {
  const fits = (candidate: string) => textWidth(candidate, size, weight) <= width;
  const words = text.split(/\s+/).filter((word) => word !== "");
  const wrapped: string[] = [];
  while (words.length > 0 && wrapped.length < lines) {
    let line = words.shift() as string;
    while (words.length > 0 && fits(`${line} ${words[0]}`)) line += ` ${words.shift()}`;
    if ((wrapped.length === lines - 1 && words.length > 0) || !fits(line)) {
      const signs = [...(words.length > 0 ? `${line} ${words.join(" ")}` : line)];
      if (wrapped.length === lines - 1) {
        while (signs.length > 0 && !fits(`${signs.join("").trimEnd()}…`)) signs.pop();
        wrapped.push(`${signs.join("").trimEnd()}…`);
        break;
      }
      const rest: string[] = [];
      const head = [...line];
      while (head.length > 1 && !fits(head.join(""))) rest.unshift(head.pop() as string);
      words.unshift(rest.join(""));
      line = head.join("");
    }
    wrapped.push(line);
  }
  return wrapped;
}
