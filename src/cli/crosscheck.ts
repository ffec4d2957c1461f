import { Command } from "commander";
import { addDesignFlags, type DesignFlags, openDesign, placingLimits } from "./design-flags.js";
import { EXIT } from "./exit-codes.js";
import { type FigureFlags, figureSizeOf } from "./figure-flags.js";
import { progressLine } from "./progress.js";
import type { Session } from "./session.js";
import { print, printJson, say } from "./terminal.js";
import { UsageError } from "./usage-error.js";

interface Flags extends DesignFlags, Pick<FigureFlags, "width" | "height"> {
  readonly out?: string;
  readonly json?: true;
}

const EXAMPLES = `
Both steppers are taken, whatever the design names; the bounds decide whether they agree.

Examples:
  postern crosscheck blocking.yaml
  postern crosscheck blocking.yaml --out results --width "80 mm"
  postern crosscheck blocking.yaml --set "packet.energy=0.2 eV" --json`;

/** postern crosscheck FILE */
export function crosscheckCommand(session: Session): Command {
  const command = new Command("crosscheck")
    .summary("both steppers and a stationary witness, side by side")
    .description(
      "Computes a design by the split operator and by Crank-Nicolson, each on its own best grid and again on matched " +
        "settings, and beside them by stationary waves, which know no time step. Ends with 0 when everything agrees " +
        "within the bounds, with 3 when it does not.",
    )
    .argument("<FILE>", "design file")
    .option("--out <DIR>", "also write crosscheck.json, crosscheck.csv and crosscheck.png into this folder")
    .option("--width <Q>", 'width of the figure in print, as "160 mm"; with --out')
    .option("--height <Q>", "its height, likewise")
    .option("--json", "print one JSON document instead of text");
  return addDesignFlags(command)
    .addHelpText("after", EXAMPLES)
    .action((file: string, flags: Flags) => run(file, flags, session));
}

async function run(file: string, flags: Flags, session: Session): Promise<void> {
  checkFlags(flags);
  const { CROSSCHECK_HEIGHT_RATIO } = await import("../figures/drawn-crosscheck.js");
  const size = await figureSizeOf(flags, CROSSCHECK_HEIGHT_RATIO);
  const opened = await openDesign(file, flags);
  if (flags.out !== undefined) (await import("../files/atomic.js")).checkFolder(flags.out);
  const { crosscheck } = await import("../studies/crosscheck.js");
  const progress = progressLine();
  try {
    const options = { signal: session.signal, onProgress: progress.onProgress };
    const answer = await placingLimits(opened, () => crosscheck(opened.design, options));
    const written =
      flags.out === undefined
        ? []
        : await (await import("./crosscheck-folder.js")).writeCrosscheck(
            flags.out,
            opened,
            answer,
            size,
            session.signal,
          );
    progress.stop();
    if (flags.json) {
      const { crosscheckDocument } = await import("./crosscheck-document.js");
      printJson(crosscheckDocument(answer));
    } else {
      const { crosscheckText } = await import("./crosscheck-text.js");
      print(crosscheckText(answer));
    }
    for (const path of written) say(path);
    session.exitCode = answer.agree ? EXIT.done : EXIT.doubtful;
  } finally {
    progress.stop();
  }
}

function checkFlags({ stepper, order, out, width, height }: Flags): void {
  for (const [flag, value] of [
    ["--stepper", stepper],
    ["--order", order],
  ])
    if (value !== undefined)
      throw new UsageError(
        `${flag} ${value}: a crosscheck takes every stepper that can do the design`,
        "Leave this out, or run `postern estimate` with it.",
      );
  if (out === "")
    throw new UsageError("--out: the name of a folder is needed", "Write --out results, for example.");
  if (out === undefined && (width ?? height) !== undefined)
    throw new UsageError(
      `--${width === undefined ? "height" : "width"}: the figure is drawn with --out only`,
      "Write --out results, for example.",
    );
}
