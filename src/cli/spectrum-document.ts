import type { Spectrum } from "../studies/spectrum.js";
import { version } from "./version.js";

/** The JSON document of `postern spectrum`: the rows that the contract names, then what else is known. */
export function spectrumDocument(answer: Spectrum) {
  const { design, rows, resonances, packets } = answer;
  return {
    design: { title: design.title, sha256: design.sha256 },
    method: answer.method,
    rows: rows.map(({ energy, transmission, reflection }) => ({
      energy_eV: energy,
      transmission: transmission.value,
      error: transmission.error,
      reflection: reflection.value,
      reflectionError: reflection.error,
    })),
    resonances: resonances.map(({ energy, width }) => ({ energy_eV: energy, width_eV: width })),
    checks: answer.checks,
    verdict: answer.verdict,
    accuracy: answer.accuracy,
    floor: answer.floor,
    packets: packets.map(({ energy, width, end_fs, ...rest }) => ({
      energy_eV: energy,
      width_nm: width,
      ...rest,
      end_fs,
    })),
    notes: answer.notes,
    version: version(),
  };
}
