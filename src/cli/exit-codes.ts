/** Exit codes of every command. */
export const EXIT = {
  /** Done, and what was asked for was reached. */
  done: 0,
  /** A fault of the program. */
  fault: 1,
  /** Wrong use or a wrong design. */
  wrongUse: 2,
  /** Finished, but doubtful. */
  doubtful: 3,
  interrupted: 130,
} as const;
