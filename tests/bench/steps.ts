import { fileURLToPath } from "node:url";
import { type PythonVersions, startPython } from "./python.js";
import { type Comparison, type Contestant, compare } from "./rounds.js";
import { StepServer } from "./step-server.js";

/** Nodes of the grid. */
export const POINTS = 4096;
/** Steps in one turn: some ms, far above the clock's grain, short beside the time slices of a busy machine. */
const COUNT = 100;
/** Both sides do the same arithmetic in another order; after some 4000 steps their means still agree to this, in nm. */
const SAME_NM = 1e-7;

export interface StepRow {
  readonly kind: "cn" | "fft";
  readonly comparison: Comparison;
  /** Distance between the two mean positions at the end, nm. */
  readonly apartNm: number;
}

/** One side of the comparison, which remembers where its packet was last. */
function contestant(name: string, server: StepServer<unknown>, kind: StepRow["kind"]) {
  const side: Contestant & { meanNm: number } = {
    name,
    meanNm: Number.NaN,
    async step(count) {
      const { seconds, meanNm } = await server.advance(kind, count);
      side.meanNm = meanNm;
      return seconds;
    },
  };
  return side;
}

/**
 * Steps of both kinds against those of NumPy and SciPy, which propagate the same packet, each side in a process of its
 * own; throws when they do not end in the same place, because then they did not do the same work.
 */
export async function compareSteps(): Promise<{ rows: StepRow[]; python: PythonVersions } | undefined> {
  const script = fileURLToPath(new URL("our-steps.mjs", import.meta.url));
  const ours = await StepServer.start<object>(process.execPath, [script, String(POINTS)]);
  const python = await startPython(ours.greeting);
  const rows: StepRow[] = [];
  for (const kind of python ? (["cn", "fft"] as const) : []) {
    const mine = contestant("postern", ours, kind);
    const theirs = contestant("Python", python as StepServer<unknown>, kind);
    const comparison = await compare(mine, theirs, COUNT);
    const apartNm = Math.abs(mine.meanNm - theirs.meanNm);
    if (!(apartNm < SAME_NM))
      throw new Error(`${kind}: the two sides end ${apartNm} nm apart, so they did not do the same steps`);
    rows.push({ kind, comparison, apartNm });
  }
  ours.stop();
  python?.stop();
  return python && { rows, python: python.greeting };
}
