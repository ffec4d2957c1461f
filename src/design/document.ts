import {
  type Document,
  isMap,
  isPair,
  isScalar,
  isSeq,
  LineCounter,
  type Node,
  parseDocument,
  visit,
  type YAMLError,
} from "yaml";
import { describeValue } from "../units/quantity.js";
import { DesignError } from "./design-error.js";
import { formatPath, type Path } from "./path.js";

/** The text of a file and the name to show for it in errors. */
export interface SourceText {
  readonly text: string;
  readonly file: string;
}

/** A position in a file, both from 1. */
export interface Position {
  readonly line: number;
  readonly column: number;
}

/** What an error points at: the value itself, its key, or, for something missing, the key of what it is missing in. */
export type Target = "value" | "key" | "parent";

/** A file read as plain data, which still knows where everything stands. */
export interface SourceDocument {
  readonly file: string;
  readonly data: Record<string, unknown>;
  locate(path: Path, target: Target): Position;
}

/** Largest file that is read, in UTF-16 code units of its text. A design of a thousand layers takes a tenth of it. */
export const MOST_CHARACTERS = 1_000_000;
/** Deepest nesting that is read: the parser is recursive, and a design needs six levels. */
const DEEPEST = 60;
/** Aliases that may be expanded in all, against files that blow up when they are. */
const MOST_ALIASES = 100;

const SYNTAX_HELP =
  'A design is YAML 1.2 or JSON: keys and values as "key: value", indented by spaces; quote text that holds ": " or " #".';

/**
 * Reads a YAML 1.2 or JSON file whose top level is a map.
 * @throws DesignError for what is no text, too large, empty, not readable, several documents or no map
 */
export function readDocument({ text, file }: SourceText): SourceDocument {
  const fail = (problem: string, help = SYNTAX_HELP, position?: Position, key?: string): never => {
    throw new DesignError({ file, ...position, key, problem, help });
  };
  refuseOddText(text, fail);
  const lines = new LineCounter();
  const document = parseDocument(text, { version: "1.2", lineCounter: lines, prettyErrors: false });
  const at = (offset: number): Position => position(lines, offset);
  const error = [...document.errors, ...document.warnings].sort((a, b) => a.pos[0] - b.pos[0])[0];
  if (error !== undefined) fail(...syntaxFault(error, document, at(error.pos[0])));
  if (document.contents === null)
    fail("the file holds nothing but comments", "Write at least title, potential and packet.");
  refuseDanglingAliases(document, (offset) =>
    fail("this alias has no anchor to stand for", SYNTAX_HELP, at(offset)),
  );
  const data = expand(document, () => fail("too many aliases: they expand to more than a design can hold"));
  if (!isMap(document.contents)) {
    const got = describeValue(data);
    fail(
      `a map with the keys title, potential and packet is needed at the top level; got ${got}`,
      SYNTAX_HELP,
      at(start(document.contents)),
    );
  }
  return {
    file,
    data: data as Record<string, unknown>,
    locate: (path, target) => at(offsetOf(document, path, target)),
  };
}

type Fail = (problem: string, help?: string, position?: Position, key?: string) => never;

function refuseOddText(text: string, fail: Fail): void {
  if (text.length > MOST_CHARACTERS)
    fail(
      `the file is too large: ${text.length} characters, ${MOST_CHARACTERS} at most`,
      "Is this the design file?",
    );
  // biome-ignore lint/suspicious/noControlCharactersInRegex: finding them is the purpose
  if (/[\u0000-\u0008\u000e-\u001f\ufffd]/.test(text))
    fail("the file is not text in UTF-8", "Is this the design file? Save it as UTF-8 text.");
  if (text.trim() === "") fail("the file is empty", "Write at least title, potential and packet.");
  const deep = tooDeepLine(text);
  if (deep !== undefined)
    fail(`nested too deeply: ${DEEPEST} levels at most`, SYNTAX_HELP, { line: deep, column: 1 });
}

