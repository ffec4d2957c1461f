import { naming, UsageError } from "./usage-error.js";

/** What a command that draws takes besides the design. */
export interface FigureFlags {
  readonly out: string;
  readonly from?: readonly string[];
  readonly to?: readonly string[];
  readonly width?: string;
  readonly height?: string;
  readonly svg?: true;
}

/** A part of space and time, nm and fs; what is absent is chosen. */
export interface FigureWindow {
  xFrom?: number;
  xTo?: number;
  tFrom?: number;
  tTo?: number;
}

/** What a figure can be written as. */
export type FigureKind = "png" | "svg";

/** The kind of file that the name's ending says; --svg insists on the one. */
export function figureKind({ out, svg }: FigureFlags): FigureKind {
  const ending = /\.(png|svg)$/i.exec(out)?.[1].toLowerCase() as FigureKind | undefined;
  if (ending !== undefined && (ending === "svg" || !svg)) return ending;
  const need = svg ? "with --svg a name that ends in .svg" : "a name that ends in .png or .svg";
  throw new UsageError(
    `--out ${out}: ${need} is needed; got "${out}"`,
    `Write --out ${svg ? "map.svg" : "map.png"}, for example.`,
  );
}

/** Print size in mm, as far as it is asked for; `ratio` is the figure's own height over its width, that of a map when left out. */
export async function figureSizeOf(
  { width, height }: Pick<FigureFlags, "width" | "height">,
  ratio?: number,
): Promise<{ widthMm?: number; heightMm?: number }> {
  if (width === undefined && height === undefined) return {};
  const [{ parseQuantity }, { figureSize }, figures] = await Promise.all([
    import("../units/quantity.js"),
    import("../figures/figure.js"),
    import("../figures/map-figure.js"),
  ]);
  const millimetres = (name: string, text: string | undefined): number | undefined =>
    text === undefined
      ? undefined
      : naming(
          `--${name} ${text}`,
          SIZE_HELP,
          () => parseQuantity(text, "length", { range: "positive", example: "160 mm" }) / 1e6,
        );
  const widthMm = millimetres("width", width);
  const heightMm = millimetres("height", height);
  const { DEFAULT_DPI, DEFAULT_HEIGHT_RATIO, DEFAULT_WIDTH_MM } = figures;
  const asked = widthMm ?? DEFAULT_WIDTH_MM;
  const options = [width && `--width ${width}`, height && `--height ${height}`].filter(Boolean).join(" ");
  naming(options, SIZE_HELP, () =>
    figureSize(asked, heightMm ?? (ratio ?? DEFAULT_HEIGHT_RATIO) * asked, DEFAULT_DPI),
  );
  return { widthMm, heightMm };
}

const SIZE_HELP =
  'The size in print, as --width "160 mm" --height "112 mm"; a height left out follows from the width.';
/** What to write for the part of a map to show. */
export const WINDOW_HELP =
  'A length is a place, a time a time: --from "-50 nm" --to "80 nm" --from "100 fs".';

/** The part of space and time to show, as far as it is asked for. */
export async function figureWindow({ from = [], to = [] }: FigureFlags): Promise<FigureWindow> {
  const window: FigureWindow = {};
  if (from.length + to.length === 0) return window;
  const { placeOrTime } = await import("./place-or-time.js");
  for (const [option, texts, side] of [
    ["--from", from, "From"],
    ["--to", to, "To"],
  ] as const) {
    for (const text of texts) {
      const { axis, value } = naming(`${option} ${text}`, WINDOW_HELP, () => placeOrTime(text));
      const key = `${axis}${side}` as const;
      if (window[key] !== undefined) {
        const what = axis === "x" ? "place" : "time";
        throw new UsageError(
          `${option} ${text}: one ${what} is enough, and one was given before`,
          WINDOW_HELP,
        );
      }
      window[key] = value;
    }
  }
  for (const [begin, end, what] of [
    [window.xFrom, window.xTo, "place"],
    [window.tFrom, window.tTo, "time"],
  ] as const) {
    if (begin !== undefined && end !== undefined && !(end > begin)) {
      throw new UsageError(`--to: a ${what} after that of --from is needed`, WINDOW_HELP);
    }
  }
  return window;
}
