import { Command, Option } from "commander";
import type { SpectrumMethod } from "../studies/spectrum-row.js";
import { addDesignFlags, type DesignFlags, openDesign, placingLimits } from "./design-flags.js";
import { EXIT } from "./exit-codes.js";
import { type FigureFlags, figureSizeOf } from "./figure-flags.js";
import { progressLine } from "./progress.js";
import type { Session } from "./session.js";
import { type EnergyFlags, energiesOf } from "./spectrum-flags.js";
import { print, printJson, say } from "./terminal.js";
import { UsageError } from "./usage-error.js";

interface Flags extends DesignFlags, EnergyFlags, Pick<FigureFlags, "width" | "height"> {
  readonly method: SpectrumMethod;
  readonly out?: string;
  readonly reflection?: true;
  readonly json?: true;
}

const EXAMPLES = `
Energies are measured from the left level. Without any, those of the packet are taken.

Examples:
  postern spectrum blocking.yaml
  postern spectrum blocking.yaml --low "0.05 eV" --high "0.4 eV" --points 351 --out results
  postern spectrum blocking.yaml --energies "0.1 eV,0.15 eV,0.2 eV" --method stationary
  postern spectrum blocking.yaml --out results --width "80 mm" --reflection`;

/** postern spectrum FILE */
export function spectrumCommand(session: Session): Command {
  const command = new Command("spectrum")
    .summary("transmission against energy, with a bound at each")
    .description(
      "Computes transmission and reflection of plane waves against energy, each with a bound on its error: from " +
        "wavepackets that pass the structure in time, or by the stationary witness. Ends with 0 when every bound " +
        "is within the accuracy asked for, with 3 when it is doubtful.",
    )
    .argument("<FILE>", "design file")
    .option("--low <Q>", 'lowest energy, as "0.05 eV"')
    .option("--high <Q>", "highest energy, likewise")
    .option("--points <N>", "number of energies from the lowest to the highest (default: 101)")
    .option("--energies <Q,Q,...>", "these energies, ascending, instead of a range")
    // The names are SPECTRUM_METHODS of the study, which is not loaded for a page of help.
    .addOption(
      new Option("--method <NAME>", "how it is computed").choices(["packet", "stationary"]).default("packet"),
    )
    .option("--out <DIR>", "also write spectrum.csv, spectrum.json and spectrum.png into this folder")
    .option("--width <Q>", 'width of the figure in print, as "160 mm"; with --out')
    .option("--height <Q>", "its height, likewise")
    .option("--reflection", "draw the reflection too")
    .option("--json", "print one JSON document instead of text");
  return addDesignFlags(command)
    .addHelpText("after", EXAMPLES)
    .action((file: string, flags: Flags) => run(file, flags, session));
}

async function run(file: string, flags: Flags, session: Session): Promise<void> {
  checkOut(flags);
  const size = await sizeOf(flags);
  const opened = await openDesign(file, flags);
  const energies = await placingLimits(opened, () => energiesOf(flags, opened.design));
  if (flags.out !== undefined) (await import("../files/atomic.js")).checkFolder(flags.out);
  const { spectrum } = await import("../studies/spectrum.js");
  const progress = progressLine();
  try {
    const options = { method: flags.method, signal: session.signal, onProgress: progress.onProgress };
    const answer = await placingLimits(opened, () => spectrum(opened.design, energies, options));
    const figure = { ...size, reflection: flags.reflection };
    const written =
      flags.out === undefined
        ? []
        : await (await import("./spectrum-folder.js")).writeSpectrum(
            flags.out,
            opened,
            answer,
            figure,
            session.signal,
          );
    progress.stop();
    if (flags.json) {
      const { spectrumDocument } = await import("./spectrum-document.js");
      printJson(spectrumDocument(answer));
    } else {
      const { spectrumText } = await import("./spectrum-text.js");
      print(spectrumText(answer, flags.out !== undefined));
    }
    for (const path of written) say(path);
    session.exitCode = answer.verdict === "trusted" ? EXIT.done : EXIT.doubtful;
  } finally {
    progress.stop();
  }
}

/** Print size of the figure, as far as it is asked for; figures are not loaded where none is drawn. */
async function sizeOf(flags: Flags): Promise<{ widthMm?: number; heightMm?: number }> {
  if (flags.width === undefined && flags.height === undefined) return {};
  const { SPECTRUM_HEIGHT_RATIO } = await import("../figures/spectrum-figure.js");
  return figureSizeOf(flags, SPECTRUM_HEIGHT_RATIO);
}

/** What concerns the figure needs a folder for it. */
function checkOut({ out, width, height, reflection }: Flags): void {
  const help = "Write --out results, for example.";
  if (out === "") throw new UsageError("--out: the name of a folder is needed", help);
  if (out !== undefined) return;
  const given = [
    width !== undefined && "--width",
    height !== undefined && "--height",
    reflection && "--reflection",
  ];
  const first = given.find(Boolean);
  if (first) throw new UsageError(`${first}: --out is needed beside it, as it concerns the figure`, help);
}
