import { expect } from "vitest";
import { type Estimate, estimate, readDesign } from "../../src/index.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import type { Transmission } from "../potentials/closed-forms.js";
import { tanhSinh } from "../potentials/tanh-sinh.js";

/** What a published row says, in a design's own words; masses in m_e, energies in eV, lengths in nm unless units are given. */
export interface Row {
  readonly potential: string;
  readonly energy: number | string;
  readonly width: number | string;
  readonly mass?: number | string;
  readonly from?: "left" | "right";
  readonly numerics?: string;
}

const withUnit = (value: number | string, unit: string) =>
  typeof value === "number" ? `${value} ${unit}` : value;

export function designText({ potential, energy, width, mass = 0.067, from, numerics }: Row): string {
  const lines = [
    "title: A published value",
    `particle: { mass: ${withUnit(mass, "m_e")} }`,
    `potential: ${potential}`,
    `packet: { energy: ${withUnit(energy, "eV")}, width: ${withUnit(width, "nm")}${from ? `, from: ${from}` : ""} }`,
  ];
  if (numerics !== undefined) lines.push(`numerics: ${numerics}`);
  return `${lines.join("\n")}\n`;
}

export const estimateRow = (row: Row, accuracy?: number): Promise<Estimate> =>
  estimate(readDesign(designText(row), accuracy === undefined ? {} : { accuracy }));

export const flatLayers = (
  layers: readonly { readonly width: number; readonly height: number; readonly mass?: number }[],
) =>
  `{ shape: layers, layers: [ ${layers
    .map(
      ({ width, height, mass }) =>
        `{ width: ${width} nm, height: ${height} eV${mass === undefined ? "" : `, mass: ${mass} m_e`} }`,
    )
    .join(", ")} ] }`;

/** The bounds of both probabilities hold about an outside value of the transmission that is good to `referenceError`. */
export function expectBoundsHold(answer: Estimate, reference: number, referenceError = 0): void {
  const { transmission, reflection } = answer;
  const context = JSON.stringify({ reference, transmission, reflection });
  expect(Math.abs(transmission.value - reference), context).toBeLessThanOrEqual(
    transmission.error + referenceError,
  );
  // Two units in the last place for taking the reference from 1.
  expect(Math.abs(reflection.value - (1 - reference)), context).toBeLessThanOrEqual(
    reflection.error + referenceError + 2 * Number.EPSILON,
  );
}

/** The same, with the verdict and the accuracy asked for: what issue 2 demands of a design without numerics. */
export function expectTrusted(
  answer: Estimate,
  reference: number,
  { accuracy = 1e-6, referenceError = 0 } = {},
): void {
  expect(answer.checks.filter(({ passed }) => !passed)).toEqual([]);
  expect(answer.verdict).toBe("trusted");
  expectBoundsHold(answer, reference, referenceError);
  expect(Math.abs(answer.transmission.value - reference)).toBeLessThanOrEqual(
    accuracy * reference + referenceError,
  );
}

/** Wavenumber (1/nm) of kinetic energy E (eV) at mass m (eV fs^2/nm^2). */
export const wavenumber = (energy: number, mass: number) => Math.sqrt(2 * mass * energy) / HBAR;

/** Standard deviations of k (1/(2 sigma)) to either side over which a packet is averaged: exp(-16^2/2) = 3e-56 is left out. */
const REACH = 16;
/** Panels of the first of two quadratures, and the most; a resonance narrower than a panel's nodes shows as disagreement. */
const FIRST_PANELS = 60;
const MOST_PANELS = 10_000;
/** Relative agreement of the last two: round-off of phases and exponents of up to a hundred. */
const AGREEMENT = 2e-13;

/**
 * integral |phi(k)|^2 T(E_k) dk like `packetMean` of closed-forms.ts, but over 16 instead of 9 standard deviations, so that it holds where the tail of
 * the packet carries everything, and with panels doubled until two results agree, so that it holds across sharp
 * resonances. Nothing passes below `threshold` (eV, kinetic), where T may start like a root.
 */
export function packetAverage(
  transmission: Transmission,
  energy: number,
  massInElectrons: number,
  sigma: number,
  threshold = 0,
): number {
  const mass = massInElectrons * ELECTRON_MASS;
  const k0 = wavenumber(energy, mass);
  const integrand = (k: number) => {
    const kinetic = (HBAR * k) ** 2 / (2 * mass);
    const weight = Math.sqrt(2 / Math.PI) * sigma * Math.exp(-2 * (sigma * (k - k0)) ** 2);
    // Rounding may carry the outermost nodes of the rule to the threshold itself, where T is 0.
    return kinetic > threshold ? weight * transmission(kinetic, mass) : 0;
  };
  const low = Math.max(wavenumber(threshold, mass), k0 - REACH / (2 * sigma));
  const high = k0 + REACH / (2 * sigma);
  const over = (panels: number) => {
    const edge = (p: number) => low + ((high - low) * p) / panels;
    let sum = 0;
    for (let p = 0; p < panels; p++) sum += tanhSinh(integrand, edge(p), edge(p + 1));
    return sum;
  };
  let last = over(FIRST_PANELS);
  for (let panels = 2 * FIRST_PANELS; panels <= MOST_PANELS; panels *= 2) {
    const next = over(panels);
    if (Math.abs(next - last) <= AGREEMENT * next) return next;
    last = next;
  }
  throw new Error(`the average over a packet does not settle: ${last} with ${MOST_PANELS} panels`);
}

/** Of a sharp step: T = 4 v1 v2 / (v1 + v2)^2, v = k/m (check-values.md, 2.2). */
export const sharpStep =
  (height: number): Transmission =>
  (energy, mass) => {
    const [left, right] = [wavenumber(energy, mass), wavenumber(energy - height, mass)];
    return (4 * left * right) / (left + right) ** 2;
  };

/** The same barrier for a packet from the right: T at equal total energy is that from the left (reciprocity). */
export const fromTheRight =
  (transmission: Transmission, levelRight: number): Transmission =>
  (kinetic, mass) =>
    transmission(kinetic + levelRight, mass);
