/** Where and what is wrong with a design; the place is a file position or the option that brought the value in. */
export interface DesignFault {
  /** Name of the file as the user gave it. */
  readonly file?: string;
  /** From 1. */
  readonly line?: number;
  /** From 1, in UTF-16 code units as editors count. */
  readonly column?: number;
  /** Instead of a file position: the option that gave the value, such as "--set packet.width=5". */
  readonly origin?: string;
  /** Path of the value, such as "potential.layers[1].width"; absent for faults of the file as a whole. */
  readonly key?: string;
  /** What is needed and what was got, in one line. */
  readonly problem: string;
  /** A line that helps to put it right. */
  readonly help: string;
}

/**
 * Thrown for a design that cannot be used. `message` is the one line of the contract without the program's name:
 * `blocking.yaml:9:14: potential.layers[1].width: a length above zero is needed, such as "2.5 nm"; got "-3 nm"`.
 */
export class DesignError extends Error {
  readonly file?: string;
  readonly line?: number;
  readonly column?: number;
  readonly origin?: string;
  readonly key?: string;
  readonly problem: string;
  readonly help: string;

  constructor(fault: DesignFault) {
    super([place(fault), fault.key, fault.problem].filter((part) => part).join(": "));
    this.name = "DesignError";
    this.file = fault.file;
    this.line = fault.line;
    this.column = fault.column;
    this.origin = fault.origin;
    this.key = fault.key;
    this.problem = fault.problem;
    this.help = fault.help;
  }
}

function place({ origin, file, line, column }: DesignFault): string | undefined {
  if (origin !== undefined || line === undefined) return origin ?? file;
  return `${file}:${line}:${column}`;
}
