import { circleGrid, refined } from "../grid/circle.js";
import type { Design } from "../problem/design.js";
import { splitOperator } from "../steppers/split-operator.js";
import { splittingOfOrder } from "../steppers/splittings.js";
import type { RunSummary, StudyOptions } from "./calculation.js";
import type { CirclePlan } from "./circle-plan.js";
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
    const stages = splittingOfOrder(this.plan.order)?.a.length ?? 1;
    return this.done.has(`${s} ${t}`) ? 0 : 2 * stages * this.steps(t) * this.plan.circle.points * 2 ** s;
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
    options.onProgress?.(`split operator, ${circle.points} points, ${this.steps(t)} steps`);
    const system = {
      grid: circleGrid(circle),
      potential: design.potential,
      particleMass: design.particleMass,
    };
    this.work += this.cost(s, t);
    const stepper = splitOperator.prepare(system, plan.timeStep / 2 ** t, plan.order);
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
