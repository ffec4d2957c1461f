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

export type Content = string | Uint8Array;

/** Signals that end the program while it writes. */
const SIGNALS = ["SIGINT", "SIGTERM", "SIGHUP"] as const;

/**
 * Writes one file whole or not at all; its folder is created when missing, and a symbolic link is followed.
 *
 * @throws OutputError when it cannot be written; then a file that was there before still has its old content
 */
export async function writeFileAtomic(path: string, content: Content): Promise<void> {
  if (/(?:^|[/\\])\.{0,2}$/.test(path)) throw new OutputError(path, "a file name is needed, not a folder");
  try {
    const link =
      lstatSync(path, { throwIfNoEntry: false })?.isSymbolicLink() &&
      statSync(path, { throwIfNoEntry: false });
    const real = link ? realpathSync(path) : path;
    await commit(dirname(real), { [basename(real)]: content });
  } catch (error) {
    throw asOutputError(path, error);
  }
}

/**
 * Writes files into a folder, which is created when missing. All of them are written under temporary names first and
 * then renamed, so that none is ever half-written, and a fault or a signal before the renaming leaves the folder as it
 * was.
 *
 * @param files content by plain file name
 * @throws OutputError with one line for the user; TypeError for a name with a folder in it
 */
export async function writeFolder(dir: string, files: Readonly<Record<string, Content>>): Promise<void> {
  for (const name of Object.keys(files))
    if (name === "" || name === "." || name === ".." || /[/\\\0]/.test(name))
      throw new TypeError(`a plain file name is needed; got "${name}"`);
  try {
    await commit(dir, files);
  } catch (error) {
    throw asOutputError(dir, error);
  }
}

/**
 * Finds out whether a folder can be written to, and leaves nothing behind: for asking before a long calculation.
 *
 * @throws OutputError when it cannot
 */
export function checkFolder(dir: string): void {
  try {
    openStaging(dir).remove();
  } catch (error) {
    throw asOutputError(dir, error);
  }
}

async function commit(dir: string, files: Readonly<Record<string, Content>>): Promise<void> {
  let staging: Staging | undefined;
  const release = whenEnding(() => staging?.remove());
  try {
    staging = openStaging(dir);
    for (const [name, content] of Object.entries(files))
      await writeDurably(join(staging.path, name), content);
    for (const name of Object.keys(files)) refuseOther(join(dir, name));
    // Without a pause, so that no signal comes between two files.
    for (const name of Object.keys(files)) renameSync(join(staging.path, name), join(dir, name));
  } finally {
    staging?.remove();
    await release();
  }
}

/** A folder for temporary files; `remove` takes it back, and the folders made for it that are empty. */
interface Staging {
  readonly path: string;
  remove(): void;
}

/** Creates the folder for the output and, in it, the one for its temporary files. */
function openStaging(dir: string): Staging {
  if (statSync(dir, { throwIfNoEntry: false })?.isDirectory() === false)
    throw new OutputError(dir, "this is a file, and a folder is needed; choose another name or remove it");
  const created = createFolders(dir);
  try {
    // On the file system of the folder itself: only there is renaming one indivisible step.
    const path = mkdtempSync(join(resolve(dir), ".postern-"));
    const remove = () => {
      rmSync(path, { recursive: true, force: true });
      removeEmpty(dir, created);
    };
    return { path, remove };
  } catch (error) {
    removeEmpty(dir, created);
    throw error;
  }
}

/**
 * Creates a folder and those above it that are missing, one by one: the recursive way of Node never comes back where the
 * system answers that there is no such place although the folder above exists, as in /proc.
 * @returns the outermost folder that was created
 */
function createFolders(dir: string): string | undefined {
  const missing: string[] = [];
  for (let folder = resolve(dir); !statSync(folder, { throwIfNoEntry: false }); folder = dirname(folder))
    missing.unshift(folder);
  for (const folder of missing) {
    try {
      createFolder(folder);
    } catch (error) {
      removeEmpty(dirname(folder), missing[0]);
      throw error;
    }
  }
  return missing[0];
}

/** Somebody else may create the same folder at the same time. */
function createFolder(folder: string): void {
  try {
    mkdirSync(folder);
  } catch (error) {
    const there = statSync(folder, { throwIfNoEntry: false });
    if ((error as NodeJS.ErrnoException).code !== "EEXIST" || !there?.isDirectory()) throw error;
  }
}

/** A folder or a device is never replaced by a file. */
function refuseOther(path: string): void {
  const there = statSync(path, { throwIfNoEntry: false });
  if (there?.isDirectory())
    throw new OutputError(path, "there is a folder of this name; choose another or remove it");
  if (there && !there.isFile())
    throw new OutputError(path, "this is no ordinary file and cannot be replaced by one");
}

/** Writes all bytes and has the system put them on the disk. */
async function writeDurably(path: string, content: Content): Promise<void> {
  const file = await open(path, "wx");
  try {
    // This writeFile goes on after a short write, so that a full disk is an error and not a file that ends early.
    await file.writeFile(content);
    await file.sync();
  } finally {
    await file.close();
  }
}

/** Removes the folders that were made for the output, from the innermost outward, as long as they are empty. */
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

/** What is to be undone when the program ends, one entry for each output being written. */
const pending = new Set<() => void>();

function undoAll(): void {
  for (const undo of pending) undo();
}

/** Where somebody else listens to the signal, the few milliseconds of writing go on; else it ends the program. */
function stop(signal: NodeJS.Signals): void {
  if (process.listenerCount(signal) > 1) return;
  undoAll();
  listen("off");
  process.kill(process.pid, signal);
}

function listen(change: "on" | "off"): void {
  process[change]("exit", undoAll);
  for (const signal of SIGNALS) process[change](signal, stop);
}

/**
 * Has `undo` done when the program ends in the meantime, by a signal too.
 *
 * @returns a function that takes this back, once any signal that has already arrived is dealt with
 */
function whenEnding(undo: () => void): () => Promise<void> {
  if (pending.size === 0) listen("on");
  pending.add(undo);
  return async () => {
    // Two turns of the event loop: a signal that came while files were renamed is seen in the second one.
    for (let turn = 0; turn < 2; turn++) await new Promise((next) => setImmediate(next));
    pending.delete(undo);
    if (pending.size === 0) listen("off");
  };
}
