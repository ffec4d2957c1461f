/** Build step: writes the JSON Schema of the design file into dist/, from where the package exports it. */
import { writeFileSync } from "node:fs";
import { designJsonSchema } from "../design/json-schema.js";

writeFileSync(
  new URL("../design.schema.json", import.meta.url),
  `${JSON.stringify(designJsonSchema(), undefined, 2)}\n`,
);
