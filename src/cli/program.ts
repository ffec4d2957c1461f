import { Command, type CommanderError } from "commander";
import { crosscheckCommand } from "./crosscheck.js";
import { estimateCommand } from "./estimate.js";
import { EXIT } from "./exit-codes.js";
import { mapCommand } from "./map.js";

import { potentialsCommand } from "./potentials.js";
import { errorReport } from "./report-error.js";
import { Interrupted, type Session } from "./session.js";
import { spectrumCommand } from "./spectrum.js";
import { COLUMNS, say, watchOutput } from "./terminal.js";
import { UsageError } from "./usage-error.js";
import { validateCommand } from "./validate.js";
import { version } from "./version.js";

/** Every command, in the order in which help lists them. A new command is one file and one line here. */
const COMMANDS = [
  estimateCommand,
  crosscheckCommand,
  spectrumCommand,
  mapCommand,
  validateCommand,
  potentialsCommand,
];

/** Runs the program with its arguments; returns what it ends with. */
export async function run(args: readonly string[]): Promise<number> {
  watchOutput();
  const interruption = new AbortController();
  process.on("SIGINT", () => {
    // Whoever presses Ctrl-C twice does not want to wait for anything.
    if (interruption.signal.aborted) process.exit(EXIT.interrupted);
    interruption.abort(new Interrupted());
  });
  const session: Session = { signal: interruption.signal, exitCode: EXIT.done };
  try {
    const program = buildProgram(session);
    if (args.length === 0) throw new UsageError("a command is needed", helpLine(program));
    await program.parseAsync(args, { from: "user" });
    return session.exitCode;
  } catch (error) {
    if (error === DONE) return EXIT.done;
    const { lines, exitCode } = errorReport(error);
    say(`postern: ${lines.join("\n")}`);
    if (args.includes("--trace")) say(traceOf(error));
    return exitCode;
  }
}

/** Thrown after help or version were printed: commander knows no other way to stop. */
const DONE = Symbol("done");

function buildProgram(session: Session): Command {
  const program = new Command("postern")
    .description(
      "How much of a wavepacket gets through a one-dimensional barrier, with an error bound that holds.",
    )
    .version(version(), "--version", "print the version")
    .option("--trace", "with an error, show where in the program it came up")
    .addHelpText(
      "after",
      "\nA design is a short YAML or JSON file with title, particle, potential and packet.\n" +
        "Exit codes: 0 done, 1 fault of the program, 2 wrong use or design, 3 done but doubtful, 130 stopped.",
    );
  for (const make of COMMANDS) program.addCommand(make(session));
  for (const command of [program, ...program.commands]) {
    command
      .helpOption("-h, --help", "show this help")
      .configureHelp({ helpWidth: COLUMNS, showGlobalOptions: true })
      .configureOutput({ writeErr: () => {}, outputError: () => {} })
      .exitOverride((error) => refuse(error, command));
  }
  return program.helpCommand(false);
}

/** Turns commander's errors into those of the contract. */
function refuse(error: CommanderError, command: Command): never {
  if (error.exitCode === 0) throw DONE;
  const problem = error.message
    .replace(/^error: /, "")
    .replace(/\n\(Did you mean (.*)\?\)$/s, (_, meant: string) => `; did you mean '${meant}'?`)
    .replaceAll("'", '"');
  throw new UsageError(problem, helpLine(command));
}

function helpLine(command: Command): string {
  if (command.parent) return `Run "postern ${command.name()} --help" for what it takes.`;
  return `Commands: ${command.commands.map((each) => each.name()).join(", ")}. Run "postern --help" for what they do.`;
}

function traceOf(error: unknown): string {
  return error instanceof Error ? (error.stack ?? String(error)) : String(error);
}
