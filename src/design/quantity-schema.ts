import * as z from "zod";
import type { QuantityParameter } from "../potentials/shape.js";
import { nearest } from "../units/nearest.js";
import {
  describeValue,
  parseQuantity,
  QuantityError,
  quantityNeed,
  quantityPattern,
  unitList,
} from "../units/quantity.js";

/** A message of this folder's schemas: the problem, a line break, the line of help. */
export const faultText = (problem: string, help: string): string => `${problem}\n${help}`;

/** Takes a message of `faultText` apart. */
export function splitFault(message: string): { problem: string; help: string } {
  const [problem, help = "`postern validate FILE` prints a design in full."] = message.split("\n");
  return { problem, help };
}

/** Schema of a quantity: takes its text, gives its value in internal units. */
export function quantitySchema(parameter: QuantityParameter): z.ZodType<number | undefined> {
  const { kind, range, example, summary, fallback } = parameter;
  const help = `A quantity is a number, a space and a unit: ${unitList(kind)}.`;
  const refusal = (input: unknown): string => {
    if (input === undefined) return `missing; ${quantityNeed(kind, parameter)}`;
    try {
      parseQuantity(input, kind, parameter);
    } catch (error) {
      if (error instanceof QuantityError) return error.message;
      throw error;
    }
    return "";
  };
  const text = z
    .string({ error: ({ input }) => faultText(refusal(input), help) })
    .meta({ pattern: quantityPattern(kind, range), description: summary, examples: [example] });
  const value = text.transform((input, context) => {
    const problem = refusal(input);
    if (problem === "") return parseQuantity(input, kind, parameter);
    context.issues.push({ code: "custom", message: faultText(problem, help), input });
    return z.NEVER;
  });
  if (fallback !== undefined) return value.prefault(fallback);
  return parameter.optional ? value.optional() : value;
}

/** Schema of a map that knows its keys and, for an unknown one, names the key that was probably meant. */
export function mapSchema(
  fields: z.core.$ZodLooseShape,
  description: string,
  elsewhere: Readonly<Record<string, string>> = {},
): z.ZodObject {
  const keys = Object.keys(fields);
  const help = `Keys that can stand here: ${keys.join(", ")}.`;
  const error: z.core.$ZodErrorMap = (issue) => {
    if (issue.code === "unrecognized_keys")
      return faultText(unknownKey(issue.keys[0], keys, elsewhere), help);
    if (issue.input === undefined)
      return faultText(`missing; a map with the keys ${keys.join(", ")} is needed`, help);
    return faultText(
      `a map with the keys ${keys.join(", ")} is needed; got ${describeValue(issue.input)}`,
      help,
    );
  };
  return z.strictObject(fields, { error }).meta({ description });
}

/** `unknown key "widht"; did you mean "width"?`; `elsewhere` tells where a key belongs that is right but misplaced. */
export function unknownKey(
  key: string,
  keys: readonly string[],
  elsewhere: Readonly<Record<string, string>> = {},
): string {
  const meant = Object.hasOwn(elsewhere, key) ? elsewhere[key] : nearest(key, keys);
  return meant === undefined ? "unknown key" : `unknown key; did you mean "${meant}"?`;
}
