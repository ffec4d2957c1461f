import { parentPort, workerData } from "node:worker_threads";
import { drawDesign } from "./draw-design.js";
import { measure } from "./measure.js";
import type { WorkerTask } from "./workers.js";

const task = workerData as WorkerTask;

parentPort?.on("message", async (index: number) => {
  parentPort?.postMessage(await measure(drawDesign(task.seed, index, task.only), task));
});
