import { describe, expect, it } from "vitest";
import { uniformClosedGrid } from "../../src/grid/grid.js";
import { rectangular } from "../../src/potentials/rectangular.js";
import { crankNicolson } from "../../src/steppers/crank-nicolson.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { packetOn, probability } from "./samples.js";

/*
 * Crank-Nicolson is a function of the discrete H alone, so the probability that ends up beyond the barrier is that of
 * the lattice at any time step. The lattice's own T(k) has a closed form; nothing in the method is left to a tolerance.
 */

const MASS = 0.067 * ELECTRON_MASS;
const KINETIC = (HBAR * HBAR) / (2 * MASS);
const HEIGHT = 0.3;
const WIDTH = 5;
const SIGMA = 10;
const START = -150;
const K0 = Math.sqrt(0.2 / KINETIC);
/** Box of 2048 nm and 500 fs: after that 6e-18 of the packet is left between the interfaces, and nothing has met an end. */
const LENGTH = 2048;
const END = 500;

/**
 * T_lat = 1 / (1 + ((cos kh - cos qh) / (sin kh sin qh))^2 sin^2(n qh)), cos qh = cos kh + V0 / 2 tau, tau = hbar^2 / 2 m h^2,
 * for n sites of height V0; for cos qh > 1 q is imaginary and the sines become hyperbolic.
 */
function latticeTransmission(k: number, h: number, sites: number): number {
  const tau = KINETIC / (h * h);
  const cosK = Math.cos(k * h);
  const cosQ = cosK + HEIGHT / (2 * tau);
  const imaginary = cosQ > 1;
  const q = imaginary ? Math.acosh(cosQ) : Math.acos(cosQ);
  const [across, one] = imaginary ? [Math.sinh(sites * q), Math.sinh(q)] : [Math.sin(sites * q), Math.sin(q)];
  return 1 / (1 + (((cosK - cosQ) / (Math.sin(k * h) * one)) * across) ** 2);
}

/** integral |phi|^2 T_lat dk by the trapezoidal rule, which converges geometrically for a smooth integrand that dies away at both ends. */
function packetAverage(h: number): number {
  const sites = Math.round(WIDTH / h);
  const points = 4000;
  const reach = Math.min(9 / (2 * SIGMA), K0 * 0.999);
  let sum = 0;
  let weight = 0;
  for (let i = 0; i <= points; i++) {
    const k = K0 + reach * ((2 * i) / points - 1);
    const w = Math.exp(-2 * (SIGMA * (k - K0)) ** 2);
    weight += w;
    sum += w * latticeTransmission(k, h, sites);
  }
  return sum / weight;
}

/** Transmitted share of the norm by the stepper; sites stand in the middle of their cells, so the barrier is `sites` whole cells. */
function transmitted(h: number, order: number, timeStep: number, referenceEnergy?: number): number {
  const n = LENGTH / h;
  const grid = uniformClosedGrid(-LENGTH / 2 + h / 2, h, n);
  const potential = rectangular.build({ height: HEIGHT, width: WIDTH }, MASS);
  const stepper = crankNicolson.prepare(
    { grid, potential, particleMass: MASS, referenceEnergy },
    timeStep,
    order,
  );
  const psi = packetOn(grid, START, SIGMA, K0);
  for (let step = 0; step < END / timeStep; step++) stepper.advance(psi, step * timeStep);
  return probability(grid, psi, (x) => x > WIDTH / 2) / probability(grid, psi);
}

/** Round-off of up to 2000 steps; measured: below 1e-13. */
const RELATIVE = 1e-12;

describe("Crank-Nicolson on a uniform lattice", () => {
  it.each([
    [0.5, 0.0591527454684004],
    [0.25, 0.0607402359560315],
    [0.125, 0.0611471204596316],
  ])(
    "expects, for a spacing of %s nm, the mean %s of the lattice's closed form (computed for this project with 40 digits)",
    (h, value) => {
      expect(Math.abs(packetAverage(h) / value - 1)).toBeLessThan(1e-13);
    },
  );

  it.each([
    [0.3, 3.0705452904631e-3],
    [0.593, 5.20570267874206e-2],
    [0.9, 0.932930257532076],
    [1.2, 0.94706528994699],
  ])(
    "uses a closed form that gives T(k = %s / nm) = %s (transfer matrix of the lattice, derived here; cf. Economou, Green's Functions in Quantum Physics, citation from memory)",
    (k, value) => {
      expect(Math.abs(latticeTransmission(k, 0.25, 20) / value - 1)).toBeLessThan(1e-13);
    },
  );

  it.each([
    { h: 0.25, order: 2, timeStep: 0.25 },
    { h: 0.25, order: 2, timeStep: 1 },
    { h: 0.25, order: 2, timeStep: 2 },
    { h: 0.25, order: 2, timeStep: 4 },
    { h: 0.5, order: 2, timeStep: 2 },
    { h: 0.125, order: 2, timeStep: 2 },
    { h: 0.25, order: 2, timeStep: 4, referenceEnergy: 0.2 },
    { h: 0.25, order: 4, timeStep: 0.5 },
    { h: 0.25, order: 4, timeStep: 2 },
    { h: 0.25, order: 4, timeStep: 4, referenceEnergy: 0.2 },
    { h: 0.25, order: 6, timeStep: 0.5 },
    { h: 0.25, order: 6, timeStep: 2 },
    { h: 0.25, order: 6, timeStep: 4, referenceEnergy: 0.2 },
  ])(
    "transmits what the lattice's closed form says at any time step and order: $h nm, order $order, $timeStep fs, reference $referenceEnergy eV (invariance principle: Birman, Kato; Reed and Simon III, citation from memory)",
    ({ h, order, timeStep, referenceEnergy }) => {
      const expected = packetAverage(h);
      const found = transmitted(h, order, timeStep, referenceEnergy);
      expect(Math.abs(found / expected - 1)).toBeLessThan(RELATIVE);
    },
  );
});
