/** A design that cannot be computed as written: too large, or numerics that contradict it. `path` names the key. */
export class DesignLimitError extends RangeError {
  constructor(
    readonly path: string,
    message: string,
  ) {
    super(message);
    this.name = "DesignLimitError";
  }
}
