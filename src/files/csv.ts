import { stringify } from "csv-stringify/sync";
import type { Series } from "../analysis/results.js";

export type CsvValue = string | number | boolean | undefined;

/** Significant digits of a series: more than a plot or a fit can use, less than round-off shows. */
export const SERIES_DIGITS = 12;

/**
 * A table as CSV (RFC 4180, lines ended by a line feed): one header line, numbers in the shortest form that reads back
 * to the same double, ASCII minus, absent values empty.
 *
 * @param digits significant digits that numbers are rounded to; all of them when left out
 * @throws RangeError when a row has not as many values as the header
 */
export function rowsToCsv(
  header: readonly string[],
  rows: Iterable<readonly CsvValue[]>,
  digits?: number,
): string {
  const lines: string[][] = [];
  for (const row of rows) {
    if (row.length !== header.length)
      throw new RangeError(
        `a row of ${header.length} values is needed; got ${row.length} in row ${lines.length + 1}`,
      );
    lines.push(row.map((value) => cell(value, digits)));
  }
  return stringify([[...header], ...lines], { record_delimiter: "unix" });
}

/**
 * A time series as CSV, units in the names of the columns: time_fs, x_mean_nm, transmission.
 *
 * @throws RangeError when the columns differ in length
 */
export function seriesToCsv(series: Series, digits: number | undefined = SERIES_DIGITS): string {
  const header = series.map(({ name, unit }) => (unit === "" ? name : `${name}_${unit}`));
  const length = series[0]?.values.length ?? 0;
  for (const { name, values } of series)
    if (values.length !== length)
      throw new RangeError(
        `columns of equal length are needed; "${name}" has ${values.length} values, not ${length}`,
      );
  const rows = Array.from({ length }, (_, row) => series.map(({ values }) => values[row]));
  return rowsToCsv(header, rows, digits);
}

function cell(value: CsvValue, digits: number | undefined): string {
  if (value === undefined) return "";
  if (typeof value !== "number") return String(value);
  // Adding 0 turns -0 into 0.
  return String(
    digits === undefined || !Number.isFinite(value) ? value + 0 : Number(value.toPrecision(digits)) + 0,
  );
}
