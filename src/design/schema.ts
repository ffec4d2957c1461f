import * as z from "zod";
import type { ParameterValues, ShapeDefinition, ShapeParameter } from "../potentials/shape.js";
import { DEFAULT_ACCURACY } from "../problem/design.js";
import { nearest } from "../units/nearest.js";
import { describeValue } from "../units/quantity.js";
import {
  CENTER,
  COARSEST_ACCURACY,
  FEWEST_POINTS,
  FINEST_ACCURACY,
  LONGEST_TITLE,
  MOST_POINTS,
  NUMERICS_FIELDS,
  ORDERS,
  PACKET_FIELDS,
  PARTICLE_FIELDS,
  STEPPER_NAMES,
} from "./fields.js";
import { faultText, mapSchema, quantitySchema } from "./quantity-schema.js";

/** A design after the schema: checked value by value, quantities in internal units, defaults filled in. */
export interface DesignData {
  readonly title: string;
  readonly particle: { readonly mass: number };
  readonly potential: { readonly shape: string; readonly center?: number } & ParameterValues;
  readonly packet: {
    readonly energy: number;
    readonly width?: number;
    readonly energySpread?: number;
    readonly from: "left" | "right";
    readonly start?: number;
  };
  readonly numerics: {
    readonly stepper?: string;
    readonly order?: number;
    readonly step?: number;
    readonly points?: number;
    readonly length?: number;
    readonly timeStep?: number;
    readonly end?: number;
    readonly boundary?: "closed";
    readonly accuracy: number;
  };
}

type Issue = { readonly input?: unknown };

/** True for a shape that is placed by `center`; layers stand where their first interface is, at x = 0. */
export const takesCenter = ({ name }: ShapeDefinition): boolean => name !== "layers";

/** The parameters of a shape as the design file takes them, `center` included. */
export function shapeParameters(shape: ShapeDefinition): Readonly<Record<string, ShapeParameter>> {
  return takesCenter(shape) ? { ...shape.parameters, center: CENTER } : shape.parameters;
}

/** Schema of a whole design whose potential obeys the schema given. */
export function designSchema(potential: z.ZodType): z.ZodType<DesignData> {
  const particle = mapSchema(quantities(PARTICLE_FIELDS), "the particle outside the structure").prefault({});
  const fields = {
    title: titleSchema(),
    particle,
    potential,
    packet: packetSchema(),
    numerics: numericsSchema(),
  };
  return mapSchema(
    fields,
    "a design: a potential, a wavepacket and, if wanted, numerics",
    ELSEWHERE,
  ) as unknown as z.ZodType<DesignData>;
}

/** Keys that belong one level further down, for those who write them at the top. */
const ELSEWHERE: Readonly<Record<string, string>> = {
  mass: "particle.mass",
  shape: "potential.shape",
  use: "potential.use",
  layers: "potential.layers",
  height: "potential.height",
  bias: "potential.bias",
  ...under("packet", [...Object.keys(PACKET_FIELDS), "from"]),
  ...under("numerics", [
    ...Object.keys(NUMERICS_FIELDS),
    "stepper",
    "order",
    "points",
    "boundary",
    "accuracy",
  ]),
};

function under(section: string, keys: readonly string[]): Record<string, string> {
  return Object.fromEntries(keys.map((key) => [key, `${section}.${key}`]));
}

const shapeSchemas = new Map<ShapeDefinition, z.ZodType>();

/** Schema of a potential of one shape. */
export function shapeSchema(shape: ShapeDefinition): z.ZodType {
  const known = shapeSchemas.get(shape);
  if (known !== undefined) return known;
  const fields = Object.fromEntries(
    Object.entries(shapeParameters(shape)).map(([name, parameter]) => [
      name,
      parameterSchema(name, parameter),
    ]),
  );
  const made = mapSchema({ shape: z.literal(shape.name), ...fields }, `${shape.summary}; ${shape.formula}`);
  shapeSchemas.set(shape, made);
  return made;
}

/** Schema of a ready-made potential that is taken over; for the JSON Schema, as reading replaces it by its shape. */
export function useSchema(): z.ZodType {
  const use = z
    .string()
    .meta({ description: "name of a ready-made potential, or path of a file of your own" });
  const changes = z.record(z.string(), z.unknown()).meta({ description: "parameters to change" });
  return mapSchema({ use, with: changes.optional() }, "a ready-made potential");
}

