import type { Command } from "commander";
import type { DesignFileOptions, DesignSource } from "../files/read-design-file.js";
import type { Design } from "../problem/design.js";
import { DEFAULT_ACCURACY } from "../problem/design.js";
import { steppers } from "../steppers/registry.js";

/** What every command that reads a design takes. */
export interface DesignFlags {
  readonly set?: readonly string[];
  readonly accuracy?: string;
  readonly stepper?: string;
  readonly order?: string;
}

/** A design together with the text that it was read from, which knows where its values stand. */
export interface OpenedDesign {
  readonly source: DesignSource;
  readonly design: Design;
}

/** Adds the options of `DesignFlags` to a command. */
export function addDesignFlags(command: Command): Command {
  const names = steppers.map(({ name }) => name).join(", ");
  const orders = steppers
    .filter(({ defaultOrder }) => defaultOrder !== "exact")
    .map(({ name, orders }) => `${orders.join(", ")} (${name})`)
    .join("; ");
  return command
    .option(
      "--set <PATH=VALUE>",
      'change a value of the design, as "packet.energy=0.2 eV"; repeatable',
      collect,
    )
    .option(
      "--accuracy <R>",
      `relative accuracy of the transmission (default: ${DEFAULT_ACCURACY.toExponential()})`,
    )
    .option("--stepper <NAME>", `one of ${names} (default: chosen by the design)`)
    .option("--order <N>", `order in the time step: ${orders}`);
}

/** Gathers an option that may be given several times. */
export function collect(value: string, earlier: readonly string[] = []): readonly string[] {
  return [...earlier, value];
}

/** The options of `DesignFlags` as the reader of designs takes them. */
export function designOptions({ set, accuracy, stepper, order }: DesignFlags): DesignFileOptions {
  return { set, accuracy: numberOrText(accuracy), stepper, order: numberOrText(order) };
}

/** Reads a design file. @throws DesignError */
export async function openDesign(file: string, flags: DesignFlags): Promise<OpenedDesign> {
  const [{ openDesignFile }, { readDesign }] = await Promise.all([
    import("../files/read-design-file.js"),
    import("../design/read-design.js"),
  ]);
  const source = openDesignFile(file, designOptions(flags));
  return { source, design: readDesign(source.text, source.options) };
}

/**
 * Does what may find the design too large or contradictory, and says where in the file that stands.
 * @throws DesignError instead of DesignLimitError
 */
export async function placingLimits<T>({ source }: OpenedDesign, work: () => Promise<T> | T): Promise<T> {
  try {
    return await work();
  } catch (error) {
    const { DesignLimitError } = await import("../studies/limits.js");
    if (!(error instanceof DesignLimitError)) throw error;
    const { designErrorAt } = await import("../design/design-error-at.js");
    throw designErrorAt(source.text, source.options, {
      path: error.path,
      problem: error.message,
      help: "`postern validate` shows what is chosen automatically when numerics leave it open.",
    });
  }
}

/** A number as such; other text stays text, which the design's own check then refuses in its own words. */
function numberOrText(text: string | undefined): number | undefined {
  if (text === undefined) return undefined;
  const isNumber = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?$/i.test(text);
  return isNumber ? Number(text) : (text as unknown as number);
}
