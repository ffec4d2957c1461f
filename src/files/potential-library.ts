import { existsSync, readdirSync } from "node:fs";
import { dirname, isAbsolute, join } from "node:path";
import { fileURLToPath } from "node:url";
import type { SourceText } from "../design/document.js";
import type { LibraryEntry } from "../design/library-format.js";
import { readLibraryEntry } from "../design/use.js";
import { readTextFile } from "./read-text.js";

/** The package's folder of ready-made potentials: two levels up from here, from src/ and from dist/ alike. */
const FOLDER = fileURLToPath(new URL("../../potentials/", import.meta.url));

/** Names of the ready-made potentials that the package brings, sorted. */
export function potentialNames(): string[] {
  if (!existsSync(FOLDER)) return [];
  return readdirSync(FOLDER)
    .filter((file) => file.endsWith(".yaml"))
    .map((file) => file.slice(0, -".yaml".length))
    .sort();
}

/** True for a text after `use:` that is the path of a file, not a name of the library. */
export function isPotentialPath(name: string): boolean {
  return /[\\/]/.test(name) || /\.(?:ya?ml|json)$/i.test(name);
}

/**
 * The file of a ready-made potential: one of the package by its name, or a user's own by its path.
 *
 * @param name the text after `use:`
 * @param folder where a relative path starts: the folder of the design file
 * @returns undefined when the package has none of that name
 * @throws DesignError when a path leads to no readable file
 */
export function potentialSource(name: string, folder = "."): SourceText | undefined {
  if (isPotentialPath(name)) return readTextFile(isAbsolute(name) ? name : join(folder, name));
  return potentialNames().includes(name) ? readTextFile(join(FOLDER, `${name}.yaml`)) : undefined;
}

/** Reads a ready-made potential; undefined when there is none of that name. @throws DesignError */
export function readPotential(name: string, folder?: string): LibraryEntry | undefined {
  const source = potentialSource(name, folder);
  return source && readLibraryEntry(source);
}

/** What `readDesign` needs to find ready-made potentials for a design file. */
export function libraryBeside(designPath: string) {
  const folder = dirname(designPath);
  return { library: (name: string) => potentialSource(name, folder), libraryNames: potentialNames() };
}
