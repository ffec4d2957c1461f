import type { Axis } from "./axis.js";
import { type AxisUnit, axisUnit } from "./axis-unit.js";
import { symbol, textWidth } from "./text.js";
import { TICK_TEXT } from "./theme.js";
import { fittingTicks, labelNumber } from "./ticks.js";

/** A range narrower than this part of its own energy is counted from an energy within it: its labels would be all digits. */
const NARROW = 2e-3;
/** Width of the page for each tick, in ems. */
const TICK_ROOM = 5.5;

/** A horizontal axis of energies: values on it are (E - origin) / unit. */
export interface EnergyAxis {
  readonly axis: Axis;
  readonly unit: AxisUnit;
  /** Energy that the axis is counted from, eV; 0 unless the range is narrow. */
  readonly origin: number;
  /** Value of an energy (eV) on the axis. */
  readonly on: (energy: number) => number;
  /** An energy as a label beside the axis, without the unit; `fine` (eV) is what its digits have to tell apart. */
  readonly label: (energy: number, fine: number) => string;
}

/**
 * The axis for energies from `from` to `to` (eV above the left level).
 *
 * @param width of the axis, and the size of its letters, in CSS pixels
 */
export function energyAxis(from: number, to: number, width: number, em: number): EnergyAxis {
  const narrow = to - from < NARROW * Math.abs(to);
  // A round energy near the middle, by the first digit of the range.
  const coarse = 10 ** Math.floor(Math.log10(to - from));
  const origin = narrow ? Number((Math.round((from + to) / 2 / coarse) * coarse).toPrecision(15)) : 0;
  const unit = axisUnit("energy", Math.max(Math.abs(from - origin), Math.abs(to - origin)));
  const on = (energy: number) => (energy - origin) / unit.size;
  const count = Math.max(3, Math.round(width / (TICK_ROOM * em)));
  const ticks = fittingTicks(on(from), on(to), count, width, em, (label) => textWidth(label, TICK_TEXT * em));
  const quantity = narrow ? [symbol("E"), { text: ` − ${originText(origin, coarse)}` }] : [symbol("E")];
  const axis: Axis = {
    from: on(from),
    to: on(to),
    ticks,
    label: [{ text: "energy above the left level, " }, ...quantity, { text: ` (${unit.name})` }],
  };
  const label = (energy: number, fine: number) => {
    const value = on(energy);
    const digits = Math.ceil(Math.log10(Math.abs(value) / (fine / unit.size)));
    return labelNumber(value, Math.min(Math.max(Number.isFinite(digits) ? digits : 3, 3), 8));
  };
  return { axis, unit, origin, on, label };
}

/** The origin in its own unit, to the digits that it has. */
function originText(origin: number, coarse: number): string {
  const unit = axisUnit("energy", Math.abs(origin));
  const decimals = Math.max(0, Math.round(Math.log10(unit.size / coarse)));
  return `${(origin / unit.size).toFixed(Math.min(decimals, 15))} ${unit.name}`;
}
