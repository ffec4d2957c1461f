import { type ChildProcess, fork } from "node:child_process";
import { fileURLToPath } from "node:url";
import { drawDesign } from "./draw-design.js";
import type { Family } from "./drawn-design.js";
import type { MeasureOptions } from "./measure.js";
import type { Row } from "./row.js";

/** One design to be measured, as it is sent to a worker. */
export interface WorkerTask {
  readonly seed: number;
  readonly index: number;
  readonly only?: Family;
  readonly options: MeasureOptions;
}

/**
 * Measures designs in processes of their own, each taking the next one when it is free. One that dies counts as a crash of its design
 * and is replaced.
 */
export async function measureInWorkers(
  indices: readonly number[],
  {
    seed,
    only,
    study,
    patience,
    workers,
  }: Pick<WorkerTask, "seed" | "only"> & MeasureOptions & { readonly workers: number },
  take: (row: Row) => void,
  ending: AbortSignal,
): Promise<void> {
  const waiting = [...indices];
  const lane = async () => {
    let worker: ChildProcess | undefined;
    for (let index = waiting.shift(); index !== undefined && !ending.aborted; index = waiting.shift()) {
      if (worker?.connected !== true)
        worker = fork(fileURLToPath(new URL("./worker.ts", import.meta.url)), { serialization: "advanced" });
      try {
        take(await answer(worker, { seed, index, only, options: { study, patience } }));
      } catch (cause) {
        const { family, theme, text } = drawDesign(seed, index, only);
        take({ index, family, theme, text, outcome: "crashed", message: String(cause) });
        worker.kill();
        worker = undefined;
      }
    }
    worker?.disconnect();
  };
  await Promise.all(Array.from({ length: workers }, lane));
}

function answer(worker: ChildProcess, task: WorkerTask): Promise<Row> {
  return new Promise((resolve, reject) => {
    const onMessage = (row: unknown) => {
      worker.off("exit", onExit);
      resolve(row as Row);
    };
    const onExit = (code: number | null, signal: string | null) => {
      worker.off("message", onMessage);
      reject(new Error(`its process ended with ${signal ?? `code ${code}`}`));
    };
    worker.once("message", onMessage);
    worker.once("exit", onExit);
    worker.send(task);
  });
}
