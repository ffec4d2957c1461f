import { describe, expect, it } from "vitest";
import { DesignLimitError } from "../../src/studies/limits.js";
import { spectrum } from "../../src/studies/spectrum.js";
import { spectrumChecks } from "../../src/studies/spectrum-checks.js";
import {
  checkEnergies,
  evenEnergies,
  MOST_ENERGIES,
  packetEnergies,
  packetRange,
} from "../../src/studies/spectrum-energies.js";
import type { SpectrumRow } from "../../src/studies/spectrum-row.js";
import { HBAR } from "../../src/units/constants.js";
import { designOf, MASS, potentialOf } from "../grid/samples.js";
import { sech2, slabs, smoothStep } from "../potentials/closed-forms.js";

const rectangular = designOf(potentialOf("rectangular", { height: 0.3, width: 5 }), {
  energy: 0.15,
  width: 10,
});
const uphill = designOf(potentialOf("step", { height: 0.1, thickness: 0.5 }), { energy: 0.2, width: 8 });
const downhill = designOf(potentialOf("step", { height: -0.1, thickness: 0.5 }), {
  energy: 0.2,
  width: 8,
  from: "right",
});
const walls = [
  { width: 7, height: 0.3 },
  { width: 9, height: 0 },
  { width: 7, height: 0.3 },
];

const row = (energy: number, value: number, error: number): SpectrumRow => ({
  energy,
  transmission: { value, error },
  reflection: { value: 1 - value, error },
});

describe.each(["packet", "stationary"] as const)("a spectrum, %s", (method) => {
  it.each([
    ["a rectangular barrier", rectangular, slabs([{ width: 5, height: 0.3 }])],
    [
      "a smooth barrier",
      designOf(potentialOf("sech2", { height: 0.3, width: 2 }), { energy: 0.2, width: 10 }),
      sech2(0.3, 2),
    ],
    // Measured from the left level, and the same from both sides.
    ["a step up", uphill, smoothStep(0.1, 0.5)],
    ["a step down, met from the right", downhill, smoothStep(-0.1, 0.5)],
  ])(
    "of %s lies within its bounds of the closed form at exactly the energies asked for",
    async (_, design, exact) => {
      const energies = [0.123, 0.15, 0.2071, 0.3, 0.41];
      const answer = await spectrum(design, energies, { method });
      expect(answer.rows.map(({ energy }) => energy)).toEqual(energies);
      for (const { energy, transmission, reflection } of answer.rows) {
        const truth = exact(energy, MASS);
        // The closed forms themselves are good to some units of the last place, which the witness' bound may fall below.
        const slack = 1e-13 * truth;
        expect(Math.abs(transmission.value - truth)).toBeLessThanOrEqual(transmission.error + slack);
        expect(Math.abs(reflection.value - (1 - truth))).toBeLessThanOrEqual(
          reflection.error + 1e-15 + slack,
        );
      }
      expect(answer).toMatchObject({ method, verdict: "trusted", accuracy: { asked: 1e-6 } });
      expect(answer.accuracy.reached).toBeLessThanOrEqual(1e-6);
      expect(answer.packets.length > 0).toBe(method === "packet");
      expect(answer.floor).toBeLessThan(1e-24);
    },
  );

  it("names the resonances between the rows, however narrow", async () => {
    const design = designOf(potentialOf("layers", { layers: walls }), { energy: 0.05, width: 20 });
    // Two energies far from the resonance on either side: no row sees anything of it.
    const { rows, resonances } = await spectrum(design, [0.035, 0.045], { method });
    for (const { transmission } of rows) expect(transmission.value).toBeLessThan(1e-5);
    expect(resonances).toHaveLength(1);
    const [{ energy, width }] = resonances;
    expect(width / 3.6e-6).toBeCloseTo(1, 1);
    // A symmetric structure lets everything through at resonance, and half of it half a width beside it; what is off is the neighbours'.
    const exact = slabs(walls);
    expect(exact(energy, MASS)).toBeCloseTo(1, 3);
    for (const side of [-1, 1]) expect(exact(energy + (side * width) / 2, MASS)).toBeCloseTo(0.5, 3);
  });

  it("is stopped by its signal", async () => {
    const signal = AbortSignal.abort(new Error("stopped"));
    await expect(spectrum(rectangular, [0.1], { method, signal })).rejects.toThrow("stopped");
  });

  it("refuses a potential that lets nothing through, and a stepper that cannot do the design", async () => {
    const harmonic = designOf(potentialOf("harmonic", { quantum: 0.1 }), { energy: 0.15, width: 10 });
    await expect(spectrum(harmonic, [0.1], { method })).rejects.toThrow(DesignLimitError);
    await expect(spectrum(harmonic, [0.1], { method })).rejects.toThrow(/confines the particle/);
    const heavy = [{ width: 3, height: 0.3, mass: 2 * MASS }];
    const forced = designOf(
      potentialOf("layers", { layers: heavy }),
      { energy: 0.15, width: 10 },
      { stepper: "split-operator" },
    );
    await expect(spectrum(forced, [0.1], { method })).rejects.toMatchObject({ path: "numerics.stepper" });
  });
});

