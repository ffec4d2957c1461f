import { parseQuantity, QuantityError, quantityNeed, unitList } from "../units/quantity.js";

/** A place (nm) or a time (fs), told apart by the unit. */
export interface PlaceOrTime {
  readonly axis: "x" | "t";
  readonly value: number;
}

const NEED = 'a length for x or a time for t is needed, such as "-50 nm" or "100 fs"';

/** Reads a quantity that is either a length or a time. @throws QuantityError for anything else */
export function placeOrTime(text: string): PlaceOrTime {
  const length = attempt(text, "length");
  if (typeof length === "number") return { axis: "x", value: length };
  const time = attempt(text, "time");
  if (typeof time === "number") return { axis: "t", value: time };
  const got = length.message.slice(quantityNeed("length").length);
  const unitless = got.includes(" without a unit");
  throw new QuantityError(`${NEED}${unitless ? `${got}, or ${unitList("time")}` : got}`, "length");
}

function attempt(text: string, kind: "length" | "time"): number | QuantityError {
  try {
    return parseQuantity(text, kind);
  } catch (error) {
    if (error instanceof QuantityError) return error;
    throw error;
  }
}
