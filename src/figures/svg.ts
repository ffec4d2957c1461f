/** The few pieces of SVG that figures are made of, as text. */

export type Attributes = Readonly<Record<string, string | number | undefined>>;

// What XML 1.0 (sec. 2.2, production Char) does not allow even as a reference: control signs and unpaired surrogates.
// biome-ignore lint/suspicious/noControlCharactersInRegex: control signs are what has to go
const NOT_XML = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]|\p{Surrogate}/gu;

const REFERENCES: Readonly<Record<string, string>> = {
  "&": "&amp;",
  "<": "&lt;",
  ">": "&gt;",
  '"': "&quot;",
  "'": "&#39;",
};

/** Makes any text safe as content and as attribute value; what XML cannot hold becomes U+FFFD. */
export function escapeXml(text: string): string {
  return text.replace(NOT_XML, "\ufffd").replace(/[&<>"']/g, (sign) => REFERENCES[sign]);
}

/** A coordinate with three decimals at most: a thousandth of a CSS pixel is below what any output resolves. */
export function coordinate(value: number): string {
  if (!Number.isFinite(value)) throw new RangeError(`a finite coordinate is needed; got ${value}`);
  return String(Number(value.toFixed(3)) + 0);
}

/** An element with its attributes (undefined ones left out) and its content, which must be SVG text already. */
export function element(name: string, attributes: Attributes, ...content: string[]): string {
  const written = Object.entries(attributes)
    .filter(([, value]) => value !== undefined)
    .map(
      ([key, value]) =>
        ` ${key}="${typeof value === "number" ? coordinate(value) : escapeXml(value as string)}"`,
    )
    .join("");
  return content.length === 0 ? `<${name}${written}/>` : `<${name}${written}>${content.join("")}</${name}>`;
}

/** A straight line from (x1, y1) to (x2, y2). */
export function straight(x1: number, y1: number, x2: number, y2: number, attributes: Attributes): string {
  return element("line", { x1, y1, x2, y2, ...attributes });
}
