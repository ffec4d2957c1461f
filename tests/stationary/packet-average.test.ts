import { describe, expect, it } from "vitest";
import { normalTail } from "../../src/numerics/erfc.js";
import { type GaussianPacket, wavenumberOf } from "../../src/packets/gaussian.js";
import type { Potential } from "../../src/potentials/potential.js";
import { packetAverage } from "../../src/stationary/packet-average.js";
import { prepareScattering } from "../../src/stationary/scattering.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { integrateBetween } from "../potentials/tanh-sinh.js";
import { layers, pieces, shape } from "./helpers.js";

const MASS = 0.067;
const m = MASS * ELECTRON_MASS;

/** A packet so many widths from the face that it meets. */
function packetAt(
  potential: Potential,
  energy: number,
  width: number,
  from: "left" | "right" = "left",
  clearance = 13,
  mass = m,
): GaussianPacket {
  const direction = from === "left" ? 1 : -1;
  return {
    center: potential.faces[from === "left" ? 0 : 1] - direction * clearance * width,
    width,
    wavenumber: direction * wavenumberOf(energy, mass),
  };
}

const rect5 = shape("rectangular", { height: 0.3, width: 5 }, MASS);
const rect2 = shape("rectangular", { height: 0.3, width: 2 }, MASS);
const sech2 = shape("sech2", { height: 0.3, width: 2 }, MASS);
const point = shape("delta", { strength: 0.5 }, MASS);
const double = layers(MASS, [3, 0.2591, 0.0919], [5, 0], [3, 0.2591, 0.0919]);

describe("averages of closed forms over a packet (computed for this project by two quadratures, 16 digits)", () => {
  it.each([
    ["rect 5 nm", 0.1, 5, 0.01545760314690436, rect5],
    ["rect 5 nm", 0.1, 10, 0.01056301929471765, rect5],
    ["rect 5 nm", 0.1, 20, 9.680192934963149e-3, rect5],
    ["rect 5 nm", 0.2, 5, 0.09440383102980433, rect5],
    ["rect 5 nm", 0.2, 10, 0.06128365620732662, rect5],
    ["rect 5 nm", 0.2, 20, 0.05448736781504236, rect5],
    ["rect 5 nm", 0.3, 5, 0.3252527321778053, rect5],
    ["rect 5 nm", 0.3, 10, 0.2652504703677842, rect5],
    ["rect 5 nm", 0.3, 20, 0.2414831986409152, rect5],
    ["rect 5 nm", 0.4, 5, 0.6474370503601031, rect5],
    ["rect 5 nm", 0.4, 10, 0.6847131102052317, rect5],
    ["rect 5 nm", 0.4, 20, 0.6986330536850845, rect5],
    ["sech2", 0.1, 5, 0.06401092854852414, sech2],
    ["sech2", 0.1, 10, 0.04183399810024046, sech2],
    ["sech2", 0.1, 20, 0.0368019430507085, sech2],
    ["sech2", 0.2, 5, 0.2970788922808962, sech2],
    ["sech2", 0.2, 10, 0.2628402087185223, sech2],
    ["sech2", 0.2, 20, 0.2507552557543744, sech2],
    ["sech2", 0.3, 5, 0.6049176860585594, sech2],
    ["sech2", 0.3, 10, 0.6251302136158984, sech2],
    ["sech2", 0.3, 20, 0.6328030526186523, sech2],
    ["sech2", 0.4, 5, 0.823559652414174, sech2],
    ["sech2", 0.4, 10, 0.8620710118520116, sech2],
    ["sech2", 0.4, 20, 0.873558769454206, sech2],
    ["rect 2 nm", 0.15, 10, 0.402951085606882, rect2],
    ["point", 0.1, 10, 0.4732663577105698, point],
    ["point", 0.05, 10, 0.3113352067202093, point],
    ["double", 0.0765418395533605, 10, 0.09584932829324724, double],
    ["double", 0.0765418395533605, 30, 0.2523227921353453, double],
    ["double", 0.1, 20, 0.03539381285747311, double],
  ] as const)("%s, E0 = %f eV, sigma = %f nm: %f", (_, energy, width, published, potential) => {
    for (const from of ["left", "right"] as const) {
      const { transmission, reflection } = packetAverage(
        potential,
        m,
        packetAt(potential, energy, width, from),
      );
      // 1e-14: the quadratures behind the published value, summed in double precision.
      expect(Math.abs(transmission.value - published)).toBeLessThanOrEqual(
        transmission.error + 1e-14 * published,
      );
      expect(transmission.error).toBeLessThan(2e-12 * published);
      expect(Math.abs(reflection.value - (1 - published))).toBeLessThanOrEqual(reflection.error + 1e-14);
    }
  });
});

