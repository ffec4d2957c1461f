import { statSync } from "node:fs";
import { dirname } from "node:path";
import { Command, Option } from "commander";
import type { ScaleKind } from "../figures/density-scale.js";
import type { Figure } from "../figures/figure.js";
import { addDesignFlags, collect, type DesignFlags, openDesign, placingLimits } from "./design-flags.js";
import {
  type FigureFlags,
  type FigureKind,
  type FigureWindow,
  figureKind,
  figureSizeOf,
  figureWindow,
  WINDOW_HELP,
} from "./figure-flags.js";
import { progressLine } from "./progress.js";
import { type Session, stopIfInterrupted } from "./session.js";
import { print, printJson } from "./terminal.js";
import { UsageError } from "./usage-error.js";

interface Flags extends DesignFlags, FigureFlags {
  readonly scale: ScaleKind;
  readonly json?: true;
}

const EXAMPLES = `
Without --from and --to the map shows the encounter of the packet with the structure.

Examples:
  postern map blocking.yaml --out map.png
  postern map blocking.yaml --out map.png --from "-60 nm" --to "40 nm" --from "100 fs" --to "250 fs"
  postern map blocking.yaml --out map.svg --svg --scale log --width "80 mm" --height "60 mm"`;

/** postern map FILE --out FILE */
export function mapCommand(session: Session): Command {
  const command = new Command("map")
    .summary("the density over space and time as a figure")
    .description("Draws the density of the packet over space and time, with the potential above it.")
    .argument("<FILE>", "design file")
    .requiredOption("--out <FILE>", "the figure to write, with the ending .png or .svg")
    .option(
      "--from <Q>",
      'begin of the part to show: a length is x, a time is t, as "-50 nm"; repeatable',
      collect,
    )
    .option("--to <Q>", "its end, likewise", collect)
    .addOption(
      new Option("--scale <KIND>", "colours of the density").choices(["linear", "log"]).default("linear"),
    )
    .option("--width <Q>", 'width in print, as "160 mm"')
    .option("--height <Q>", "height in print, likewise")
    .option("--svg", "write an SVG, for a name with the ending .svg")
    .option("--json", "print one JSON document that names the file and the numerics");
  return addDesignFlags(command)
    .addHelpText("after", EXAMPLES)
    .action((file: string, flags: Flags) => run(file, flags, session));
}

async function run(file: string, flags: Flags, session: Session): Promise<void> {
  const kind = figureKind(flags);
  const size = await figureSizeOf(flags);
  const window = await figureWindow(flags);
  const opened = await openDesign(file, flags);
  await checkPlace(flags.out);
  const [{ history }, draw] = await Promise.all([import("../studies/history.js"), import("./draw-map.js")]);
  const progress = progressLine();
  try {
    const options = { window, signal: session.signal, onProgress: progress.onProgress };
    const seen = await placingLimits(opened, () => history(opened.design, options)).catch((error) =>
      windowFault(window, error),
    );
    const figure = draw.drawMap(opened.design, seen, { ...size, scale: flags.scale });
    const content = await rendered(figure, kind, draw.figureTexts(opened.design));
    await stopIfInterrupted(session.signal);
    await (await import("../files/atomic.js")).writeFileAtomic(flags.out, content);
    progress.stop();
    if (flags.json) printJson({ files: [flags.out], ...draw.historyDocument(seen) });
    else print(flags.out);
  } finally {
    progress.stop();
  }
}

/** Where one end was given and the other one is chosen, nothing may be left between them. */
function windowFault(window: FigureWindow, error: unknown): never {
  const { xFrom, xTo, tFrom, tTo } = window;
  const oneSided =
    (xFrom === undefined) !== (xTo === undefined) || (tFrom === undefined) !== (tTo === undefined);
  if (!(oneSided && error instanceof RangeError)) throw error;
  throw new UsageError(
    "--from, --to: nothing is left to show: an end left out is chosen near the structure and the encounter; give both ends",
    WINDOW_HELP,
  );
}

/** Asks before the calculation whether the file can be written. @throws OutputError */
async function checkPlace(out: string): Promise<void> {
  const { checkFolder, OutputError } = await import("../files/atomic.js");
  checkFolder(dirname(out));
  if (statSync(out, { throwIfNoEntry: false })?.isDirectory()) {
    throw new OutputError(out, "there is a folder of this name; choose another or remove it");
  }
}

async function rendered(
  figure: Figure,
  kind: FigureKind,
  texts: Record<string, string>,
): Promise<string | Uint8Array> {
  const { renderPng, renderSvg } = await import("../files/render-figure.js");
  return kind === "svg" ? renderSvg(figure) : renderPng(figure, texts);
}