describe("both methods", () => {
  it("agree within their bounds from 1 to 1e-18, and within 1e-6", async () => {
    const thick = designOf(potentialOf("rectangular", { height: 0.5, width: 23 }), {
      energy: 0.1,
      width: 10,
    });
    const energies = evenEnergies(0.01, 0.7, 9);
    const [byPacket, exact] = await Promise.all(
      (["packet", "stationary"] as const).map((method) => spectrum(thick, energies, { method })),
    );
    expect(Math.min(...exact.rows.map(({ transmission }) => transmission.value))).toBeLessThan(1e-18);
    byPacket.rows.forEach(({ transmission }, n) => {
      const { value, error } = exact.rows[n].transmission;
      const apart = Math.abs(transmission.value - value);
      expect(apart).toBeLessThanOrEqual(transmission.error + error);
      expect(apart).toBeLessThanOrEqual(1e-6 * value);
    });
  });

  it("say that forced numerics are not theirs", async () => {
    const forced = designOf(rectangular.potential, rectangular.packet, { step: 0.4 });
    const { notes } = await spectrum(forced, [0.1], { method: "stationary" });
    expect(notes).toEqual([expect.stringMatching(/^Numerics forced in the design are not used/)]);
    expect((await spectrum(uphill, [0.2], { method: "stationary" })).notes[0]).toMatch(
      /right one lies 0\.1 eV above it/,
    );
    expect((await spectrum(rectangular, [0.2], { method: "stationary" })).notes).toEqual([]);
  });

  it("are the only ones", async () => {
    await expect(spectrum(rectangular, [0.1], { method: "guess" as "packet" })).rejects.toThrow(TypeError);
  });
});

describe("energies that are refused", () => {
  it.each([
    [rectangular, [], "at least one energy"],
    [rectangular, [0], 'an energy above zero, the level on the left, is needed; got "0 eV"'],
    [rectangular, [-0.1, 0.1], 'an energy above zero, the level on the left, is needed; got "-0.1 eV"'],
    [rectangular, [0.1, Number.NaN], "got NaN"],
    [rectangular, [0.1, Number.POSITIVE_INFINITY], "got Infinity"],
    [rectangular, [0.2, 0.1], 'ascending energies are needed, each once; "0.1 eV" comes after "0.2 eV"'],
    [rectangular, [0.1, 0.1], 'ascending energies are needed, each once; "0.1 eV" comes after "0.1 eV"'],
    [
      uphill,
      [0.1],
      'an energy above 0.1 eV is needed, because the right level of the potential lies 0.1 eV above the left one; got "0.1 eV"',
    ],
    [downhill, [0], "an energy above zero"],
    [rectangular, evenEnergies(0.1, 0.2, MOST_ENERGIES + 1), `at most ${MOST_ENERGIES} energies`],
  ])("%#", async (design, energies, message) => {
    expect(() => checkEnergies(design, energies)).toThrow(RangeError);
    expect(() => checkEnergies(design, energies)).toThrow(message);
    await expect(spectrum(design, energies)).rejects.toThrow(message);
  });
});

describe("the energies taken where none are asked for", () => {
  it.each([1e-9, 1e-3, 1, 1e6])(
    "are about a hundred round ones over the packet's own, at %d times the scale",
    (scale) => {
      const potential = potentialOf("rectangular", { height: 0.3 * scale, width: 5 / Math.sqrt(scale) });
      const design = designOf(potential, { energy: 0.15 * scale, width: 10 / Math.sqrt(scale) });
      const energies = packetEnergies(design);
      expect(energies.length).toBeGreaterThan(60);
      expect(energies.length).toBeLessThan(140);
      checkEnergies(design, energies);
      const [low, high] = packetRange(design);
      // Four spreads of k, 1/(2 width) each, to either side of k0.
      const share = 4 / (2 * 10 * (Math.sqrt(2 * MASS * 0.15) / HBAR));
      expect(low / scale).toBeCloseTo(0.15 * (1 - share) ** 2, 12);
      expect(high / scale).toBeCloseTo(0.15 * (1 + share) ** 2, 12);
      // Round: a few digits say the whole number.
      for (const energy of energies) expect(Number(energy.toPrecision(4))).toBeCloseTo(energy, 12);
    },
  );

  it("begin above the higher level", () => {
    expect(packetEnergies(uphill)[0]).toBeGreaterThan(0.1);
    expect(packetEnergies(downhill)[0]).toBeGreaterThan(0);
  });
});

describe("the checks of a spectrum", () => {
  it("pass when every bound is within the accuracy, and name the widest", () => {
    const [accuracy, sum] = spectrumChecks([row(0.1, 0.5, 1e-8), row(0.2, 0.5, 1e-7)], 1e-6, 0);
    expect(accuracy).toMatchObject({ name: "accuracy", value: 2e-7, limit: 1e-6, passed: true });
    expect(accuracy.explanation).toMatch(/greatest is that at 0\.2 eV$/);
    expect(sum).toMatchObject({ name: "sum", passed: true });
  });

  it("name the energies that miss it, the worst first, and those hidden by round-off", () => {
    const rows = [
      row(0.1, 1e-30, 1e-28),
      row(0.2, 0, 1e-28),
      row(0.3, 0.5, 1e-4),
      row(0.4, 0.5, 1e-9),
      row(0.5, 0.5, 1e-5),
    ];
    const [{ passed, value, explanation }] = spectrumChecks(rows, 1e-6, 1e-28);
    expect({ passed, value }).toEqual({ passed: false, value: Number.MAX_VALUE });
    expect(explanation).toMatch(
      /4 of 5 energies miss it, worst 0\.2 eV, 0\.1 eV, 0\.3 eV and 1 more; 2 of these lie below 1\.0e-28, where round-off hides/,
    );
  });

  it("see transmission and reflection that do not add up", () => {
    const wrong = { ...row(0.1, 0.5, 1e-9), reflection: { value: 0.51, error: 1e-9 } };
    expect(spectrumChecks([row(0.05, 0.5, 1e-9), wrong], 1e-6, 0)[1]).toMatchObject({ passed: false });
    expect(spectrumChecks([wrong], 1e-6, 0)[1].value).toBeCloseTo(0.01, 8);
  });
});
