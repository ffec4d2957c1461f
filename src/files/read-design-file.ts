import { type DesignDescription, describeDesign } from "../design/describe.js";
import type { ReadDesignOptions } from "../design/options.js";
import { type DesignPathValue, designPathValue } from "../design/path-value.js";
import { readDesign } from "../design/read-design.js";
import type { Design } from "../problem/design.js";
import { libraryBeside } from "./potential-library.js";
import { readTextFile } from "./read-text.js";

/** What overrides values of the file; name, text and library follow from its path. */
export type DesignFileOptions = Omit<ReadDesignOptions, "file" | "library" | "libraryNames">;

/** A design file's text with the options that read it: for calls that read it again and again, as a sweep does. */
export interface DesignSource {
  readonly text: string;
  readonly options: ReadDesignOptions;
}

/** Reads the text of a design file. @throws DesignError when it is missing, a folder, unreadable, too large or not text */
export function openDesignFile(path: string, options: DesignFileOptions = {}): DesignSource {
  const { text, file } = readTextFile(path);
  return { text, options: { ...options, file, ...libraryBeside(path) } };
}

/** Reads a design file. @throws DesignError for everything that is wrong with it or with the options */
export function readDesignFile(path: string, options: DesignFileOptions = {}): Design {
  const source = openDesignFile(path, options);
  return readDesign(source.text, source.options);
}

/** Writes a design file's design out in full. @throws DesignError as `readDesignFile` does */
export function describeDesignFile(path: string, options: DesignFileOptions = {}): DesignDescription {
  const source = openDesignFile(path, options);
  return describeDesign(source.text, source.options);
}

/** The value at a path of a design file. @throws DesignError for a wrong design or path */
export function designFilePathValue(
  path: string,
  valuePath: string,
  options: DesignFileOptions = {},
): DesignPathValue {
  const source = openDesignFile(path, options);
  return designPathValue(source.text, valuePath, source.options);
}
