import { parseDocument } from "yaml";
import { DesignError } from "./design-error.js";
import type { SourceText } from "./document.js";
import { formatPath, type Path, parsePath } from "./path.js";

/** How a design is read. */
export interface ReadDesignOptions {
  /** Name of the file for errors; default "design". */
  readonly file?: string;
  /** Values to override or add, each as "PATH=VALUE". Later ones win. */
  readonly set?: readonly string[];
  /** Finds a ready-made potential by the text after `use:`; undefined when there is none of that name. */
  readonly library?: (name: string) => SourceText | undefined;
  /** Names that `library` knows, for "did you mean". */
  readonly libraryNames?: readonly string[];
  /** The same as numerics.accuracy, numerics.stepper and numerics.order, over what the file says. */
  readonly accuracy?: number;
  readonly stepper?: string;
  readonly order?: number;
}

/** One value brought in by an option. */
export interface Override {
  readonly path: Path;
  readonly value: unknown;
  /** The option as the user wrote it, for errors. */
  readonly option: string;
}

/** Everything in the options that overrides a value of the file, in the order in which it does so. */
export function overrides(options: ReadDesignOptions): Override[] {
  const sets = (options.set ?? []).map(readSet);
  for (const name of ["accuracy", "stepper", "order"] as const) {
    const value = options[name];
    if (value !== undefined) sets.push({ path: ["numerics", name], value, option: `--${name} ${value}` });
  }
  return sets;
}

/** Reads "PATH=VALUE"; the value as YAML would be read after "key: ". */
function readSet(text: string): Override {
  const option = `--set ${text}`;
  const help =
    'Write PATH=VALUE, such as --set "packet.energy=0.2 eV" or --set "potential.layers[1].width=3 nm".';
  const equals = text.indexOf("=");
  if (equals < 0)
    throw new DesignError({ origin: option, problem: 'a path, "=" and a value are needed', help });
  const path = parsePath(text.slice(0, equals).trim());
  if (path === undefined) {
    const problem = `"${text.slice(0, equals).trim()}" is no path of a value, such as potential.layers[1].width`;
    throw new DesignError({ origin: option, problem, help });
  }
  const value = text.slice(equals + 1);
  // A title is text even where it looks like a number: the shell leaves no quotes to say so.
  if (formatPath(path) === "title") return { path, value, option };
  return { path, value: readValue(value, option, formatPath(path), help), option };
}

/** Deepest nesting of brackets in a value; the parser is recursive. */
const DEEPEST = 20;

/** A list or map in brackets, a quoted text, or a single word are read as YAML; all else is text as it stands. */
function readValue(text: string, origin: string, key: string, help: string): unknown {
  const value = text.trim();
  if (!/^["'[{]/.test(value) && !/^[-+.\w]+$/.test(value)) return value;
  const fail = (problem: string): never => {
    throw new DesignError({ origin, key, problem, help });
  };
  if (deepest(value) > DEEPEST) return fail("the value is nested too deeply");
  const document = parseDocument(value, { version: "1.2", prettyErrors: false });
  const error = [...document.errors, ...document.warnings][0];
  if (error !== undefined) return fail(`not readable as a YAML value: ${error.message.replace(/\s+/g, " ")}`);
  try {
    return document.toJS({ maxAliasCount: 0 });
  } catch (cause) {
    if (cause instanceof ReferenceError) return fail("an alias has nothing to stand for here");
    throw cause;
  }
}

function deepest(text: string): number {
  let open = 0;
  let most = 0;
  for (const bracket of text.match(/[[\]{}]/g) ?? []) {
    open += bracket === "[" || bracket === "{" ? 1 : -1;
    most = Math.max(most, open);
  }
  return most;
}
