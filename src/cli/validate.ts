import { Command } from "commander";
import { addDesignFlags, type DesignFlags, openDesign, placingLimits } from "./design-flags.js";
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
    .summary("the design in full, with what is chosen automatically")
    .description(
      "Reads a design and prints it in full: defaults filled in, every numeric choice with its reason, and warnings. " +
        "Computes nothing.",
    )
    .argument("<FILE>", "design file")
    .option("--json", "print one JSON document instead of text");
  return addDesignFlags(command).addHelpText("after", EXAMPLES).action(run);
}

async function run(file: string, flags: Flags): Promise<void> {
  const opened = await openDesign(file, flags);
  const [{ describeDesign }, { explainPlan }] = await Promise.all([
    import("../design/describe.js"),
    import("../studies/explain.js"),
  ]);
  const described = describeDesign(opened.source.text, opened.source.options);
  const plan = await placingLimits(opened, () => explainPlan(opened.design));
  if (flags.json) {
    const { design, sha256 } = described;
    printJson({ design: { title: opened.design.title, sha256, full: design }, ...plan });
  } else print((await import("./validate-text.js")).validateText(described, plan));
}