function parameterSchema(name: string, parameter: ShapeParameter): z.ZodType {
  if (parameter.kind !== "list") return quantitySchema(parameter);
  const keys = Object.keys(parameter.fields);
  const help = `Every entry of ${name} is a map with the keys ${keys.join(", ")}.`;
  const error = ({ input }: Issue) =>
    faultText(
      input === undefined
        ? `missing; a list with at least one entry is needed`
        : `a list with at least one entry is needed; got ${describeValue(input)}`,
      help,
    );
  const list = z
    .array(mapSchema(quantities(parameter.fields), parameter.summary), { error })
    .min(1, { error });
  const described = list.meta({ description: parameter.summary });
  return parameter.optional ? described.optional() : described;
}

function quantities(fields: Readonly<Record<string, Parameters<typeof quantitySchema>[0]>>) {
  return Object.fromEntries(Object.entries(fields).map(([name, field]) => [name, quantitySchema(field)]));
}

function titleSchema(): z.ZodType {
  const error = ({ input }: Issue) =>
    faultText(
      input === undefined
        ? "missing; a title is needed: one line of text"
        : `one line of text, 1 to ${LONGEST_TITLE} characters, is needed; got ${describeValue(input)}`,
      'A title that looks like a number, true, false or null must be quoted: title: "2026".',
    );
  // \p{Cc}: a control character, and so a line break too, would spoil the one-line places where the title is shown.
  const pattern = /^(?=.*\S)[^\p{Cc}]+$/u;
  const text = z
    .string({ error })
    .trim()
    .min(1, { error })
    .max(LONGEST_TITLE, { error })
    .refine((line) => pattern.test(line), { error });
  return text.meta({ description: "what the design is, in one line" });
}

function packetSchema(): z.ZodType {
  const from = choice(["left", "right"], "the side that the packet comes from").prefault("left");
  const map = mapSchema({ ...quantities(PACKET_FIELDS), from }, "the Gaussian wavepacket at the start");
  return map.meta({
    oneOf: ["width", "energySpread"].map((key) => ({
      type: "object",
      properties: { [key]: {} },
      required: [key],
    })),
  });
}

function numericsSchema(): z.ZodType {
  const fields = {
    stepper: choice(STEPPER_NAMES, "stepper to use instead of the automatic choice").optional(),
    order: orderSchema().optional(),
    ...quantities(NUMERICS_FIELDS),
    points: pointsSchema().optional(),
    boundary: choice(["closed"], "what the ends of the box do").optional(),
    accuracy: accuracySchema(),
  };
  return mapSchema(fields, "numerics, each chosen automatically when left out").prefault({});
}

function choice(names: readonly string[], description: string) {
  const list = alternatives(names.map((name) => `"${name}"`));
  const error = ({ input }: Issue) => {
    const meant = typeof input === "string" ? nearest(input, names) : undefined;
    const hint = meant === undefined ? "" : `; did you mean "${meant}"?`;
    return faultText(
      `${list} is needed; got ${describeValue(input)}${hint}`,
      `Choices: ${names.join(", ")}.`,
    );
  };
  return z.enum(names as [string, ...string[]], { error }).meta({ description });
}

/** a, b or c */
function alternatives(names: readonly (string | number)[]): string {
  return names.join(", ").replace(/, (?=[^,]*$)/, " or ");
}

function orderSchema() {
  const list = alternatives(ORDERS);
  const error = ({ input }: Issue) =>
    faultText(`an order of ${list} is needed; got ${describeValue(input)}`, "The order in the time step.");
  return z.literal([...ORDERS], { error }).meta({ description: `order in the time step: ${list}` });
}

function pointsSchema() {
  const error = ({ input }: Issue) =>
    faultText(
      `a whole number from ${FEWEST_POINTS} to ${MOST_POINTS} (2^24) is needed, such as 4096; got ${describeValue(input)}`,
      "Leave points out to have it chosen; a finer grid is asked for by numerics.step or numerics.accuracy.",
    );
  return z
    .number({ error })
    .int({ error })
    .min(FEWEST_POINTS, { error })
    .max(MOST_POINTS, { error })
    .meta({ description: "number of grid points" });
}

function accuracySchema() {
  const error = ({ input }: Issue) =>
    faultText(
      `a relative accuracy from ${FINEST_ACCURACY} to below ${COARSEST_ACCURACY} is needed, such as 1e-6; got ${describeValue(input)}`,
      "It is the error asked for, divided by the transmission.",
    );
  return z
    .number({ error })
    .min(FINEST_ACCURACY, { error })
    .lt(COARSEST_ACCURACY, { error })
    .prefault(DEFAULT_ACCURACY)
    .meta({ description: "relative accuracy asked for" });
}
