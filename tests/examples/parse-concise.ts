/**
 * Reads the concise notation of the GUM (JCGM 100:2008, 7.2.2): 0.0266229041(8) is 0.0266229041 with an error of 8 in
 * the last digit; a bound written with a point, as in 0.0(1.3), is in the unit of the number itself. Written for the tests, by counting digits.
 */
export function parseConcise(text: string): { readonly value: number; readonly error: number } {
  const match = /^(-?\d+(?:\.(\d+))?)\((\d+(?:\.\d+)?)\)(?:e([-+]?\d+))?$/.exec(text);
  if (match === null) throw new Error(`"${text}" is not in the concise notation`);
  const [, digits, decimals = "", uncertain, exponent = "0"] = match;
  return {
    value: Number(`${digits}e${exponent}`),
    error: Number(`${uncertain}e${Number(exponent) - (uncertain.includes(".") ? 0 : decimals.length)}`),
  };
}
