import { readFileSync } from "node:fs";

/** The version in package.json, two levels up from here, from src/ and from dist/ alike. */
export function version(): string {
  return JSON.parse(readFileSync(new URL("../../package.json", import.meta.url), "utf8")).version;
}
