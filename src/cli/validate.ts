import { Command } from "commander";
import { addDesignFlags, type DesignFlags, openDesign } from "./design-flags.js";
import type { Session } from "./session.js";
import { print, printJson } from "./terminal.js";

interface Flags extends DesignFlags {
  readonly json?: true;
}

const EXAMPLES = `
The text is YAML with comments: it can be saved and used as a design file.

Examples:
  postern validate blocking.yaml
  postern validate blocking.yaml --set "packet.energy=0.2 eV" > changed.yaml`;

/** postern validate FILE */
export function validateCommand(_session: Session): Command {
  const command = new Command("validate")
    .summary("reads a design and prints it in full, with what is chosen automatically")
    .description(
      "Reads a design, prints it in full with its defaults and automatic numerics, and computes nothing.",
    )
    .argument("<FILE>", "design file")
    .option("--json", "print one JSON document instead of text");
  return addDesignFlags(command).addHelpText("after", EXAMPLES).action(run);
}

async function run(file: string, flags: Flags): Promise<void> {
  const opened = await openDesign(file, flags);
  const { describeDesign } = await import("../design/describe.js");
  const { design, yaml, sha256 } = describeDesign(opened.source.text, opened.source.options);
  if (flags.json) printJson({ design: { title: opened.design.title, sha256, full: design } });
  else print(`${yaml}\n# A right design. sha256 of its canonical form:\n# ${sha256}\n`);
}
