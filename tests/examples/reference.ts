import { type DesignValue, parseQuantity, type QuantityKind } from "../../src/index.js";
import { ELECTRON_MASS } from "../../src/units/constants.js";
import {
  delta,
  eckart,
  type Slab,
  sech2,
  slabs,
  smoothStep,
  type Transmission,
} from "../potentials/closed-forms.js";
import { fromTheRight, packetAverage } from "../published/estimate-helpers.js";

type Written = { readonly [key: string]: DesignValue };

/** Transmission of a packet and of a plane wave of its mean energy, relative error of both. */
export interface Reference {
  readonly packet: number;
  readonly planeWave: number;
  readonly error: number;
}

const quantity = (map: Written, key: string, kind: QuantityKind): number =>
  parseQuantity(String(map[key]), kind, { range: "any" });

interface Form {
  readonly transmission: Transmission;
  /** Level on the right, eV. */
  readonly right: number;
  readonly error: number;
}

/** Round-off of a closed form and of its average: phases and exponents of up to a hundred. */
const ROUND_OFF = 1e-12;

/** The transmission of a design written out in full, by a closed form or a transfer matrix that shares nothing with the program. */
export function referenceFor(design: Written): Reference {
  const [particle, potential, packet] = ["particle", "potential", "packet"].map(
    (key) => design[key] as Written,
  );
  const mass = quantity(particle, "mass", "mass");
  const energy = quantity(packet, "energy", "energy");
  const sigma = quantity(packet, "width", "length");
  const { transmission, right, error } = form(potential);
  const incident = packet.from === "right" ? fromTheRight(transmission, right) : transmission;
  const threshold = Math.max(0, packet.from === "right" ? -right : right);
  return {
    packet: packetAverage(incident, energy, mass / ELECTRON_MASS, sigma, threshold),
    planeWave: incident(energy, mass),
    error,
  };
}

function form(potential: Written): Form {
  const energy = (key: string) => quantity(potential, key, "energy");
  const length = (key: string) => quantity(potential, key, "length");
  const level = (transmission: Transmission, right = 0): Form => ({ transmission, right, error: ROUND_OFF });
  switch (potential.shape) {
    case "rectangular":
      return level(slabs([slab(potential)]));
    case "layers":
      return level(slabs((potential.layers as readonly Written[]).map(slab)));
    case "step":
      return level(smoothStep(energy("height"), length("thickness")), energy("height"));
    case "sech2":
      return level(sech2(energy("height"), length("width")));
    case "eckart":
      return level(eckart(energy("height"), energy("drop"), length("width")), energy("drop"));
    case "delta":
      return level(delta(quantity(potential, "strength", "strength")));
    case "gaussian":
      return { transmission: staircase(energy("height"), length("width")), right: 0, error: STAIRCASE_ERROR };
    default:
      throw new Error(`no outside value for the shape ${potential.shape}`);
  }
}

function slab(written: Written): Slab {
  const mass = written.mass === undefined ? undefined : quantity(written, "mass", "mass");
  return { width: quantity(written, "width", "length"), height: quantity(written, "height", "energy"), mass };
}

/** Numbers of stairs, and the relative error that extrapolation from them leaves, by comparison with eight times as many. */
const STAIRS = [50, 100, 200, 400];
const STAIRCASE_ERROR = 1e-8;
/** The Gaussian is cut at so many widths, where it is 1e-14 of its height. */
const CUT = 8;

/**
 * No closed form is known for a Gaussian: a staircase through its midpoints, whose error is a series in the square of the stairs' width,
 * extrapolated by Richardson.
 */
function staircase(height: number, width: number): Transmission {
  const flights = STAIRS.map((count) => {
    const w = (2 * CUT * width) / count;
    const middle = (i: number) => -CUT + ((i + 0.5) * 2 * CUT) / count;
    return slabs(
      Array.from({ length: count }, (_, i) => ({
        width: w,
        height: height * Math.exp(-0.5 * middle(i) ** 2),
      })),
    );
  });
  return (energy, mass) => {
    let row = flights.map((flight) => flight(energy, mass));
    for (let j = 1; row.length > 1; j++)
      row = row.slice(1).map((value, i) => value + (value - row[i]) / (4 ** j - 1));
    return row[0];
  };
}
