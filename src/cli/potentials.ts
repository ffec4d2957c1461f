import { Command } from "commander";
import type { Session } from "./session.js";
import { print, printJson } from "./terminal.js";
import { UsageError } from "./usage-error.js";

interface Flags {
  readonly json?: true;
}

const EXAMPLES = `
Examples:
  postern potentials
  postern potentials gaas-algaas-double-barrier
  postern potentials eckart
  postern potentials my-barrier.yaml`;

/** postern potentials [NAME] */
export function potentialsCommand(_session: Session): Command {
  return new Command("potentials")
    .summary("the ready-made potentials and the shapes, or one of them in full")
    .description(
      "Lists the ready-made potentials and the shapes. With a name: formula, parameters, source, values to check " +
        "against, and a drawing of the profile.",
    )
    .argument("[NAME]", "a ready-made potential, a shape, or the path of a potential file of your own")
    .option("--json", "print one JSON document instead of text")
    .addHelpText("after", EXAMPLES)
    .action(run);
}

async function run(name: string | undefined, { json }: Flags): Promise<void> {
  const [catalogue, text] = await Promise.all([import("./catalogue.js"), import("./catalogue-text.js")]);
  if (name === undefined) {
    const all = catalogue.overview();
    json ? printJson(all) : print(text.overviewText(all));
    return;
  }
  const entry = catalogue.entryNamed(name) ?? (await unknown(name));
  if (json) {
    const { drawing: _, ...document } = entry;
    printJson(document);
  } else print(text.entryText(entry));
}

async function unknown(name: string): Promise<never> {
  const [{ nearest }, { knownNames }] = await Promise.all([
    import("../units/nearest.js"),
    import("./catalogue.js"),
  ]);
  const meant = nearest(name, knownNames());
  const hint = meant === undefined ? "" : `; did you mean "${meant}"?`;
  throw new UsageError(
    `no ready-made potential and no shape of that name: got "${name}"${hint}`,
    'Run "postern potentials" for the list.',
  );
}
