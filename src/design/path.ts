/** The way to a value: names of keys, and positions in lists from 0. */
export type Path = readonly (string | number)[];

/**
 * Reads a path such as `potential.layers[1].width`; undefined for text that is none.
 * Keys are letters, digits, "_" and "-".
 */
export function parsePath(text: string): Path | undefined {
  if (!/^[\w-]+(?:\[\d{1,6}\])*(?:\.[\w-]+(?:\[\d{1,6}\])*)*$/.test(text)) return undefined;
  return [...text.matchAll(/\[(\d+)\]|([\w-]+)/g)].map(([, index, key]) =>
    index === undefined ? key : Number(index),
  );
}

/** The text of a path, as `parsePath` reads it. */
export function formatPath(path: Path): string {
  return path.reduce<string>((text, part) => {
    if (typeof part === "number") return `${text}[${part}]`;
    return text === "" ? part : `${text}.${part}`;
  }, "");
}

/** The value at a path of plain data, or undefined. */
export function valueAt(data: unknown, path: Path): unknown {
  let value = data;
  for (const part of path) {
    if (typeof value !== "object" || value === null || !Object.hasOwn(value, part)) return undefined;
    value = (value as Record<string | number, unknown>)[part];
  }
  return value;
}

/**
 * Puts a value at a path of plain data, in place; maps on the way are made where nothing stands.
 * @returns undefined when done, else what is in the way
 */
export function putAt(data: Record<string, unknown>, path: Path, value: unknown): string | undefined {
  let holder: unknown = data;
  for (let depth = 0; depth < path.length; depth++) {
    const part = path[depth];
    const obstacle = whyNoPart(holder, path, depth);
    if (obstacle !== undefined) return obstacle;
    const here = holder as Record<string | number, unknown>;
    const last = depth === path.length - 1;
    const absent = !Object.hasOwn(here, part) || here[part] === null;
    // defineProperty, because assignment to "__proto__" would not make a key of that name.
    if (last || absent) {
      const made = last ? value : typeof path[depth + 1] === "number" ? [] : {};
      Object.defineProperty(here, part, {
        value: made,
        writable: true,
        enumerable: true,
        configurable: true,
      });
    }
    holder = here[part];
  }
  return undefined;
}

function whyNoPart(holder: unknown, path: Path, depth: number): string | undefined {
  const part = path[depth];
  const name = formatPath(path.slice(0, depth));
  if (typeof part === "number") {
    if (!Array.isArray(holder)) return `${name} is not a list, so it has no [${part}]`;
    const count = holder.length;
    return part <= count
      ? undefined
      : `${name} has ${count} entries, so [${part}] is out of reach: the last is [${count - 1}]`;
  }
  if (Array.isArray(holder))
    return `${name} is a list: write ${name}[0]${depth < path.length ? `.${part}` : ""} for its first entry`;
  return typeof holder === "object" && holder !== null
    ? undefined
    : `${name} has no keys, so there is no ${part} in it`;
}
