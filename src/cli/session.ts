/** What one call of the program shares between its parts. */
export interface Session {
  /** Aborts with an `Interrupted` as its reason when the user presses Ctrl-C. */
  readonly signal: AbortSignal;
  /** What the program ends with when nothing is thrown. */
  exitCode: number;
}

/** The reason of a session's signal. */
export class Interrupted extends Error {
  constructor() {
    super("interrupted");
    this.name = "Interrupted";
  }
}

/** Throws the signal's reason if the user has stopped the program; lets a Ctrl-C of the last moments arrive first. */
export async function stopIfInterrupted(signal: AbortSignal | undefined): Promise<void> {
  await new Promise((next) => setImmediate(next));
  signal?.throwIfAborted();
}