describe("resonances", () => {
  it.each([
    ["2/5/2", layers(MASS, [2, 0.5], [5, 0], [2, 0.5]), MASS, 0.105372188330368, 6.43213128415e-3],
    ["3/5/3", double, MASS, 0.0764889912921063, 3.34307026915e-3],
    [
      "1.5/4.5/1.5",
      layers(MASS, [1.5, 1, 0.15], [4.5, 0], [1.5, 1, 0.15]),
      MASS,
      0.124919653123528,
      9.0879306343e-4,
    ],
    [
      "3/4.5/3",
      layers(0.043, [3, 0.52, 0.075], [4.5, 0], [3, 0.52, 0.075]),
      0.043,
      0.139903214145472,
      1.90825004729e-3,
    ],
  ] as const)(
    "finds that of %s (poles by Newton's method with 40 digits)",
    (_, potential, mass, energy, width) => {
      const packet = packetAt(potential, energy, 10, "left", 13, mass * ELECTRON_MASS);
      const { resonances } = packetAverage(potential, mass * ELECTRON_MASS, packet);
      // The fit through eight energies is right to (width/energy)^8 or so, and to rounding.
      expect(Math.abs(resonances[0].energy - energy)).toBeLessThan(1e-9 * width);
      expect(Math.abs(resonances[0].width - width)).toBeLessThan(1e-9 * width);
    },
  );

  it("finds both of a doublet (poles as above)", () => {
    const triple = layers(MASS, [2, 0.5], [5, 0], [2, 0.5], [5, 0], [2, 0.5]);
    const { resonances } = packetAverage(triple, m, packetAt(triple, 0.105, 10));
    expect(resonances.slice(0, 2).map(({ energy }) => energy)).toEqual([
      expect.closeTo(0.09598943833, 10),
      expect.closeTo(0.11656672479549, 10),
    ]);
  });

  it("reports none for a barrier, a step and a point", () => {
    for (const potential of [rect5, sech2, point, shape("step", { height: -0.1, thickness: 1 }, MASS)])
      expect(packetAverage(potential, m, packetAt(potential, 0.15, 5)).resonances).toEqual([]);
  });
});

/**
 * P of the outgoing waves on the near side, from reflected amplitudes at real k alone: integral over k > 0 of |phi(-k) + r(k) phi(k)|^2. What is
 * neither there nor transmitted is bound: the expansion is complete, whatever goes on between the levels.
 */
function reflectedShare(potential: Potential, mass: number, packet: GaussianPacket): number {
  const scatterer = prepareScattering(potential, mass, "left");
  const { width, wavenumber: k0 } = packet;
  const distance = potential.faces[0] - packet.center;
  const density = (k: number) => {
    const { reflectedAmplitude: r } = scatterer.at(scatterer.near + (HBAR * k) ** 2 / (2 * mass));
    const ahead = Math.exp(-((width * (k - k0)) ** 2));
    const behind = Math.exp(-((width * (k + k0)) ** 2));
    // phi(k) has the phase exp(i k d) at the face, phi(-k) exp(-i k d).
    const [c, s] = [Math.cos(2 * k * distance), Math.sin(2 * k * distance)];
    const re = behind + ahead * (r[0] * c - r[1] * s);
    const im = ahead * (r[0] * s + r[1] * c);
    return Math.sqrt(2 / Math.PI) * width * (re * re + im * im);
  };
  const high = k0 + 4.5 / width;
  // Panels of two turns of 2 k d, for which 221 places are plenty; the ends of tanh-sinh crowd towards 0, where r starts like a root.
  return (
    integrateBetween(density, 1e-9 / width, high, [], (2 * Math.PI) / distance) + 1e-9 * density(1e-9 / width)
  );
}

