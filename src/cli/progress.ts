import type { SingleBar } from "cli-progress";
import type { Progress } from "../studies/calculation.js";

/** A job that ends sooner shows nothing, ms. */
const PATIENCE_MS = 2000;

/** Progress on a terminal. */
export interface ProgressLine {
  readonly onProgress: Progress;
  /** Takes the line away; nothing is shown afterwards. */
  stop(): void;
}

/** One updated line on standard error, for jobs that take a while; nothing where standard error is no terminal. */
export function progressLine(): ProgressLine {
  if (!process.stderr.isTTY) return { onProgress: () => {}, stop: () => {} };
  const started = performance.now();
  let bar: SingleBar | undefined;
  let asked = false;
  let stopped = false;
  const begin = async () => {
    const { SingleBar } = await import("cli-progress");
    if (stopped) return;
    bar = new SingleBar({
      format: "{bar} {percentage} %  {text}",
      stream: process.stderr,
      barsize: 30,
      hideCursor: true,
      clearOnComplete: true,
    });
    bar.start(1, 0, { text: "" });
  };
  return {
    onProgress(text, share) {
      if (performance.now() - started < PATIENCE_MS) return;
      if (!asked) {
        asked = true;
        void begin();
      }
      bar?.update(share ?? 0, { text });
    },
    stop() {
      stopped = true;
      bar?.stop();
    },
  };
}
