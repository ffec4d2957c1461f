/**
 * Reads the concise notation of the GUM (JCGM 100:2008, 7.2.2): 0.0266229041(8) is 0.0266229041 with an error of 8 in
 * the last digit. Written for the tests, by counting digits.
 */
export function parseConcise(text: string): { readonly value: number; readonly error: number } {
  const match = /^(-?\d+(?:\.(\d+))?)\((\d+)\)(?:e([-+]?\d+))?$/.exec(text);
  if (match === null) throw new Error(`"${text}" is not in the concise notation`);
  const [, digits, decimals = "", uncertain, exponent = "0"] = match;
  return {
    value: Number(`${digits}e${exponent}`),
    error: Number(`${uncertain}e${Number(exponent) - decimals.length}`),
  };
}
