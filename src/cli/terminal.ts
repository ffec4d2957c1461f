import { EXIT } from "./exit-codes.js";

/** Widest line of text that commands print. */
export const COLUMNS = 100;

/** Prints a result. */
export function print(text: string): void {
  process.stdout.write(text.endsWith("\n") ? text : `${text}\n`);
}

/** Prints the one JSON document of a command. */
export function printJson(document: unknown): void {
  print(JSON.stringify(document, undefined, 2));
}

/** Prints what is no result. */
export function say(text: string): void {
  process.stderr.write(`${text}\n`);
}

/** Text in bold where a person looks at it and has not asked for plain text (https://no-color.org). */
export function bold(text: string): string {
  const plain = !process.stdout.isTTY || process.env.NO_COLOR || process.env.TERM === "dumb";
  return plain ? text : `\u001b[1m${text}\u001b[22m`;
}

/** A reader that closes its pipe (`| head`) has what it wanted; any other failure of the output is told. */
export function watchOutput(): void {
  process.stdout.on("error", (error: NodeJS.ErrnoException) => {
    if (error.code === "EPIPE") return;
    say(`postern: standard output: ${error.code === "ENOSPC" ? "the disk is full" : error.message}`);
    process.exitCode = EXIT.fault;
    // Whatever the command still returns must not cover this.
    process.once("exit", () => {
      process.exitCode = EXIT.fault;
    });
  });
  process.stderr.on("error", () => {});
}

/** Lines of at most `columns` characters; those after the first are indented. Words are kept whole. */
export function wrap(text: string, columns = COLUMNS, indent = ""): string {
  const lines: string[] = [];
  let line = /^ */.exec(text)?.[0] ?? "";
  let empty = true;
  for (const word of text.trimStart().split(" ")) {
    if (!empty && line.length + 1 + word.length > columns) {
      lines.push(line);
      line = indent;
      empty = true;
    }
    line += empty ? word : ` ${word}`;
    empty = false;
  }
  return [...lines, line].join("\n");
}

/** Rows of cells as aligned lines, two spaces between columns; the last column is wrapped below itself. */
export function table(rows: readonly (readonly string[])[], indent = "", most = COLUMNS): string {
  const length = (text: string) => [...text].length;
  const columns = Math.max(...rows.map((row) => row.length));
  const widths = Array.from({ length: columns - 1 }, (_, i) =>
    Math.max(...rows.map((row) => (i < row.length - 1 ? length(row[i]) : 0))),
  );
  const lines = rows.map((row) => {
    const head = row
      .slice(0, -1)
      .map((cell, i) => `${cell}${" ".repeat(widths[i] - length(cell))}  `)
      .join("");
    const before = indent + head;
    return wrap(before + (row.at(-1) ?? ""), most, " ".repeat(length(before))).trimEnd();
  });
  return lines.join("\n");
}
