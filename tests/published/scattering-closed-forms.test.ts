import { describe, expect, it } from "vitest";
import type { Potential } from "../../src/potentials/potential.js";
import { resonancesBetween } from "../../src/stationary/resonances-between.js";
import { prepareScattering, scatter } from "../../src/stationary/scattering.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { delta as deltaTransmission } from "../potentials/closed-forms.js";
import { expectTransmission, layers, shape } from "../stationary/helpers.js";
import { parabola, triangle, twoPoints } from "./made-potentials.js";
import { PRINTED, type PublishedCurve } from "./published-curve.js";
import * as layered from "./values-layered.js";
import * as sloped from "./values-sloped.js";
import * as smooth from "./values-smooth.js";
import * as stacks from "./values-stacks.js";

// Every closed form by the stationary witness. The lattice's own is met by the stepper itself: tests/steppers/crank-nicolson.lattice.test.ts.

const FORMS = [
  layered.RECTANGULAR,
  layered.SHARP_STEP,
  smooth.SMOOTH_STEP,
  layered.POINTS,
  layered.TWO_POINTS,
  smooth.SECH2,
  smooth.ECKART,
  smooth.PARABOLA,
  sloped.TRIANGLE,
  sloped.TRAPEZOID,
  stacks.MASS_MISMATCH,
  stacks.DOUBLE_BARRIERS,
].map(({ source, curves }) => [source, curves.map((curve) => [curve.title, curve] as const)] as const);

/** The energies at which a wave can also come from the right, whose T is the same by reciprocity. */
const fromTheRight = ({ points, potential }: PublishedCurve) =>
  points.filter(([energy]) => energy > potential.levelRight);

describe.each(FORMS)("%s", (_source, curves) => {
  it.each(curves)("%s", (_title, curve) => {
    const { potential, mass, points, printed = PRINTED, widest } = curve;
    for (const [energy, published] of points)
      expectTransmission(potential, mass, energy, published, printed, "left", widest);
    // The mass of the particle is that of the side that it comes from.
    const right = potential.mass(potential.faces[1] + 1) / ELECTRON_MASS;
    for (const [energy, published] of fromTheRight(curve))
      expectTransmission(potential, right, energy, published, printed, "right", widest);
  });
});

describe("energies at which everything passes", () => {
  it.each([0.02449561916708811, 0.3051151431259483, 0.6979824766683524])(
    "a well of -0.2 eV and 10 nm at %f eV (n^2 pi^2 hbar^2/(2 m a^2) - 0.2 eV, Ramsauer condition)",
    (energy) => {
      const well = shape("rectangular", { height: -0.2, width: 10 }, 0.067);
      const { transmission, reflection } = scatter(well, 0.067 * ELECTRON_MASS, energy);
      expect(reflection.value).toBeLessThan(1e-27);
      expect(1 - transmission.value).toBeLessThanOrEqual(transmission.error);
      expect(transmission.error).toBeLessThan(3e-16);
    },
  );

  it.each([0.0386315774743454, 0.165577009550423, 0.395449813499485])(
    "two points of 0.5 eV nm 10 nm apart at %f eV (tan kL = -1/beta, derived for this project)",
    (energy) => {
      const { reflection } = scatter(twoPoints(0.5, 10, 0.067), 0.067 * ELECTRON_MASS, energy);
      // R grows like ((E - E_r)/width)^2 from the 15 digits printed of E_r.
      expect(reflection.value).toBeLessThan(1e-24);
    },
  );

  const unit = HBAR ** 2 / (2 * 0.067 * ELECTRON_MASS * 4);
  it.each([
    [1, 0.2843270232066107],
    [2, 0.8529810696198321],
    [3, 1.7059621392396642],
  ])(
    "any at all, above a well lambda (lambda + 1) hbar^2/(2 m a^2) sech^2(x/a), lambda = %i (Landau & Lifshitz, par. 25, problem 4, citation from memory)",
    (lambda, depth) => {
      expect(lambda * (lambda + 1) * unit).toBeCloseTo(depth, 14);
      const well = shape("sech2", { height: -lambda * (lambda + 1) * unit, width: 2 }, 0.067);
      // States at -(lambda - j)^2 hbar^2/(2 m a^2), the last of them, j = lambda, at the level itself and unbound.
      expect(prepareScattering(well, 0.067 * ELECTRON_MASS).boundStates()).toBe(lambda);
      for (const energy of [0.001, 0.01, 0.1, 0.5]) {
        const { reflection, transmission, transmittedAmplitude } = scatter(
          well,
          0.067 * ELECTRON_MASS,
          energy,
        );
        expect(reflection.value).toBeLessThan(1e-26);
        expect(reflection.error).toBeLessThan(1e-20);
        expect(1 - transmission.value).toBeLessThanOrEqual(transmission.error);
        // t = prod (k a + i n)/(k a - i n), referred to the centre; the faces add the free phase between them.
        const k = Math.sqrt(2 * 0.067 * ELECTRON_MASS * energy) / HBAR;
        let phase = k * (well.faces[1] - well.faces[0]);
        for (let n = 1; n <= lambda; n++) phase += 2 * Math.atan2(n, k * 2);
        // The phase of 80 nm of free motion, some tens of radians, is rounded to 1e-14.
        expect(Math.abs(transmittedAmplitude[0] - Math.cos(phase))).toBeLessThan(1e-13);
        expect(Math.abs(transmittedAmplitude[1] - Math.sin(phase))).toBeLessThan(1e-13);
      }
    },
  );
});

