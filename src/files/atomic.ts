import {
  lstatSync,
  mkdirSync,
  mkdtempSync,
  realpathSync,
  renameSync,
  rmdirSync,
  rmSync,
  statSync,
} from "node:fs";
import { open } from "node:fs/promises";
import { basename, dirname, join, resolve } from "node:path";
import { asOutputError, OutputError } from "./output-error.js";

export { OutputError } from "./output-error.js";

/** Signals that end the program while it writes. */
const SIGNALS = ["SIGINT", "SIGTERM", "SIGHUP"] as const;

/**
 * Writes one file whole or not at all; its folder is created when missing.
 *
 * @throws OutputError when it cannot be written; then a file that was there before still has its old content
 */
export async function writeFileAtomic(path: string, content: string | Uint8Array): Promise<void> {
  if (basename(path) === "" || path.endsWith("/")) throw new OutputError(path, "a file name is needed");
  await commit(path, dirname(path), { [basename(path)]: content });
}

/**
 * Writes files into a folder, which is created when missing. All of them are written under temporary names first and
 * then renamed, so that none is ever half-written, and a fault or a signal before the renaming leaves the folder as it was.
 *
 * @param files content by plain file name
 * @throws OutputError with one line for the user; TypeError for a name with a folder in it
 */
export async function writeFolder(
  dir: string,
  files: Readonly<Record<string, string | Uint8Array>>,
): Promise<void> {
  for (const name of Object.keys(files))
    if (name === "" || name === "." || name === ".." || /[/\\\0]/.test(name))
      throw new TypeError(`a plain file name is needed; got "${name}"`);
  await commit(dir, dir, files);
}

/** Finds out whether a folder can be written to, and leaves nothing behind: for asking before a long calculation. */
export function checkFolder(dir: string): void {
  withFolder(dir, dir, (staging, created) => {
    rmSync(staging, { recursive: true });
    removeEmpty(dir, created);
  });
}

async function commit(
  shownPath: string,
  dir: string,
  files: Readonly<Record<string, string | Uint8Array>>,
): Promise<void> {
  await withFolder(shownPath, dir, async (staging, created) => {
    const undo = () => {
      rmSync(staging, { recursive: true, force: true });
      removeEmpty(dir, created);
    };
    const release = onExit(undo);
    try {
      for (const [name, content] of Object.entries(files)) await writeDurably(join(staging, name), content);
      // Without a pause, so that no signal comes between two files.
      const targets = Object.keys(files).map((name) => [join(staging, name), target(shownPath, dir, name)]);
      for (const [from, to] of targets) renameSync(from, to);
    } finally {
      undo();
      await release();
    }
  });
}

/** Creates the folder and, in it, one for temporary files; hands both to `use` and words the faults. */
function withFolder<T>(
  shownPath: string,
  dir: string,
  use: (staging: string, created: string | undefined) => T,
): T {
  let created: string | undefined;
  try {
    if (statSync(dir, { throwIfNoEntry: false })?.isDirectory() === false)
      throw new OutputError(dir, "this is a file, and a folder is needed; choose another name or remove it");
    created = mkdirSync(dir, { recursive: true });
    const staging = mkdtempSync(join(realpathSync(dir), ".postern-"));
    const result = use(staging, created);
    if (result instanceof Promise)
      return result.catch((error) => {
        throw asOutputError(shownPath, error);
      }) as T;
    return result;
  } catch (error) {
    removeEmpty(dir, created);
    throw asOutputError(shownPath, error);
  }
}

/** Where a file is to go: through a symbolic link to what it points at, never onto a folder. */
function target(shownPath: string, dir: string, name: string): string {
  const path = join(dir, name);
  if (statSync(path, { throwIfNoEntry: false })?.isDirectory())
    throw new OutputError(
      shownPath === dir ? path : shownPath,
      "there is a folder of this name; remove it or choose another",
    );
  const isLink =
    lstatSync(path, { throwIfNoEntry: false })?.isSymbolicLink() && statSync(path, { throwIfNoEntry: false });
  return isLink ? realpathSync(path) : path;
}

/** Writes all bytes and has the system put them on the disk. */
async function writeDurably(path: string, content: string | Uint8Array): Promise<void> {
  const file = await open(path, "wx");
  try {
    // writeFile goes on after a short write, so that a full disk is an error and not a file that ends early.
    await file.writeFile(content);
    await file.sync();
  } finally {
    await file.close();
  }
}

/** Removes the folders that were made for the output, as long as they are empty. */
function removeEmpty(dir: string, created: string | undefined): void {
  if (created === undefined) return;
  const first = resolve(created);
  for (let folder = resolve(dir); folder.length >= first.length; folder = dirname(folder)) {
    try {
      rmdirSync(folder);
    } catch {
      // Not empty, or gone already: either way it is not ours to remove.
      return;
    }
  }
}

/**
 * Has `undo` done when the program ends or is told to end. A signal that nobody else listens to still ends the program.
 *
 * @returns a function that takes all this back, after any signal that has already arrived
 */
function onExit(undo: () => void): () => Promise<void> {
  const stop = (signal: NodeJS.Signals) => {
    undo();
    off();
    if (process.listenerCount(signal) === 0) process.kill(process.pid, signal);
  };
  const off = () => {
    process.off("exit", undo);
    for (const signal of SIGNALS) process.off(signal, stop);
  };
  process.on("exit", undo);
  for (const signal of SIGNALS) process.on(signal, stop);
  return async () => {
    await new Promise((next) => setImmediate(next));
    off();
  };
}
