import type { Crosscheck } from "../studies/crosscheck.js";
import { columnOf } from "../studies/motion.js";
import { version } from "./version.js";

/** The JSON document of `postern crosscheck`: the keys that the contract names first, then what else is known. */
export function crosscheckDocument(answer: Crosscheck) {
  const { design, steppers, witness, difference, matched } = answer;
  return {
    design: { title: design.title, sha256: design.sha256 },
    steppers: steppers.map((each) => ({
      name: each.stepper,
      order: each.order,
      transmission: each.transmission,
      reflection: each.reflection,
      norm: { drift: each.normDrift },
      grid: each.grid,
      time: each.time,
      verdict: each.verdict,
      accuracy: each.accuracy,
    })),
    witness,
    difference,
    agree: answer.agree,
    ...(answer.firstDisagreement === undefined ? {} : { firstDisagreement: answer.firstDisagreement }),
    refused: answer.refused,
    matched: {
      end_fs: matched.end_fs,
      instants: matched.instants,
      runs: matched.motions.map((motion) => ({
        name: motion.name,
        order: motion.order,
        method: motion.method,
        grid: motion.grid,
        time: motion.time,
        norm: { drift: motion.drift.norm },
        energy_drift_eV: motion.drift.energy,
        state_error: motion.error,
        end: {
          transmission: last(columnOf(motion.series, "transmission")),
          reflection: last(columnOf(motion.series, "reflection")),
          x_mean_nm: last(columnOf(motion.series, "x_mean")),
          k_mean_per_nm: last(columnOf(motion.series, "k_mean")),
          energy_eV: last(columnOf(motion.series, "energy")),
        },
      })),
      composed: { name: witness.name, ...matched.composed },
      states: matched.states,
    },
    orders: answer.orders.map(({ declared, ...order }) => ({ ...order, declared: declared ?? "spectral" })),
    checks: answer.checks,
    accuracy: answer.accuracy,
    notes: answer.notes,
    version: version(),
  };
}

const last = (values: Float64Array): number => values[values.length - 1];