describe("points of strength (D. J. Griffiths, sec. 2.5, citation from memory)", () => {
  it("let as much pass when they attract", () => {
    for (const { mass, points } of layered.POINTS.curves)
      for (const [energy, published] of points)
        expectTransmission(shape("delta", { strength: -0.5 }, mass), mass, energy, published);
  });

  it("are taken for what they are far from the origin", () => {
    const strength = 1e-3;
    const moved: Potential = {
      ...shape("delta", { strength }, 0.067),
      cellAverage: (a, b) => (a < 123.456 && b > 123.456 ? strength / (b - a) : 0),
      interfaces: [123.456],
      faces: [123.456, 123.456],
    };
    expectTransmission(moved, 0.067, 0.01, deltaTransmission(strength)(0.01, 0.067 * ELECTRON_MASS), 1e-15);
  });
});

describe("profiles that fall without end, bent into a level", () => {
  it.each([
    ["parabola", (bend: number) => parabola({ top: 0.3, quantum: 0.1, mass: 0.067, bend }), 0.067, 0.1],
    ["triangle", (bend: number) => triangle({ top: 0.3, force: 0.05, mass: 0.067, bend }), 0.067, 0.1],
    ["steep triangle", (bend: number) => triangle({ top: 9.5, force: 10, mass: 1, bend }), 1, 5],
  ] as const)(
    "%s: the bend costs nothing, since one three quarters as deep changes T by less than 1e-12",
    (_, made, mass, energy) => {
      const [far, near, sharp] = [40, 30, 1].map(
        (bend) => scatter(made(bend), mass * ELECTRON_MASS, energy).transmission.value,
      );
      expect(Math.abs(near - far)).toBeLessThan(1e-12 * far);
      // The comparison sees a bend that is felt.
      expect(Math.abs(sharp - far)).toBeGreaterThan(1e-9 * far);
    },
  );
});

/**
 * Part of its width to which a pole is found by a fit through real energies around it; measured: 6e-8 at most, for widths of a tenth of the energy
 * or a third of the distance to the next pole. Wider ones, such as the second of 2/5/2 nm, are not promised to be found.
 */
const POLE = 1e-7;

describe("quasi-bound levels E_r and widths (poles E_r - i Gamma/2 of t(E) by Newton's method with 40 digits)", () => {
  const [symmetric, gallium, aluminium, indium, unequal] = stacks.DOUBLE_BARRIERS.curves;
  it.each(
    (
      [
        [symmetric, 0.01, 0.2, 0.105372188330368, 6.43213128415e-3],
        [gallium, 0.01, 0.2, 0.0764889912921063, 3.34307026915e-3],
        [aluminium, 0.01, 0.3, 0.124919653123528, 9.0879306343e-4],
        [aluminium, 0.3, 0.8, 0.518595705746392, 9.12079500944e-3],
        [indium, 0.01, 0.3, 0.139903214145472, 1.90825004729e-3],
        [unequal, 0.01, 0.25, 0.0870189528494659, 1.03371561852e-2],
      ] as const
    ).map(([curve, ...rest]) => [curve.title, curve, ...rest] as const),
  )("%s", (_title, { potential, mass }, from, to, level, width) => {
    const found = resonancesBetween(potential, mass * ELECTRON_MASS, from, to);
    expect(Math.abs(found[0].energy - level)).toBeLessThan(POLE * width);
    expect(Math.abs(found[0].width - width)).toBeLessThan(POLE * width);
  });

  it("come in pairs behind three walls, 2/5/2/5/2 nm of 0.5 eV", () => {
    const triple = layers(0.067, [2, 0.5], [5, 0], [2, 0.5], [5, 0], [2, 0.5]);
    const found = resonancesBetween(triple, 0.067 * ELECTRON_MASS, 0.01, 0.6);
    const levels = [0.09598943833, 0.11656672479549, 0.36466234982092];
    levels.forEach((level, n) => {
      expect(Math.abs(found[n].energy - level)).toBeLessThan(POLE * found[n].width);
    });
  });

  it("at unequal walls let through what two mirrors do: T_L T_R/(1 - sqrt(R_L R_R))^2 (Ricco & Azbel, Phys. Rev. B 29, 1970 (1984), for the case)", () => {
    const m = 0.067 * ELECTRON_MASS;
    const [left, right] = [2, 3].map(
      (width) => scatter(layers(0.067, [width, 0.3]), m, 0.0870189528494659).transmission.value,
    );
    // Ten digits are printed.
    expect(left).toBeCloseTo(0.2545020699, 10);
    expect(right).toBeCloseTo(0.0810553405, 10);
    expect((4 * left * right) / (left + right) ** 2).toBeCloseTo(0.732823, 6);
    const most = (left * right) / (1 - Math.sqrt((1 - left) * (1 - right))) ** 2;
    expect(most).toBeCloseTo(0.6948, 4);
  });
});
