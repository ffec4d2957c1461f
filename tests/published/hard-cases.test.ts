import { describe, expect, it } from "vitest";
import { departure } from "../../src/grid/journey.js";
import { type Estimate, estimate, readDesign } from "../../src/index.js";
import { DEFAULT_ACCURACY } from "../../src/problem/design.js";
import { packetAverage as witnessAverage } from "../../src/stationary/packet-average.js";
import { scatter } from "../../src/stationary/scattering.js";
import { packetSpectrum } from "../../src/studies/packet-spectrum.js";
import type { Bounded } from "../../src/units/bounded.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { eckart, slabs, type Transmission } from "../potentials/closed-forms.js";
import {
  designText,
  expectBoundsHold,
  flatLayers,
  fromTheRight,
  packetAverage,
  type Row,
  sharpStep,
} from "./estimate-helpers.js";

/**
 * Each hard case is answered three times: by the estimate, by the stationary witness, and by the tests' own average over the closed form or
 * transfer matrix. Any two agree within their bounds.
 */
interface Case extends Row {
  readonly closed: Transmission;
  /** Level on the right, eV. */
  readonly right?: number;
}

interface Answers {
  readonly answer: Estimate;
  readonly witness: ReturnType<typeof witnessAverage>;
  readonly reference: number;
}

/** The tests' own averages in double precision, as in estimate-closed-forms.test.ts. */
const AVERAGE_ERROR = 1e-12;

function closedFormMean({ closed, right = 0, from, energy, width, mass = 0.067 }: Case): number {
  const [form, threshold] =
    from === "right" ? [fromTheRight(closed, right), Math.max(0, -right)] : [closed, Math.max(0, right)];
  return packetAverage(form, Number(energy), Number(mass), Number(width), threshold);
}

function expectAgreement(a: Bounded, b: Bounded): void {
  expect(Math.abs(a.value - b.value), JSON.stringify({ a, b })).toBeLessThanOrEqual(a.error + b.error);
}

/** Asks all three and holds them against each other. */
async function askAll(row: Case): Promise<Answers> {
  const design = readDesign(designText(row));
  const answer = await estimate(design);
  const witness = witnessAverage(design.potential, design.particleMass, departure(design).packet);
  const reference = closedFormMean(row);
  expectAgreement(answer.transmission, witness.transmission);
  expectAgreement(answer.reflection, witness.reflection);
  expectBoundsHold(answer, reference, AVERAGE_ERROR * reference);
  expectAgreement(witness.transmission, { value: reference, error: AVERAGE_ERROR * reference });
  return { answer, witness, reference };
}

/** The spectrum by packet at total energies (eV), against the witness and the closed form. */
async function expectSpectrumHolds(
  row: Case,
  energies: readonly number[],
  accuracy = DEFAULT_ACCURACY,
): Promise<void> {
  const design = readDesign(designText(row));
  const { rows } = await packetSpectrum(design, energies, accuracy, {});
  expect(rows.map(({ energy }) => energy)).toEqual(energies);
  for (const { energy, transmission, reflection } of rows) {
    const truth = scatter(design.potential, design.particleMass, energy);
    expectAgreement(transmission, truth.transmission);
    expectAgreement(reflection, truth.reflection);
    // Closed forms lose digits in differences of large exponentials: some units in the last place times their size.
    const closed = row.closed(energy, design.particleMass);
    expectAgreement(truth.transmission, { value: closed, error: AVERAGE_ERROR * closed });
    expect(transmission.error, `at ${energy} eV`).toBeLessThanOrEqual(accuracy * closed);
  }
}

const ALGAAS = { height: 0.2591, mass: 0.0919 };
const layered = (layers: readonly { width: number; height: number; mass?: number }[]) => ({
  potential: flatLayers(layers),
  closed: slabs(
    layers.map(({ width, height, mass }) => ({
      width,
      height,
      mass: mass === undefined ? undefined : mass * ELECTRON_MASS,
    })),
  ),
});
const sharp = (height: number) => ({
  potential: `{ shape: step, height: ${height} eV }`,
  closed: sharpStep(height),
  right: height,
});

