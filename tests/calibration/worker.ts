import { drawDesign } from "./draw-design.js";
import { measure } from "./measure.js";
import type { WorkerTask } from "./workers.js";

// A signal to the whole group lets the design at hand be finished; the parent hangs up afterwards.
process.on("SIGINT", () => undefined);

process.on("message", async ({ seed, index, only, options }: WorkerTask) => {
  process.send?.(await measure(drawDesign(seed, index, only), options));
});
