import type { DesignError } from "../design/design-error.js";
import { EXIT } from "./exit-codes.js";
import { Interrupted } from "./session.js";
import { UsageError } from "./usage-error.js";

/** What the user is told about an error, and what the program ends with. */
export interface ErrorReport {
  /** Without the program's name in front. */
  readonly lines: readonly string[];
  readonly exitCode: number;
}

/**
 * One line for an error, and one of help. Errors of the inner layers are told apart by name, so that no command loads a
 * layer that it does not need only to recognise what it cannot throw.
 */
export function errorReport(error: unknown): ErrorReport {
  if (error instanceof Interrupted) {
    return { lines: ["interrupted; no file was left half-written"], exitCode: EXIT.interrupted };
  }
  const { name = "", message = String(error) } = (error ?? {}) as Partial<Error>;
  if (error instanceof UsageError || name === "DesignError") {
    return { lines: [message, (error as UsageError | DesignError).help], exitCode: EXIT.wrongUse };
  }
  if (name === "OutputError") {
    return { lines: [message, "Give another place with --out."], exitCode: EXIT.wrongUse };
  }
  const lines = [
    `a fault of the program: ${oneLine(message)}`,
    "The same command with --trace shows where; please report it with the design.",
  ];
  return { lines, exitCode: EXIT.fault };
}

const oneLine = (text: string): string => text.replace(/\s*\n\s*/g, " ");
