import { alignedPoints } from "../grid/aligned.js";
import { ALONE, Extrapolation } from "../numerics/extrapolation.js";
import { kineticEnergy, wavenumberOf } from "../packets/gaussian.js";
import type { Design } from "../problem/design.js";
import type { Bounded } from "../units/bounded.js";
import type { StudyOptions } from "./calculation.js";
import { type ClosedPlan, extent, planClosed } from "./closed-plan.js";
import { amplitudeAtFace } from "./common-checks.js";
import { REFINEMENTS } from "./crank-nicolson-transmission.js";
import { type FaceRun, faceRun } from "./face-run.js";
import { POINTS_LIMIT } from "./limits.js";

/** T and R at one energy. */
export interface SpectrumPoint {
  /** Total energy, eV. */
  readonly energy: number;
  readonly transmission: Bounded;
  /** 1 - T: the discrete evolution keeps probability to round-off at every energy. */
  readonly reflection: Bounded;
}

/** One packet among those that a spectrum was read from. */
export interface SpectrumPacket {
  /** Mean kinetic energy, eV, and width, nm. */
  readonly energy: number;
  readonly width: number;
  readonly from: "left" | "right";
  /** Energies that it served. */
  readonly energies: number;
  readonly points: number;
  readonly step_nm: number;
  readonly end_fs: number;
  readonly steps: number;
  /** Whole calculations on refined grids. */
  readonly runs: number;
}

export interface PacketSpectrum {
  readonly rows: readonly SpectrumPoint[];
  readonly packets: readonly SpectrumPacket[];
  /** T below which round-off may hide it. */
  readonly floor: number;
}

/** |k - k0| up to which a packet serves, in spreads of k: its weight there is e^-12.5 of that in the middle. */
const SERVED_SPREADS = 5;
/** k0 over its spread in the packets tried first: wide in energy; their weight at k = 0 is e^-50 of that in the middle. */
const FIRST_PURITY = 10;
/** What does not settle (a slow resonance, or a deep energy beside a high one) is tried again with a packet narrower in k by this factor. */
const NARROWING = 2;
/** Length of the record relative to the packet's passage: half of it falls to zero. */
const RECORD_LENGTH = 1.8;
/** Shares of the error asked for that the end and the spacing may take. */
const UNFINISHED_SHARE = 0.1;
/** Below this an amplitude that a narrower packet does not lower is rounding; so much of rounding is seen in units of eps times the root of the steps. */
const STALLED_BELOW = 1e-8;
const ROUNDING_SEEN = 300;
const SPACING_SHARE = 0.7;
const FEWEST_CALCULATIONS = 5;
/** Share of the accuracy asked for below which no bound of the spacing is told: small changes can be small by accident. */
const LEAST_BOUND = 0.01;
/** Further caution with the bound of a single energy, which has no parts to be held against: its errors are far below what is asked for anyway. */
const FURTHER_CAUTION = 2;
/** Work (nodes times steps) of one calculation, and of all of them, beyond which nothing is refined or tried again. */
const RUN_LIMIT = 2e8;
const TOTAL_LIMIT = 1.5e9;
/** Start of a packet, in its own widths from the structure: |psi| at the face is e^-56 of its peak, below what counts beside T = 1e-40. */
const CLEARANCE = 15;
/** e^-18, by which the taper of analysis/step-spectrum.ts keeps other energies' rounding noise out. */
const LEAKAGE = 1.6e-8;

/**
 * The curve T(E) from wavepackets: a packet serves all energies within five spreads of its own; a wide range takes a few. Energies whose record has
 * not settled go to packets narrower in k, which also wait longer, until all have, or the work would grow past all measure.
 * Each energy is extrapolated to vanishing spacing in 1/T, which is an entire function of energy and height and so has no
 * poles near a resonance to be extrapolated over.
 * @param energies total energies, eV, in any order; at or below the higher of the two levels nothing is transmitted
 * @param accuracy relative accuracy asked for
 * Source: method found for this project; the lattice's dispersion relation is check-values 2.11.
 */
