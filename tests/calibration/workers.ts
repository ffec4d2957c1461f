import { Worker } from "node:worker_threads";
import { drawDesign } from "./draw-design.js";
import type { Family } from "./drawn-design.js";
import type { MeasureOptions } from "./measure.js";
import type { Row } from "./row.js";

export interface WorkerTask extends MeasureOptions {
  readonly seed: number;
  readonly only?: Family;
}

/** Measures designs in threads, each taking the next one when it is free. A thread that dies counts as a crash of its design and is replaced. */
export async function measureInWorkers(
  indices: readonly number[],
  options: WorkerTask & { readonly workers: number },
  progress: (done: number) => void,
): Promise<Row[]> {
  const { seed, only, study, patience } = options;
  const rows: Row[] = [];
  const waiting = [...indices];
  const lane = async () => {
    let worker: Worker | undefined;
    for (let index = waiting.shift(); index !== undefined; index = waiting.shift()) {
      worker ??= new Worker(new URL("./worker.ts", import.meta.url), {
        workerData: { seed, only, study, patience },
        execArgv: ["--import", "tsx"],
      });
      const current = worker;
      try {
        rows.push(await answer(current, index));
      } catch (cause) {
        const { family, theme, text } = drawDesign(seed, index, only);
        rows.push({ index, family, theme, text, outcome: "crashed", message: String(cause) });
        await current.terminate();
        worker = undefined;
      }
      progress(rows.length);
    }
    await worker?.terminate();
  };
  await Promise.all(Array.from({ length: options.workers }, lane));
  return rows.sort((a, b) => a.index - b.index);
}

function answer(worker: Worker, index: number): Promise<Row> {
  return new Promise((resolve, reject) => {
    const done = () => {
      worker.off("message", onMessage);
      worker.off("error", onEnd);
      worker.off("exit", onEnd);
    };
    const onMessage = (row: Row) => {
      done();
      resolve(row);
    };
    const onEnd = (cause: unknown) => {
      done();
      reject(cause instanceof Error ? cause : new Error(`the thread ended with code ${String(cause)}`));
    };
    worker.on("message", onMessage);
    worker.on("error", onEnd);
    worker.on("exit", onEnd);
    worker.postMessage(index);
  });
}
