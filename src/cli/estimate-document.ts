import type { Estimate } from "../studies/estimate.js";
import { version } from "./version.js";

/** The JSON document of `postern estimate`: the keys that the contract names first, then what else is known. */
export function estimateDocument(answer: Estimate) {
  const { design, transmission, reflection, remaining, normDrift, stepper, grid, time } = answer;
  return {
    design: { title: design.title, sha256: design.sha256 },
    transmission,
    reflection,
    remaining,
    norm: { drift: normDrift },
    stepper,
    grid,
    time,
    checks: answer.checks,
    verdict: answer.verdict,
    accuracy: answer.accuracy,
    order: answer.order,
    meanEnergy_eV: answer.meanEnergy,
    atMeanEnergy: answer.atMeanEnergy,
    carryingEnergy_eV: answer.carryingEnergy,
    backward: answer.backward,
    parts: answer.parts,
    runs: answer.runs,
    notes: answer.notes,
    version: version(),
  };
}
