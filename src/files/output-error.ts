import { getSystemErrorMap } from "node:util";

/** A file or folder could not be written; the message is one line for the user. */
export class OutputError extends Error {
  constructor(
    /** The file or folder that was to be written, as the user named it. */
    readonly path: string,
    reason: string,
    options?: ErrorOptions,
  ) {
    super(`${path}: ${reason}`, options);
    this.name = "OutputError";
  }
}

const REASONS: Readonly<Record<string, string>> = {
  EACCES: "no permission to write here; choose another place or change its permissions",
  EPERM: "the system does not permit writing here; choose another place",
  EROFS: "this file system can only be read; choose another place",
  ENOSPC: "the disk is full; nothing was written",
  EFBIG: "the file would be larger than the system permits; nothing was written",
  EDQUOT: "the disk quota is used up; nothing was written",
  EISDIR: "there is a folder of this name; choose another name or remove it",
  ENOTDIR: "a part of this path is a file, not a folder",
  EEXIST: "there is a file of this name where a folder is needed; choose another name or remove it",
  ENOENT: "there is no such place to write to",
  ENAMETOOLONG: "this name is too long for the file system",
  ELOOP: "the symbolic links of this path go round in a circle",
  EMFILE: "too many files are open",
  ENFILE: "too many files are open",
};

/** Turns a fault of the file system into an OutputError; any other error comes back as it was. */
export function asOutputError(path: string, error: unknown): unknown {
  const { code, errno } = (error ?? {}) as NodeJS.ErrnoException;
  if (error instanceof OutputError || typeof code !== "string" || typeof errno !== "number") return error;
  const reason = REASONS[code] ?? `cannot be written (${getSystemErrorMap().get(errno)?.[1] ?? code})`;
  return new OutputError(path, reason, { cause: error });
}
