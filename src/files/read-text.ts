import { closeSync, fstatSync, openSync, readFileSync } from "node:fs";
import { DesignError } from "../design/design-error.js";
import { MOST_CHARACTERS, type SourceText } from "../design/document.js";

/** UTF-8 takes up to four bytes a character; beyond this the text is too large whatever it holds. */
const MOST_BYTES = 4 * MOST_CHARACTERS;

const PATH_HELP = "Give the path of a design file in YAML or JSON.";

/** What to say about the failures of the file system that a user meets. */
const REASONS: Readonly<Record<string, string>> = {
  ENOENT: "no such file",
  ENOTDIR: "no such file: a part of its path is not a folder",
  EISDIR: "this is a folder; a file is needed",
  EACCES: "the file may not be read: permission denied",
  EPERM: "the file may not be read: permission denied",
  ELOOP: "the file is a link that leads back to itself",
  ENAMETOOLONG: "the name is too long for a file",
};

/**
 * Reads a text file in UTF-8.
 * @throws DesignError when it is missing, a folder, unreadable, too large or not text
 */
export function readTextFile(path: string): SourceText {
  const fail = (problem: string, help: string): never => {
    throw new DesignError({ file: path, problem, help });
  };
  let bytes: Uint8Array;
  try {
    bytes = readBytes(path, fail);
  } catch (error) {
    if (error instanceof DesignError) throw error;
    const { code = "", message } = error as NodeJS.ErrnoException;
    // A NUL in the name is the one failure without a code of the system.
    return fail(REASONS[code] ?? `the file cannot be read: ${message}`, PATH_HELP);
  }
  try {
    return { file: path, text: new TextDecoder("utf-8", { fatal: true }).decode(bytes) };
  } catch {
    return fail("the file is not text in UTF-8", "Is this the design file? Save it as UTF-8 text.");
  }
}

/** Size and content are taken from one open file, so that they belong together. */
function readBytes(path: string, fail: (problem: string, help: string) => never): Uint8Array {
  const file = openSync(path, "r");
  try {
    const status = fstatSync(file);
    if (status.isDirectory()) fail(REASONS.EISDIR, PATH_HELP);
    // A pipe has an end; a device such as a disk or an endless source of zeros may have none.
    if (!status.isFile() && !status.isFIFO()) fail("a device or socket; a file is needed", PATH_HELP);
    if (status.size > MOST_BYTES) {
      fail(
        `the file is too large: ${status.size} bytes, ${MOST_CHARACTERS} characters at most`,
        "Is this the design file?",
      );
    }
    return readFileSync(file);
  } finally {
    closeSync(file);
  }
}
