import { circleGrid, refined } from "../grid/circle.js";
import type { Design } from "../problem/design.js";
import type { RunSummary, StudyOptions } from "./calculation.js";
import { type CirclePlan, pairsPerStep } from "./circle-plan.js";
import { type Outcome, runToEnd } from "./outcome.js";

/** Whole calculations on circles refined s times in space and t times in time, each done once. */
export class Calculations {
  private readonly done = new Map<string, Outcome>();
  /** Points times transforms spent so far. */
  work = 0;

  constructor(
    private readonly design: Design,
    private readonly plan: CirclePlan,
    private readonly options: StudyOptions,
  ) {}

  cost(s: number, t: number): number {
    return this.done.has(`${s} ${t}`) ? 0 : 2 * this.pairs(s, t) * this.plan.circle.points * 2 ** s;
  }

  /** Pairs of transforms of a whole calculation. */
  pairs(s: number, t: number): number {
    const { plan, design } = this;
    const step = refined(plan.circle, s).step;
    return this.steps(t) * pairsPerStep(plan.order, design, step, plan.timeStep / 2 ** t);
  }

  steps(t: number): number {
    return Math.max(1, Math.round(this.plan.end / this.plan.timeStep)) * 2 ** t;
  }

  async at(s: number, t: number): Promise<Outcome> {
    const key = `${s} ${t}`;
    const known = this.done.get(key);
    if (known) return known;
    const { plan, design, options } = this;
    const circle = refined(plan.circle, s);
    options.onProgress?.(`${plan.definition.name}, ${circle.points} points, ${this.steps(t)} steps`);
    const system = {
      grid: circleGrid(circle),
      potential: design.potential,
      particleMass: design.particleMass,
    };
    this.work += this.cost(s, t);
    const order = plan.order === "exact" ? undefined : plan.order;
    const stepper = plan.definition.prepare(system, plan.timeStep / 2 ** t, order);
    const outcome = await runToEnd(stepper, plan.from, this.steps(t), undefined, options);
    this.done.set(key, outcome);
    return outcome;
  }

  list(): RunSummary[] {
    return [...this.done].map(([key, outcome]) => {
      const [s, t] = key.split(" ").map(Number);
      const circle = refined(this.plan.circle, s);
      return {
        points: circle.points,
        step_nm: circle.step,
        timeStep_fs: this.plan.timeStep / 2 ** t,
        transmission: outcome.transmitted,
      };
    });
  }

  drift(): number {
    return Math.max(...[...this.done.values()].map((outcome) => outcome.drift));
  }
}