describe("hard cases: estimate, witness and closed form agree within their bounds", () => {
  it("a resonance that holds the packet for 1.4 ps (double barrier 4.5/5/4.5 nm, transfer matrix)", async () => {
    const wall = { width: 4.5, ...ALGAAS };
    const row = { ...layered([wall, { width: 5, height: 0 }, wall]), energy: 0.077, width: 20 };
    const { answer, witness } = await askAll(row);
    const lifetimes = witness.resonances.map(({ width }) => HBAR / width);
    expect(Math.max(...lifetimes)).toBeGreaterThan(1400);
    // It was waited for, not given up.
    expect(answer.time.end_fs).toBeGreaterThan(5 * Math.max(...lifetimes));
    expect(answer.verdict).toBe("trusted");
    await expectSpectrumHolds(row, [0.06, 0.09]);
  });

  it("a mean energy far below a thick barrier: the tail carries all, and the estimate says so", async () => {
    const row = {
      ...layered([{ width: 20, height: 0.4, mass: 0.1 }]),
      energy: 0.12,
      width: 8,
    };
    const { answer, reference } = await askAll(row);
    expect(reference).toBeGreaterThan(1e4 * row.closed(0.12, 0.067 * ELECTRON_MASS));
    expect(answer.carryingEnergy).toBeGreaterThan(0.3);
    expect(answer.notes.join(" ")).toMatch(
      /Most of what got through came at about 0\.\d+ eV, not at the packet's mean of 0\.120 eV: its transmission is that of a tail\./,
    );
    expect(answer.verdict).toBe("trusted");
  });

  it("T near 1e-20: rounding has its part of the bound, and it holds", async () => {
    const row = { ...layered([{ width: 5.2, height: 1, mass: 1 }]), mass: 0.5, energy: 0.25, width: 8 };
    const { answer, reference } = await askAll(row);
    expect(reference).toBeLessThan(1e-19);
    expect(reference).toBeGreaterThan(1e-21);
    expect(answer.parts.roundOff).toBeGreaterThan(answer.time.steps * Number.EPSILON ** 2);
    expect(answer.transmission.error).toBeGreaterThanOrEqual(answer.parts.roundOff);
    expect(answer.verdict).toBe("trusted");
    await expectSpectrumHolds(row, [0.2, 0.25, 0.35]);
  });

  it("T below what rounding lets through: the bound grows to the size of the value and says doubtful", async () => {
    const row = { ...layered([{ width: 9, height: 1, mass: 1 }]), mass: 0.5, energy: 0.25, width: 8 };
    const { answer, reference } = await askAll(row);
    expect(reference).toBeLessThan(1e-32);
    expect(answer.parts.roundOff).toBeGreaterThan(reference);
    expect(answer.verdict).toBe("doubtful");
  });

  it("a mean energy exactly at the barrier's top: T(E0) = 1/(1 + m V a^2/(2 hbar^2)) (Landau & Lifshitz par. 25, problem 2 [memory])", async () => {
    const row = { ...layered([{ width: 5, height: 0.3 }]), energy: 0.3, width: 15 };
    const { answer } = await askAll(row);
    expect(answer.verdict).toBe("trusted");
    // 40-50 digit arithmetic with CODATA 2022.
    const atTop = 0.2327064451892803;
    expectAgreement(answer.atMeanEnergy, { value: atTop, error: 1e-15 });
    await expectSpectrumHolds(row, [0.3]);
  });

  it("a packet ten times wider than the spacing of the walls that it meets (three walls, transfer matrix)", async () => {
    const wall = { width: 1.5, ...ALGAAS };
    const well = { width: 4, height: 0 };
    const row = { ...layered([wall, well, wall, well, wall]), energy: 0.11, width: 55 };
    const { answer } = await askAll(row);
    expect(answer.verdict).toBe("trusted");
    await expectSpectrumHolds(row, [0.09, 0.11, 0.13]);
  });

  it("light and heavy masses side by side, 0.02 to 1 m_e (psi'/m continuous, BenDaniel & Duke, Phys. Rev. 152, 683 (1966))", async () => {
    const row = {
      ...layered([
        { width: 3, height: 0.2, mass: 0.02 },
        { width: 0.8, height: 0.35, mass: 1 },
        { width: 2, height: 0.1, mass: 0.02 },
        { width: 0.6, height: -0.2, mass: 0.9 },
      ]),
      mass: 0.2,
      energy: 0.15,
      width: 12,
    };
    const { answer } = await askAll(row);
    expect(answer.verdict).toBe("trusted");
    await expectSpectrumHolds(row, [0.1, 0.15, 0.2]);
  });

  it("a step down of ten times the packet's energy (Landau & Lifshitz par. 25, problem 1 [memory])", async () => {
    const row = { ...sharp(-0.8), energy: 0.08, width: 15 };
    const { answer } = await askAll(row);
    expect(answer.verdict).toBe("trusted");
    await expectSpectrumHolds(row, [0.04, 0.08, 0.16]);
  });

  it("a packet from the right, downhill over an Eckart barrier (C. Eckart, Phys. Rev. 35, 1303 (1930), eq. (15))", async () => {
    const row = {
      potential: "{ shape: eckart, height: 0.3 eV, drop: 0.12 eV, width: 1 nm }",
      closed: eckart(0.3, 0.12, 1),
      right: 0.12,
      energy: 0.1,
      width: 14,
      from: "right" as const,
    };
    const { answer } = await askAll(row);
    expect(answer.verdict).toBe("trusted");
    await expectSpectrumHolds(row, [0.17, 0.22, 0.3]);
  });
});
