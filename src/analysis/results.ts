/** |psi|^2 over space and time, as cell means in 1/nm: row-major, row 0 the earliest, column 0 the leftmost. */
export interface DensityMap {
  readonly columns: number;
  readonly rows: number;
  /** Outer edges of the map in x, nm, and in t, fs. */
  readonly xFrom: number;
  readonly xTo: number;
  readonly tFrom: number;
  readonly tTo: number;
  readonly density: Float64Array;
}

/** One named column of a time series; `unit` is the suffix used in file headers ("fs", "nm", "eV"), "" for none. */
export interface SeriesColumn {
  readonly name: string;
  readonly unit: string;
  readonly values: Float64Array;
}

/** Columns of equal length; the first one is the time. */
export type Series = readonly SeriesColumn[];