export async function packetSpectrum(
  design: Design,
  energies: readonly number[],
  accuracy: number,
  options: StudyOptions,
): Promise<PacketSpectrum> {
  const { levelLeft, levelRight } = design.potential;
  const threshold = Math.max(levelLeft, levelRight);
  // The best reading of each energy so far: a narrower packet is no gain where only rounding is left.
  const best = energies.map((energy): Bounded => ({ value: 0, error: energy > threshold ? 1 : 0 }));
  // What the last pilot left unfinished at each energy: where a narrower packet left no less, only rounding is left.
  const seen = energies.map(() => Number.POSITIVE_INFINITY);
  const packets: SpectrumPacket[] = [];
  let open = energies.map((_, i) => i).filter((i) => energies[i] > threshold);
  let floor = 0;
  let spent = 0;
  for (let purity = FIRST_PURITY; open.length > 0; purity *= NARROWING) {
    const unsettled: number[] = [];
    const last = (plan: ClosedPlan): boolean =>
      spent > TOTAL_LIMIT || NARROWING * work(plan, REFINEMENTS[0]) > RUN_LIMIT;
    for (const group of grouped(open, energies, threshold, purity)) {
      const plan = planFor(design, group.k0, purity);
      const pilotWork = work(plan, REFINEMENTS[0]);
      if (alignedPoints(plan.stretches, 1) > POINTS_LIMIT || pilotWork > RUN_LIMIT) continue;
      options.onProgress?.(`spectrum, packet of ${plan.from.energy.toPrecision(4)} eV`);
      spent += pilotWork;
      const asked = group.members.map((i) => energies[i]);
      const pilot = await faceRun(plan, design, REFINEMENTS[0], asked, options);
      const keep = group.members
        .map((_, n) => n)
        .filter((n) => {
          const { unfinished } = pilot.at[n];
          const member = group.members[n];
          const stalled = unfinished < STALLED_BELOW && unfinished > 0.5 * seen[member];
          seen[member] = unfinished;
          return unfinished <= tolerated(UNFINISHED_SHARE * accuracy, plan) || stalled || last(plan);
        });
      unsettled.push(...group.members.filter((_, n) => !keep.includes(n)));
      if (keep.length === 0) continue;
      const read = await refined(
        plan,
        design,
        keep.map((n) => asked[n]),
        accuracy,
        options,
      );
      spent += read.work;
      keep.forEach((n, i) => {
        const member = group.members[n];
        if (read.transmission[i].error < best[member].error) best[member] = read.transmission[i];
        // A resonance moves with the spacing, and may turn out to ring longer on a finer grid than on the pilot's.
        if (!read.settled[i] && !last(plan)) unsettled.push(member);
      });
      floor = Math.max(floor, read.floor);
      packets.push({ ...read.packet, energies: keep.length });
    }
    open = unsettled;
  }
  return { rows: energies.map((energy, i) => point(energy, best[i])), packets, floor };
}

function point(energy: number, transmission: Bounded): SpectrumPoint {
  return { energy, transmission, reflection: { value: 1 - transmission.value, error: transmission.error } };
}

/** What the end may leave, relative: a share of what is asked for, or what nobody could tell from rounding. */
function tolerated(share: number, plan: ClosedPlan): number {
  return Math.max(share, ROUNDING_SEEN * Number.EPSILON * Math.sqrt(plan.steps));
}

interface Group {
  readonly k0: number;
  readonly members: readonly number[];
}

/** Groups energies so that one packet of that purity (k0 over its spread) serves each group, from the lowest up. */
function grouped(
  open: readonly number[],
  energies: readonly number[],
  threshold: number,
  purity: number,
): Group[] {
  const reach = SERVED_SPREADS / purity;
  const ratio = (1 + reach) / (1 - reach);
  const ascending = [...open].sort((a, b) => energies[a] - energies[b]);
  const groups: Group[] = [];
  for (let i = 0; i < ascending.length; ) {
    // k grows like the root of the energy above the level.
    const lowest = energies[ascending[i]] - threshold;
    const members = ascending.slice(i).filter((j) => energies[j] - threshold <= lowest * ratio * ratio);
    const highest = energies[members[members.length - 1]] - threshold;
    groups.push({ k0: 0.5 * (Math.sqrt(lowest) + Math.sqrt(highest)), members });
    i += members.length;
  }
  return groups;
}

