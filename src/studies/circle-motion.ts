import { circleGrid, refined } from "../grid/circle.js";
import type { Grid } from "../grid/grid.js";
import { trigonometricValues } from "../numerics/trigonometric.js";
import { hasPoint } from "../potentials/points.js";
import type { Design } from "../problem/design.js";
import { splitOperator } from "../steppers/split-operator.js";
import type { StudyOptions } from "./calculation.js";
import { BRING_CLOSER, refuseTooLarge } from "./limits.js";
import type { MatchedPlan } from "./matched-plan.js";
import { type MatchedRun, matchedRun } from "./matched-run.js";
import { columnOf, distance, largestDifference, largestOf, type Motion, perColumn } from "./motion.js";

/** Error of the state that is aimed at where V is smooth: a fifth of what a crosscheck has to reach. */
const GOAL = 2e-7;
/** Halvings of the first circle's spacing to begin with: where V is sharp against the packet that circle is finer than need be. */
const COARSEST = -1;
/** Halvings of the time step, and of the spacing, after which no more is asked for. */
const MOST_HALVINGS = 4;
/** Halvings of the first time step where V has jumps: with the spacing halved once, a kinetic phase of pi takes two, and its twin stands there. */
const JUMP_HALVINGS = 3;
/** Shares of the last change that a refinement leaves. */
interface Shares {
  readonly timeStep: number;
  readonly spacing: number;
}
/** What a grid leaves that a finer one has only confirmed: the whole change, and some more for what the finer one leaves. */
const CONFIRMED_SHARE = 1.2;
/**
 * Shares of the last change that are left, with caution: order 6 leaves 1/63 of it and a spectral grid far less than the fifth. Where V has jumps, the time
 * step of order 2 leaves a third, and the grid an error that falls like h^2.5, as
 * the square root of the weight beyond the band (|psi_k| ~ k^-3), and with a point like h.
 */
const SMOOTH_SHARES: Shares = { timeStep: 0.06, spacing: 0.2 };
const JUMP_SHARES: Shares = { timeStep: 0.7, spacing: 0.5 };
const POINT_SHARES: Shares = { timeStep: 0.7, spacing: 1.5 };

/**
 * The matched motion by the split operator: order 6 on a spectral grid where V is smooth, refined in time and space until the twin runs with
 * half the steps and half the points agree; order 2 on the best circle that a kinetic phase of pi and some seconds allow where V has jumps.
 * The state is taken onto the nodes of `common` by its own Fourier series.
 */
export async function circleMotion(
  design: Design,
  plan: MatchedPlan,
  common: Grid,
  options: StudyOptions,
): Promise<Motion> {
  const at = runner(design, plan, common, options);
  const found = await (plan.jumps ? withJumps(design, at) : smooth(at, common));
  const { fine, coarser, slower, shares } = found;
  const apart = (other: OnNodes) => distance(common, fine.values, other.values);
  const { run } = fine;
  const change = (a: MatchedRun, b: MatchedRun, name: string) =>
    largestDifference(columnOf(a.series, name), columnOf(b.series, name));
  const drift = {
    norm: largestOf([run.series], "norm_drift"),
    energy: largestOf([run.series], "energy_drift"),
  };
  // A transform's rounding grows like the root of the number of them.
  const rounding = drift.norm + 10 * Number.EPSILON * Math.sqrt(run.steps);
  return {
    name: splitOperator.name,
    order: plan.circle.order,
    state: fine.values,
    error: {
      spacing: shares.spacing * apart(coarser),
      timeStep: shares.timeStep * apart(slower),
      rounding,
    },
    series: run.series,
    seriesErrors: perColumn(
      (name) =>
        shares.spacing * change(run, coarser.run, name) +
        shares.timeStep * change(run, slower.run, name) +
        rounding * largestOf([run.series], name),
    ),
    drift,
    grid: { points: run.psi.length / 2, step_nm: run.stepper.system.grid.finest },
    time: { step_fs: run.stepper.timeStep, end_fs: plan.end, steps: run.steps },
    method: `order ${plan.circle.order}, ${run.psi.length / 2} points, ${run.steps} steps, beside twins with half as many of either`,
  };
}

/** A run and what its error is measured by: one with another spacing, one with twice the time step. */
interface Refined {
  readonly fine: OnNodes;
  readonly coarser: OnNodes;
  readonly slower: OnNodes;
  readonly shares: Shares;
}

type Runner = (s: number, t: number) => Promise<OnNodes>;

/** Refines first the spacing, then the time step, each until what it leaves is within the goal. */
async function smooth(at: Runner, common: Grid): Promise<Refined> {
  const apart = async (a: OnNodes, b: Promise<OnNodes>) => distance(common, a.values, (await b).values);
  let s = COARSEST;
  let t = 0;
  // A grid that a finer one only confirms is good enough itself: then the whole change is counted.
  while (s < MOST_HALVINGS && (await apart(await at(s, t), at(s + 1, t))) > GOAL) {
    s++;
    if (SMOOTH_SHARES.spacing * (await apart(await at(s, t), at(s - 1, t))) <= GOAL) break;
  }
  while (t < MOST_HALVINGS && SMOOTH_SHARES.timeStep * (await apart(await at(s, t), at(s, t - 1))) > GOAL)
    t++;
  const confirmed = s === COARSEST;
  return {
    fine: await at(s, t),
    coarser: await at(confirmed ? s + 1 : s - 1, t),
    slower: await at(s, t - 1),
    shares: confirmed ? { ...SMOOTH_SHARES, spacing: CONFIRMED_SHARE } : SMOOTH_SHARES,
  };
}

async function withJumps({ potential }: Design, at: Runner): Promise<Refined> {
  return {
    fine: await at(1, JUMP_HALVINGS),
    coarser: await at(0, JUMP_HALVINGS),
    slower: await at(1, JUMP_HALVINGS - 1),
    shares: hasPoint(potential) ? POINT_SHARES : JUMP_SHARES,
  };
}

interface OnNodes {
  readonly run: MatchedRun;
  readonly values: Float64Array;
}

/** Runs on the circle with s halvings of its spacing and t of its time step, each done once. */
function runner(design: Design, plan: MatchedPlan, common: Grid, options: StudyOptions): Runner {
  const done = new Map<string, OnNodes>();
  return async (s, t) => {
    const known = done.get(`${s} ${t}`);
    if (known) return known;
    const circle = refined(plan.circle.circle, s);
    const steps = Math.round(plan.circle.steps * 2 ** t);
    refuseTooLarge({ ...design, numerics: {} }, circle.points, steps, BRING_CLOSER);
    const system = {
      grid: circleGrid(circle),
      potential: design.potential,
      particleMass: design.particleMass,
    };
    const stepper = splitOperator.prepare(system, plan.end / steps, plan.circle.order);
    const text = `matched run, split operator, ${circle.points} points, ${steps} steps`;
    const run = await matchedRun(stepper, plan, steps, text, options);
    const result = { run, values: trigonometricValues(run.psi, circle.first, circle.step, common.x) };
    done.set(`${s} ${t}`, result);
    return result;
  };
}