/** The line on which nesting passes the limit, by a count that is rough but never too low. */
function tooDeepLine(text: string): number | undefined {
  let open = 0;
  const indents: number[] = [];
  for (const [index, line] of text.split("\n").entries()) {
    const lead = /^[\s?:-]*/.exec(line)?.[0] ?? "";
    if (lead.length < line.length) {
      const indent = /^\s*/.exec(line)?.[0].length ?? 0;
      while (indents.length > 0 && (indents.at(-1) as number) >= indent) indents.pop();
      indents.push(indent);
    }
    const marks = lead.replace(/\s/g, "").length;
    for (const bracket of line.replace(/#.*$/, "").match(/[[\]{}]/g) ?? []) {
      open = Math.max(0, open + (bracket === "[" || bracket === "{" ? 1 : -1));
      if (open > DEEPEST) return index + 1;
    }
    if (marks > DEEPEST || indents.length > DEEPEST) return index + 1;
  }
  return undefined;
}

function syntaxFault(
  error: YAMLError,
  document: Document.Parsed,
  where: Position,
): [string, string, Position, string?] {
  switch (error.code) {
    case "DUPLICATE_KEY":
      return [
        "the key is given twice in one map",
        "Keep one of the two.",
        where,
        pathOfKey(document, error.pos[0]),
      ];
    case "TAB_AS_INDENT":
      return ["a tab stands where only spaces may indent", SYNTAX_HELP, where];
    case "MULTIPLE_DOCS":
      return [
        "a second document begins here; one file holds one design",
        'Remove the line "---" and what follows it.',
        where,
      ];
    default: {
      const reason = error.message.charAt(0).toLowerCase() + error.message.slice(1);
      return [
        `not readable as YAML: ${reason.replace(/\s+/g, " ").replace('"quote', "quote")}`,
        SYNTAX_HELP,
        where,
      ];
    }
  }
}

/** Path of the key that stands at an offset. */
function pathOfKey(document: Document.Parsed, offset: number): string | undefined {
  let found: string | undefined;
  visit(document, {
    Pair(_, pair, ancestors) {
      if (!isScalar(pair.key) || pair.key.range?.[0] !== offset) return;
      const way = [...ancestors, pair].flatMap((node, depth, all): (string | number)[] => {
        if (isPair(node)) return [String(isScalar(node.key) ? node.key.value : node.key)];
        return isSeq(node) ? [node.items.indexOf(all[depth + 1])] : [];
      });
      found = formatPath(way);
    },
  });
  return found;
}

function refuseDanglingAliases(document: Document.Parsed, fail: (offset: number) => never): void {
  visit(document, {
    Alias(_, alias) {
      if (alias.resolve(document) === undefined) fail(start(alias));
    },
  });
}

function expand(document: Document.Parsed, fail: () => never): unknown {
  try {
    return document.toJS({ maxAliasCount: MOST_ALIASES });
  } catch (error) {
    if (error instanceof ReferenceError) return fail();
    throw error;
  }
}

const start = (node: Node | null): number => node?.range?.[0] ?? 0;

function position(lines: LineCounter, offset: number): Position {
  const { line, col } = lines.linePos(offset);
  return { line: Math.max(line, 1), column: Math.max(col, 1) };
}

/** Offset of the nearest thing to a path that stands in the file; what came by an alias is found at its anchor's use. */
function offsetOf(document: Document.Parsed, path: Path, target: Target): number {
  const sought = target === "parent" ? path.slice(0, -1) : path;
  for (let length = sought.length; length > 0; length--) {
    const here = sought.slice(0, length);
    const node = document.getIn(here, true) as Node | undefined;
    const key = keyNode(document, here);
    if (target === "value" && length === path.length && node?.range) return node.range[0];
    if (key?.range) return key.range[0];
    if (node?.range) return node.range[0];
  }
  return start(document.contents);
}

function keyNode(document: Document.Parsed, path: Path): Node | undefined {
  const parent = path.length === 1 ? document.contents : document.getIn(path.slice(0, -1), true);
  if (!isMap(parent)) return undefined;
  const name = String(path.at(-1));
  const pair = parent.items.find(({ key }) => isScalar(key) && String(key.value) === name);
  return pair?.key as Node | undefined;
}
