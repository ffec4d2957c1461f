import * as z from "zod";
import { shapes } from "../potentials/registry.js";
import { designSchema, shapeSchema, useSchema } from "./schema.js";

/**
 * The JSON Schema (draft 2020-12) of a design file, from the schema that reading uses, so that editors complete and
 * check what is typed: keys, shapes and their parameters, and a pattern for every quantity with the units that fit.
 * Relations between values (the packet's energy and the potential's levels) are beyond it; reading checks them.
 */
export function designJsonSchema(): Record<string, unknown> {
  const potential = z.union([...shapes.map(shapeSchema), useSchema()]);
  const { properties, ...schema } = z.toJSONSchema(designSchema(potential), { io: "input" });
  // A JSON design may name its schema in itself; reading skips the key.
  const named = { $schema: { type: "string", description: "where this schema is found" }, ...properties };
  return { title: "postern design", ...schema, properties: named };
}
