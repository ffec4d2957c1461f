import { unitNamed } from "../units/unit-table.js";

/** A unit that an axis is drawn in: `name` as printed, `size` in internal units. */
export interface AxisUnit {
  readonly name: string;
  readonly size: number;
}

// Smallest first. "from" is the largest number on the axis, in that unit, from which the unit is taken: people write
// 0.3 eV and not 300 meV, but 300 nm and not 0.3 um (common practice, no source).
const LADDERS = {
  length: [
    ["pm", 0],
    ["nm", 1],
    ["um", 1],
    ["mm", 1],
    ["m", 1],
  ],
  time: [
    ["as", 0],
    ["fs", 1],
    ["ps", 1],
    ["ns", 1],
    ["us", 1],
    ["ms", 1],
    ["s", 1],
  ],
  energy: [
    ["peV", 0],
    ["neV", 1],
    ["ueV", 1],
    ["meV", 1],
    ["eV", 0.1],
    ["keV", 1],
  ],
} as const;

/**
 * The unit for an axis, such that its largest number lies between 1 and 1000 wherever the ladder of units allows.
 *
 * @param kind what the axis shows
 * @param largest greatest magnitude on the axis, in internal units (nm, fs, eV)
 */
export function axisUnit(kind: keyof typeof LADDERS, largest: number): AxisUnit {
  const ladder = LADDERS[kind].map(([name, from]) => {
    const unit = unitNamed(name);
    if (unit === undefined) throw new TypeError(`the table of units has no "${name}"`);
    return { name: name.replace(/^u/, "µ"), size: 10 ** unit.exponent, from };
  });
  // The margin keeps a largest value of exactly one unit, off by round-off, in that unit.
  const fitting = ladder.filter(({ size, from }) => Math.abs(largest) >= from * size * (1 - 1e-9));
  const { name, size } = fitting[fitting.length - 1];
  return { name, size };
}
