/** Wrong use of the command line: what is wrong in one line, and a line that helps to put it right. */
export class UsageError extends Error {
  constructor(
    message: string,
    readonly help: string,
  ) {
    super(message);
    this.name = "UsageError";
  }
}

/** Does what refuses a value by a RangeError, and names the option that gave it. @throws UsageError instead */
export function naming<T>(option: string, help: string, work: () => T): T {
  try {
    return work();
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    throw new UsageError(`${option}: ${error.message}`, help);
  }
}
