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