/** The plan of a packet whose mean kinetic energy is `root`^2 (root in sqrt(eV)), from the side of the higher level: it sees no threshold beyond. */
function planFor(design: Design, root: number, purity: number): ClosedPlan {
  const { potential, particleMass } = design;
  const energy = root * root;
  const width = purity / (2 * wavenumberOf(energy, particleMass));
  const [faceLeft, faceRight] = potential.faces;
  const fromRight = potential.levelRight > potential.levelLeft;
  const packet = {
    energy,
    width,
    from: fromRight ? ("right" as const) : ("left" as const),
    start: fromRight ? faceRight + CLEARANCE * width : faceLeft - CLEARANCE * width,
  };
  const own = { ...design, packet, numerics: {} };
  return planClosed(own, RECORD_LENGTH * planClosed(own).end);
}

const work = (plan: ClosedPlan, refinement: number): number =>
  alignedPoints(plan.stretches, refinement) * plan.steps;

interface Reading {
  readonly transmission: readonly Bounded[];
  /** Whether what the end leaves fits into the accuracy asked for. */
  readonly settled: readonly boolean[];
  readonly floor: number;
  readonly work: number;
  readonly packet: Omit<SpectrumPacket, "energies">;
}

/** Refines until every energy's bound is met, and puts the bounds together. */
async function refined(
  plan: ClosedPlan,
  design: Design,
  energies: readonly number[],
  accuracy: number,
  options: StudyOptions,
): Promise<Reading> {
  const inverse = energies.map(() => new Extrapolation());
  const logarithm = energies.map(() => new Extrapolation());
  let spent = 0;
  let runs = 0;
  let run: FaceRun | undefined;
  let drift = 0;
  let spacing: number[] = [];
  for (const refinement of REFINEMENTS) {
    const cost = work(plan, refinement);
    if (run && (cost > RUN_LIMIT * 5 || alignedPoints(plan.stretches, refinement) > POINTS_LIMIT)) break;
    run = await faceRun(plan, design, refinement, energies, options);
    spent += cost;
    runs++;
    drift = Math.max(drift, run.drift);
    spacing = run.at.map(({ transmission: t }, i) => {
      const x = inverse[i].add(1 / refinement, 1 / t);
      const l = logarithm[i].add(1 / refinement, Math.log(t));
      // Relative: T = 1/x, held against a second extrapolation in ln T.
      const relative = Math.max(
        x.error / x.value,
        l.error,
        ALONE.factor * Math.abs(Math.exp(l.value) * x.value - 1),
        LEAST_BOUND * accuracy,
      );
      return relative >= 0 ? FURTHER_CAUTION * relative : Number.POSITIVE_INFINITY;
    });
    if (runs >= FEWEST_CALCULATIONS && spacing.every((s) => s <= SPACING_SHARE * accuracy)) break;
  }
  const { from, steps } = plan;
  const noise = Number.EPSILON * Math.sqrt(steps);
  let floor = 0;
  const transmission = energies.map((energy, i): Bounded => {
    const k = wavenumberOf(energy - from.near, from.mass);
    // Rounding is spread over all energies of the packet, of which this one may carry little.
    const faded = Math.exp(((k - from.k0) / (2 * from.spread)) ** 2);
    const leaked = (noise * LEAKAGE + amplitudeAtFace(from)) * faded;
    floor = Math.max(floor, leaked * leaked);
    const value = 1 / inverse[i].result.value;
    const unfinished = run?.at[i].unfinished ?? Number.POSITIVE_INFINITY;
    const grid = runs < FEWEST_CALCULATIONS ? Number.POSITIVE_INFINITY : spacing[i];
    const relative = grid + unfinished + 30 * (noise * faded + drift);
    return bounded(value, value * relative + leaked * (2 * Math.sqrt(Math.abs(value)) + leaked));
  });
  const { widest } = extent(plan, REFINEMENTS[runs - 1]);
  return {
    transmission,
    settled: energies.map(
      (_, i) => (run?.at[i].unfinished ?? 1) <= tolerated((1 - SPACING_SHARE) * accuracy, plan),
    ),
    floor,
    work: spent,
    packet: {
      energy: kineticEnergy(from.k0, from.mass),
      width: from.packet.width,
      from: from.direction > 0 ? "left" : "right",
      points: alignedPoints(plan.stretches, REFINEMENTS[runs - 1]),
      step_nm: widest,
      end_fs: plan.end,
      steps,
      runs,
    },
  };
}

/** The truth lies between 0 and 1: so does what is told of it. */
function bounded(value: number, error: number): Bounded {
  if (!Number.isFinite(value) || !Number.isFinite(error)) return { value: 0, error: 1 };
  const inside = Math.min(1, Math.max(0, value));
  return { value: inside, error: Math.min(1, error + 0) };
}
