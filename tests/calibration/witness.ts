import { departure } from "../../src/grid/journey.js";
import type { Design } from "../../src/problem/design.js";
import { packetAverage } from "../../src/stationary/packet-average.js";
import type { Bounded } from "../../src/units/bounded.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { packetAverage as closedFormAverage, fromTheRight } from "../published/estimate-helpers.js";
import type { DrawnDesign } from "./drawn-design.js";

/** What a second, independent calculation says of a design. */
export interface Reference {
  readonly name: "witness" | "closed form";
  readonly transmission: Bounded;
  readonly reflection: Bounded;
  /** Longest lifetime (fs) of the resonances among the packet's energies; 0 without any. */
  readonly lifetime: number;
  readonly seconds: number;
}

/** The stationary witness of the library. */
export function witnessReference(design: Design): Reference {
  const begin = performance.now();
  const { packet, lowest, highest } = departure(design);
  const { transmission, reflection, resonances } = packetAverage(
    design.potential,
    design.particleMass,
    packet,
  );
  const among = resonances.filter(({ energy }) => energy >= lowest && energy <= highest);
  return {
    name: "witness",
    transmission,
    reflection,
    lifetime: Math.max(0, ...among.map(({ width }) => HBAR / width)),
    seconds: (performance.now() - begin) / 1000,
  };
}

/** Relative error of the tests' own averages in double precision, as in tests/published. */
const CLOSED_FORM_ERROR = 1e-12;

/** The closed form averaged over the packet by the tests' own quadrature; undefined where there is none, or it does not settle. */
export function closedFormReference(drawn: DrawnDesign, design: Design): Reference | undefined {
  const { closedForm, levelRight } = drawn;
  if (closedForm === undefined) return undefined;
  const begin = performance.now();
  const { energy, width, from } = design.packet;
  const [form, threshold] =
    from === "right"
      ? [fromTheRight(closedForm, levelRight), Math.max(0, -levelRight)]
      : [closedForm, Math.max(0, levelRight)];
  const value = settled(() =>
    closedFormAverage(form, energy, design.particleMass / ELECTRON_MASS, width, threshold),
  );
  if (value === undefined) return undefined;
  const error = CLOSED_FORM_ERROR * value;
  return {
    name: "closed form",
    transmission: { value, error },
    reflection: { value: 1 - value, error: error + 2 * Number.EPSILON },
    lifetime: 0,
    seconds: (performance.now() - begin) / 1000,
  };
}

function settled(average: () => number): number | undefined {
  try {
    const value = average();
    return Number.isFinite(value) ? value : undefined;
  } catch {
    // Its panels ran out at a resonance.
    return undefined;
  }
}