describe("what decaying waves hold of a slow packet", () => {
  const alarmMass = 0.033 * ELECTRON_MASS;
  it.each([
    ["a sharp step down", pieces([0], [0, -0.05], [MASS, MASS]), m, 0.01, 3],
    [
      "a smooth step down",
      shape("step", { height: -0.0189, thickness: 2.61 }, 0.033),
      alarmMass,
      0.1417,
      6.02,
    ],
    ["a barrier before a lower level", pieces([0, 2], [0, 0.1, -0.1], [MASS, MASS, MASS]), m, 0.03, 4],
    // A quasi-level below the near level leaks to the far side only: a narrow resonance among decaying waves.
    [
      "a well before a lower level",
      pieces([0, 6, 12], [0, -0.15, 0.2, -0.1], [MASS, MASS, MASS, MASS]),
      m,
      0.02,
      5,
    ],
  ] as const)("%s: T, R and completeness", (_, potential, mass, energy, width) => {
    const packet = packetAt(potential, energy, width, "left", 13, mass);
    const { transmission, reflection } = packetAverage(potential, mass, packet);
    const share = reflectedShare(potential, mass, packet);
    // Ten digits of the oracle: amplitudes without bounds, thousands of panels.
    expect(Math.abs(reflection.value - share)).toBeLessThan(reflection.error + 1e-11);
    // Without the decaying waves the sum would be short by far more than that.
    const scatterer = prepareScattering(potential, mass);
    const moving = integrateBetween(
      (k) => {
        const { transmission: t } = scatterer.at((HBAR * k) ** 2 / (2 * mass));
        return (
          Math.sqrt(2 / Math.PI) * width * Math.exp(-2 * (width * (k - packet.wavenumber)) ** 2) * t.value
        );
      },
      1e-12,
      packet.wavenumber + 4.5 / width,
      [],
      0.1 / width,
    );
    expect(transmission.value - moving).toBeGreaterThan(1e-7);
  });

  it("a smooth step down of 0.0189 eV over 2.61 nm: 2.286e-7 of the packet leaves between the levels", () => {
    const step = shape("step", { height: -0.0189, thickness: 2.61 }, 0.033);
    const { transmission } = packetAverage(
      step,
      alarmMass,
      packetAt(step, 0.1417, 6.02, "left", 13, alarmMass),
    );
    // Computed here, and held by the completeness test above.
    expect(transmission.value).toBeCloseTo(0.999838225876, 12);
    expect(transmission.error).toBeLessThan(1e-13);
  });

  it("keeps what a bound state holds within the bound of R: a point well has one, sqrt(kappa) exp(-kappa |x|)", () => {
    const well = shape("delta", { strength: -0.2 }, MASS);
    const packet = packetAt(well, 0.01, 4);
    const { reflection, transmission } = packetAverage(well, m, packet);
    const share = reflectedShare(well, m, packet);
    const kappa = (m * 0.2) / HBAR ** 2;
    const d = 13 * 4;
    const overlap =
      Math.sqrt(2 / Math.PI) * 4 * Math.exp(-2 * kappa * d + 2 * 16 * (kappa ** 2 - packet.wavenumber ** 2));
    const held = kappa * 2 * Math.PI * overlap;
    expect(transmission.value + share + held).toBeCloseTo(1, 11);
    expect(Math.abs(reflection.value - share)).toBeLessThanOrEqual(reflection.error + 1e-11);
    expect(reflection.error).toBeGreaterThan(held);
  });
});

describe("random stacks", () => {
  it("gives the same average from both sides, within bounds that stay narrow", () => {
    // As in exact-oracle.test.ts.
    let state = 5;
    const next = () => {
      state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
      return state / 2 ** 32;
    };
    const sizes: number[] = [];
    for (let trial = 0; trial < 60; trial++) {
      const mass = 0.02 * 50 ** next();
      const stack = Array.from(
        { length: 1 + Math.floor(next() * 5) },
        () => [0.5 + 5 * next(), -0.3 + 1.5 * next(), 0.02 * 50 ** next()] as const,
      );
      const [energy, particle] = [0.02 + 0.5 * next(), mass * ELECTRON_MASS];
      const width = (3 + 6 * next()) / wavenumberOf(energy, particle);
      const potential = layers(mass, ...stack);
      const [a, b] = (["left", "right"] as const).map(
        (from) =>
          packetAverage(potential, particle, packetAt(potential, energy, width, from, 13, particle))
            .transmission,
      );
      const context = JSON.stringify({ trial, mass, stack, energy, width, a, b });
      expect(Math.abs(a.value - b.value), context).toBeLessThanOrEqual(a.error + b.error);
      // Wide where a resonance below 1e-15 eV carries it, or the packet's own tail across the face: 6e-39 of probability.
      expect(a.error, context).toBeLessThan(2e-5 * a.value + 5 * Math.sqrt(6.2e-39 * a.value) + 3e-38);
      sizes.push(a.error / a.value);
    }
    expect(sizes.sort((p, q) => p - q)[30]).toBeLessThan(1e-12);
  });

  it("takes no node of the standing wave before a high wall for a resonance", () => {
    // In front of walls that reflect all but 1e-21 the wave has nodes, and one passes the face at 0.2107 eV.
    const mass = 0.0408;
    const potential = layers(mass, [2.5, 0.058, 0.365], [5.07, 1.127, 0.0347], [4.32, 1.054, 0.99]);
    const particle = mass * ELECTRON_MASS;
    const { transmission, resonances } = packetAverage(
      potential,
      particle,
      packetAt(potential, 0.228, 12.7, "left", 13, particle),
    );
    expect(resonances).toEqual([]);
    expect(transmission.value).toBeLessThan(1e-20);
    expect(transmission.error).toBeLessThan(1e-7 * transmission.value);
  });
});

