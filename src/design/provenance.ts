import { DesignError } from "./design-error.js";
import type { SourceDocument, Target } from "./document.js";
import { formatPath, type Path } from "./path.js";

/** Something wrong at a path of the resolved design, before it is known where that stands. */
export interface Problem {
  readonly path: Path;
  readonly problem: string;
  readonly help: string;
  readonly target: Target;
}

/** Where a part of the resolved design was written, and the path that it has there. */
export interface Origin {
  readonly path: Path;
  /** The file, or the option of the command as the user typed it. */
  readonly source: SourceDocument | string;
}

/** Remembers what part of a design came from which file or option; the later entry covers the earlier. */
export class Provenance {
  readonly #entries: { readonly path: Path; readonly origin: Origin }[];

  constructor(document: SourceDocument) {
    this.#entries = [{ path: [], origin: { path: [], source: document } }];
  }

  /** What stands at `path` of the design, and below, came from there. */
  record(path: Path, origin: Origin): void {
    this.#entries.push({ path, origin });
  }

  /** Where the value at `path` came from, as far as is recorded now. */
  originOf(path: Path, owner: Path = path): Origin {
    const entry = this.#entries.findLast((each) => each.path.every((part, i) => owner[i] === part));
    if (entry === undefined) throw new Error("a provenance always has its root");
    return { source: entry.origin.source, path: [...entry.origin.path, ...path.slice(entry.path.length)] };
  }

  /** The error for a problem, with file, line and column or the option's text. */
  error({ path, problem, help, target }: Problem): DesignError {
    // Something missing is missing in its parent, so the parent's origin counts.
    const origin = this.originOf(path, target === "parent" ? path.slice(0, -1) : path);
    const key = formatPath(origin.path) || undefined;
    const { source } = origin;
    if (typeof source === "string") return new DesignError({ origin: source, key, problem, help });
    return new DesignError({ file: source.file, ...source.locate(origin.path, target), key, problem, help });
  }
}
