import type { DesignError } from "./design-error.js";
import type { ReadDesignOptions } from "./options.js";
import { parsePath, valueAt } from "./path.js";
import { resolveDesign } from "./resolve.js";

/** What turned out to be wrong with a value of a design only when it was used. */
export interface LateFault {
  /** Path of the value, such as "numerics.length"; what stands nowhere in the file is placed at its nearest parent. */
  readonly path: string;
  readonly problem: string;
  readonly help: string;
}

/**
 * The error for a fault that a study found: it says where the value stands, as those of `readDesign` do.
 *
 * @param text the design's text, and
 * @param options those that it was read with
 */
export function designErrorAt(text: string, options: ReadDesignOptions, fault: LateFault): DesignError {
  const { provenance, written } = resolveDesign(text, options);
  const path = parsePath(fault.path) ?? [];
  const target = valueAt(written, path) === undefined ? "parent" : "value";
  return provenance.error({ path, target, problem: fault.problem, help: fault.help });
}