describe("packets at the edge of the method", () => {
  it("says how much a packet that overlaps its face may differ", () => {
    const clear = packetAverage(rect5, m, packetAt(rect5, 0.15, 10)).transmission;
    const close = packetAverage(rect5, m, packetAt(rect5, 0.15, 10, "left", 3)).transmission;
    expect(close.value).toBeCloseTo(clear.value, 12);
    expect(close.error).toBeGreaterThan(4 * normalTail(3));
    expect(close.error).toBeLessThan(0.1);
  });

  it("carries a packet far below a step up by its tail alone, without losing a digit", () => {
    const step = shape("step", { height: 0.2, thickness: 1 }, MASS);
    const packet = packetAt(step, 0.05, 20, "left", 20);
    const { transmission } = packetAverage(step, m, packet);
    const [k0, least] = [packet.wavenumber, wavenumberOf(0.2, m)];
    // T <= 1 bounds it by the normal tail; 1 - R = 1 - (sinh pi a(k1 - k2)/sinh pi a(k1 + k2))^2 gives it (closed form of the smooth step).
    const reference = integrateBetween(
      (k) => {
        const q = Math.sqrt(k * k - least * least);
        // 1 - (sinh x/sinh y)^2 = sinh(y - x) sinh(y + x)/sinh^2 y, free of cancellation at the threshold.
        const t =
          (Math.sinh(2 * Math.PI * q) * Math.sinh(2 * Math.PI * k)) / Math.sinh(Math.PI * (k + q)) ** 2;
        return Math.sqrt(2 / Math.PI) * 20 * Math.exp(-2 * (20 * (k - k0)) ** 2) * t;
      },
      least,
      least + 0.4,
      [],
      0.005,
    );
    expect(reference).toBeLessThan(normalTail((least - k0) * 40));
    expect(Math.abs(transmission.value - reference)).toBeLessThanOrEqual(
      transmission.error + 1e-12 * reference,
    );
    expect(transmission.error).toBeLessThan(1e-11 * reference);
  });

  it("gives T of 1e-33 through a wall with the bound that the packet's own tail leaves", () => {
    const wall = shape("rectangular", { height: 1, width: 30 }, MASS);
    const { transmission } = packetAverage(wall, m, packetAt(wall, 0.1, 10));
    expect(transmission.value).toBeGreaterThan(1e-34);
    expect(transmission.error).toBeLessThan(0.01 * transmission.value);
    const clear = packetAverage(wall, m, packetAt(wall, 0.1, 10, "left", 20)).transmission;
    expect(Math.abs(clear.value - transmission.value)).toBeLessThan(1e-12 * clear.value);
    expect(clear.error).toBeLessThan(1e-12 * clear.value);
  });

  it("counts its energies, reports progress, and refuses a packet at rest and a confining potential", () => {
    const seen: number[] = [];
    const { energies } = packetAverage(double, m, packetAt(double, 0.08, 10), {
      onProgress: (n) => seen.push(n),
    });
    expect(seen.length).toBeGreaterThan(0);
    expect(energies).toBeGreaterThanOrEqual(seen[seen.length - 1]);
    expect(() => packetAverage(rect5, m, { center: -100, width: 5, wavenumber: 0 })).toThrow(RangeError);
    const harmonic = shape("harmonic", { quantum: 0.1 }, MASS);
    expect(() => packetAverage(harmonic, m, { center: 0, width: 5, wavenumber: 0.5 })).toThrow(/confines/);
  });
});
