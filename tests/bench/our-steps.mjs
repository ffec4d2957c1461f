/**
 * The built package's steps, timed here on request, in plain Node as users run it: under a loader that translates
 * TypeScript the FFT library ran a quarter slower. Plain JavaScript for that reason.
 *
 * First line of stdout: JSON with x (nm), potential (eV), hbar (eV fs), mass (eV fs^2/nm^2), timeStep (fs), psi (re, im, ...).
 * Then one line a request on stdin, "cn COUNT" or "fft COUNT": advances that state and answers with JSON: seconds and mean position.
 */
import { createInterface } from "node:readline";
import { periodicGrid, uniformClosedGrid } from "../../dist/grid/grid.js";
import { rectangular } from "../../dist/potentials/rectangular.js";
import { crankNicolson } from "../../dist/steppers/crank-nicolson.js";
import { splitOperator } from "../../dist/steppers/split-operator.js";
import { ELECTRON_MASS, HBAR } from "../../dist/units/constants.js";

/** What stands on the grid: the first example's order of size, in nm, eV, fs. */
const STEP_NM = 0.15;
const TIME_STEP_FS = 0.05;
const BARRIER = { height: 0.3, width: 5 };
const PACKET = { energy: 0.15, width: 10, start: -100 };

const points = Number(process.argv[2]);
const particleMass = 0.067 * ELECTRON_MASS;
const potential = rectangular.build(BARRIER, particleMass);
const first = (-points / 2) * STEP_NM;
const closed = uniformClosedGrid(first, STEP_NM, points);
const periodic = periodicGrid(first, STEP_NM, points);
const steppers = {
  cn: crankNicolson.prepare({ grid: closed, potential, particleMass }, TIME_STEP_FS, 2),
  fft: splitOperator.prepare({ grid: periodic, potential, particleMass }, TIME_STEP_FS, 2),
};
const k0 = Math.sqrt(2 * particleMass * PACKET.energy) / HBAR;
const psi = new Float64Array(2 * points);
closed.x.forEach((x, j) => {
  const amplitude = Math.exp(-(((x - PACKET.start) / (2 * PACKET.width)) ** 2));
  psi[2 * j] = amplitude * Math.cos(k0 * x);
  psi[2 * j + 1] = amplitude * Math.sin(k0 * x);
});
const states = { cn: psi.slice(), fft: psi.slice() };

const say = (answer) => process.stdout.write(`${JSON.stringify(answer)}\n`);
say({
  x: Array.from(closed.x),
  potential: { cn: Array.from(steppers.cn.potentialOnGrid), fft: Array.from(steppers.fft.potentialOnGrid) },
  hbar: HBAR,
  mass: particleMass,
  timeStep: TIME_STEP_FS,
  psi: Array.from(psi),
});

for await (const line of createInterface({ input: process.stdin })) {
  const [kind, count] = line.split(" ");
  const state = states[kind];
  const begin = performance.now();
  for (let i = 0; i < Number(count); i++) steppers[kind].advance(state, 0);
  const seconds = (performance.now() - begin) / 1000;
  let moment = 0;
  let norm = 0;
  closed.x.forEach((x, j) => {
    const density = state[2 * j] ** 2 + state[2 * j + 1] ** 2;
    moment += density * x;
    norm += density;
  });
  say({ seconds, meanNm: moment / norm });
}
