import type { Recorder } from "./analysis/recorder.js";
import type { Stepper } from "./steppers/stepper.js";

/** A calculation that is ready to go: the stepper, the state at t = 0 (changed in place), and how far to go. */
export interface Run {
  readonly stepper: Stepper;
  /** Interleaved complex state, 1/sqrt(nm). */
  readonly psi: Float64Array;
  readonly steps: number;
}

export interface PropagateOptions {
  /** Stops the loop by throwing the signal's reason. */
  readonly signal?: AbortSignal;
  /** Called now and then with the steps done and to be done. */
  readonly onProgress?: (done: number, total: number) => void;
}

/** Wall time (ms) between two returns to the event loop: signals and progress are seen that often. */
const BREATH_MS = 40;

/**
 * The only time loop: advances `run.psi` by `run.steps` steps and shows it to the recorders on the way.
 * @returns when done; rejects with the signal's reason when stopped. Cost: steps times that of the stepper.
 */
export async function propagate(
  run: Run,
  recorders: readonly Recorder[] = [],
  options: PropagateOptions = {},
): Promise<void> {
  const { stepper, psi, steps } = run;
  const dt = stepper.timeStep;
  options.signal?.throwIfAborted();
  for (const recorder of recorders) recorder.record(0, psi);
  let lastBreath = performance.now();
  for (let step = 1; step <= steps; step++) {
    stepper.advance(psi, (step - 1) * dt);
    for (const recorder of recorders)
      if (step % recorder.every === 0 || step === steps) recorder.record(step * dt, psi);
    if (performance.now() - lastBreath > BREATH_MS) {
      options.onProgress?.(step, steps);
      await new Promise((resolve) => setTimeout(resolve));
      options.signal?.throwIfAborted();
      lastBreath = performance.now();
    }
  }
}
