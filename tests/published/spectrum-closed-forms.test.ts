import { describe, expect, it } from "vitest";
import { DEFAULT_ACCURACY, type Design } from "../../src/problem/design.js";
import { packetSpectrum } from "../../src/studies/packet-spectrum.js";
import { ELECTRON_MASS } from "../../src/units/constants.js";
import { PRINTED, type PublishedCurve } from "./published-curve.js";
import * as layered from "./values-layered.js";
import * as sloped from "./values-sloped.js";
import * as smooth from "./values-smooth.js";
import * as stacks from "./values-stacks.js";

// Every closed form that packets can be sent through, by the spectrum read from them: all energies of a curve in one call, as a user would ask. That of
// the lattice is met by the stepper itself: tests/steppers/crank-nicolson.lattice.test.ts.

const FORMS = [
  layered.RECTANGULAR,
  layered.SHARP_STEP,
  smooth.SMOOTH_STEP,
  layered.POINTS,
  layered.TWO_POINTS,
  smooth.SECH2,
  smooth.ECKART,
  sloped.TRAPEZOID,
  stacks.MASS_MISMATCH,
  stacks.DOUBLE_BARRIERS,
].map(
  ({ source, curves }) =>
    [
      source,
      curves
        .filter(({ witnessOnly }) => witnessOnly === undefined)
        .map((curve) => [curve.title, curve] as const),
    ] as const,
);

/** A design around a potential; the packet is the spectrum's own, whatever the design says. */
const designAround = ({ title, mass, potential, points }: PublishedCurve): Design => ({
  title,
  sha256: "0".repeat(64),
  particleMass: mass * ELECTRON_MASS,
  potential,
  packet: { energy: points[0][0], width: 10, from: "left" },
  numerics: {},
});

describe.each(FORMS)("%s, spectrum by packet", (_source, curves) => {
  it.each(curves)("%s", async (_title, curve) => {
    const { points, printed = PRINTED, ringing = [] } = curve;
    const asked = points.filter(([energy]) => !ringing.includes(energy));
    const { rows } = await packetSpectrum(
      designAround(curve),
      asked.map(([energy]) => energy),
      DEFAULT_ACCURACY,
      {},
    );
    expect(rows).toHaveLength(asked.length);
    rows.forEach(({ energy, transmission, reflection }, n) => {
      const [asks, published] = asked[n];
      const context = JSON.stringify({ energy, published, transmission });
      const slack = printed * published;
      const apart = Math.abs(transmission.value - published);
      expect(energy).toBe(asks);
      expect(apart, context).toBeLessThanOrEqual(DEFAULT_ACCURACY * published);
      expect(apart, context).toBeLessThanOrEqual(transmission.error + slack);
      expect(transmission.error, context).toBeLessThanOrEqual(DEFAULT_ACCURACY * published);
      // A unit in the last place for taking the published value from 1.
      expect(Math.abs(reflection.value - (1 - published)), context).toBeLessThanOrEqual(
        reflection.error + slack + Number.EPSILON,
      );
    });
  });
});
