import type { Design, Numerics } from "../problem/design.js";

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

/** Nodes of a grid beyond which a calculation is refused: its tables take some hundred bytes a node. */
export const POINTS_LIMIT = 2 ** 22;
/** Work of one calculation (nodes times steps) beyond which it is refused: some minutes at 5 to 20 ns for one node and step. */
const RUN_LIMIT = 2e10;

/** Forced numerics that make a grid large, and those that make a calculation long, the likeliest first. */
export const SIZE_KEYS = ["step", "points", "length", "end"] as const;
const DURATION_KEYS = ["timeStep", "end", "step", "points", "length"] as const;

/**
 * Refuses a calculation that is too large, before anything is allocated for it; NaN counts as too large.
 * @param limit greatest number of nodes
 * @param remedy what to do where no forced numerics are to blame
 * @param effort work of a step on a node in units of an implicit step's: 1 but for steps that are made of many
 * @throws DesignLimitError that names the forced key to blame, or the potential
 */
export function refuseTooLarge(
  { numerics }: Design,
  points: number,
  steps: number,
  remedy: string,
  limit = POINTS_LIMIT,
  effort = 1,
): void {
  const tooWide = !(points <= limit);
  if (!tooWide && points * steps * effort <= RUN_LIMIT) return;
  const key = (tooWide ? SIZE_KEYS : DURATION_KEYS).find(
    (name: keyof Numerics) => numerics[name] !== undefined,
  );
  const need = tooWide
    ? `this design needs ${points} grid points, more than ${limit}`
    : `this design needs ${points} grid points and ${steps} steps, more than ${Number((RUN_LIMIT / effort).toPrecision(2))} in their product`;
  throw new DesignLimitError(
    key === undefined ? "potential" : `numerics.${key}`,
    `${need}: ${key === undefined ? remedy : "leave this out to have it chosen"}`,
  );
}

/** Remedy where the lengths of a design span too many orders of magnitude. */
export const BRING_CLOSER = "its lengths lie too far apart, or its packet is too wide or too slow";
