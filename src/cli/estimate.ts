import { Command } from "commander";
import { addDesignFlags, type DesignFlags, openDesign, placingLimits } from "./design-flags.js";
import { EXIT } from "./exit-codes.js";
import { progressLine } from "./progress.js";
import type { Session } from "./session.js";
import { print, printJson, say } from "./terminal.js";
import { UsageError } from "./usage-error.js";

interface Flags extends DesignFlags {
  readonly out?: string;
  readonly json?: true;
}

const EXAMPLES = `
Examples:
  postern estimate blocking.yaml
  postern estimate blocking.yaml --out results
  postern estimate blocking.yaml --set "potential.layers[0].width=3 nm" --accuracy 1e-9
  postern estimate blocking.yaml --json`;

/** postern estimate FILE */
export function estimateCommand(session: Session): Command {
  const command = new Command("estimate")
    .summary("transmission and reflection with bounds and a verdict")
    .description(
      "Computes how much of the packet gets through and how much comes back, each with a bound on its error, " +
        "and says whether the answer can be trusted. Ends with 0 when it can, with 3 when it is doubtful.",
    )
    .argument("<FILE>", "design file")
    .option("--out <DIR>", "also write summary.json, series.csv and map.png into this folder")
    .option("--json", "print one JSON document instead of text");
  return addDesignFlags(command)
    .addHelpText("after", EXAMPLES)
    .action((file: string, flags: Flags) => run(file, flags, session));
}

async function run(file: string, flags: Flags, session: Session): Promise<void> {
  if (flags.out === "")
    throw new UsageError("--out: the name of a folder is needed", "Write --out results, for example.");
  const opened = await openDesign(file, flags);
  if (flags.out !== undefined) (await import("../files/atomic.js")).checkFolder(flags.out);
  const { estimate } = await import("../studies/estimate.js");
  const progress = progressLine();
  try {
    const options = { signal: session.signal, onProgress: progress.onProgress };
    const answer = await placingLimits(opened, () => estimate(opened.design, options));
    const written =
      flags.out === undefined
        ? []
        : await (await import("./result-folder.js")).writeResults(flags.out, opened, answer, options);
    progress.stop();
    if (flags.json) {
      const { estimateDocument } = await import("./estimate-document.js");
      printJson(estimateDocument(answer));
    } else {
      const { estimateText } = await import("./estimate-text.js");
      print(estimateText(answer));
    }
    for (const path of written) say(path);
    session.exitCode = answer.verdict === "trusted" ? EXIT.done : EXIT.doubtful;
  } finally {
    progress.stop();
  }
}
