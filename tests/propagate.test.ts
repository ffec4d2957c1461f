import { describe, expect, it } from "vitest";
import { propagate } from "../src/propagate.js";
import type { Stepper } from "../src/steppers/stepper.js";

/** A stepper that counts: psi holds the number of steps, and the times that it was called with are kept. */
function counting(pause = 0): { stepper: Stepper; times: number[] } {
  const times: number[] = [];
  const stepper = {
    timeStep: 0.5,
    advance(psi: Float64Array, time: number) {
      psi[0]++;
      times.push(time);
      for (const until = performance.now() + pause; performance.now() < until; );
    },
  } as unknown as Stepper;
  return { stepper, times };
}

describe("the time loop", () => {
  it("advances step by step and shows the state at the start, every so often and at the end, once each", async () => {
    const { stepper, times } = counting();
    const psi = new Float64Array(2);
    const seen: [number, number][] = [];
    const ends: number[] = [];
    await propagate({ stepper, psi, steps: 10 }, [
      { every: 4, record: (time, state) => seen.push([time, state[0]]) },
      { every: 5, record: (time) => ends.push(time) },
    ]);
    expect(times).toEqual([0, 0.5, 1, 1.5, 2, 2.5, 3, 3.5, 4, 4.5]);
    expect(seen).toEqual([
      [0, 0],
      [2, 4],
      [4, 8],
      [5, 10],
    ]);
    expect(ends).toEqual([0, 2.5, 5]);
  });

  it("takes no step when the signal has already been given", async () => {
    const { stepper, times } = counting();
    const signal = AbortSignal.abort(new Error("not now"));
    await expect(propagate({ stepper, psi: new Float64Array(2), steps: 3 }, [], { signal })).rejects.toThrow(
      "not now",
    );
    expect(times).toEqual([]);
  });

  it("stops soon after the signal with its reason, and says how far it is until then", async () => {
    const { stepper, times } = counting(1);
    const controller = new AbortController();
    setTimeout(() => controller.abort(new Error("enough")), 60);
    const shares: number[] = [];
    const run = propagate({ stepper, psi: new Float64Array(2), steps: 100000 }, [], {
      signal: controller.signal,
      onProgress: (done, total) => shares.push(done / total),
    });
    await expect(run).rejects.toThrow("enough");
    expect(times.length).toBeLessThan(5000);
    expect(shares.length).toBeGreaterThan(0);
    expect(shares[0]).toBeGreaterThan(0);
  });

  it("passes a fault of a recorder on", async () => {
    const { stepper } = counting();
    const record = () => {
      throw new Error("disk full");
    };
    await expect(
      propagate({ stepper, psi: new Float64Array(2), steps: 1 }, [{ every: 1, record }]),
    ).rejects.toThrow("disk full");
  });
});
