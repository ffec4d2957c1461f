import { describe, expect, it } from "vitest";
import { FINEST_ACCURACY } from "../../src/design/fields.js";
import type { Design } from "../../src/problem/design.js";
import { scatter } from "../../src/stationary/scattering.js";
import { type PacketSpectrum, packetSpectrum } from "../../src/studies/packet-spectrum.js";
import { designOf, MASS, potentialOf } from "../grid/samples.js";
import { slabs, smoothStep } from "../potentials/closed-forms.js";

const PACKET = { energy: 0.15, width: 10 };
const rectangular = (width: number): Design =>
  designOf(potentialOf("rectangular", { height: 0.3, width }), PACKET);
const uphill = designOf(potentialOf("step", { height: 0.1, thickness: 0.5 }), PACKET);

/** Every row holds the witness within its bound; returns the bounds relative to the truth. */
function expectTrue({ potential }: Design, { rows }: PacketSpectrum): number[] {
  return rows.map(({ energy, transmission, reflection }) => {
    const truth = scatter(potential, MASS, energy);
    const context = JSON.stringify({ energy, transmission, truth: truth.transmission });
    expect(Math.abs(transmission.value - truth.transmission.value), context).toBeLessThanOrEqual(
      transmission.error + truth.transmission.error,
    );
    expect(Math.abs(reflection.value - truth.reflection.value), context).toBeLessThanOrEqual(
      reflection.error + truth.reflection.error,
    );
    return transmission.error / truth.transmission.value;
  });
}

const servings = ({ packets }: PacketSpectrum) => packets.reduce((sum, { energies }) => sum + energies, 0);

describe("energies at and below the higher level", () => {
  it("transmit nothing, exactly, and ask no packet for it", async () => {
    const { rows, packets, floor } = await packetSpectrum(uphill, [0.02, 0.1], 1e-6, {});
    for (const { transmission, reflection } of rows) {
      expect(transmission).toEqual({ value: 0, error: 0 });
      expect(reflection).toEqual({ value: 1, error: 0 });
    }
    expect(packets).toEqual([]);
    expect(floor).toBe(0);
  });

  it("do not disturb those above it, which are sent from the higher side", async () => {
    const all = await packetSpectrum(uphill, [0.02, 0.1, 0.15, 0.2], 1e-6, {});
    const above = await packetSpectrum(uphill, [0.15, 0.2], 1e-6, {});
    expect(all.rows.slice(2)).toEqual(above.rows);
    expect(all.packets).toEqual(above.packets);
    for (const { from } of above.packets) expect(from).toBe("right");
    for (const { energy, transmission } of above.rows) {
      const truth = smoothStep(0.1, 0.5)(energy, MASS);
      expect(Math.abs(transmission.value - truth)).toBeLessThanOrEqual(transmission.error);
    }
  });

  it("are counted from the level on the left where that is the higher one", async () => {
    const { rows, packets } = await packetSpectrum(
      designOf(potentialOf("step", { height: -0.1, thickness: 0.5 }), PACKET),
      [-0.05, 0, 0.05],
      1e-6,
      {},
    );
    expect(rows.map(({ transmission }) => transmission.value > 0)).toEqual([false, false, true]);
    for (const { from } of packets) expect(from).toBe("left");
  });
});

describe("the packets", () => {
  it("are several for a wide range, each serving what lies near its own energy, and all energies are served", async () => {
    const design = rectangular(3);
    const energies = [0.002, 0.004, 0.03, 0.1, 0.25, 0.9, 1.1];
    const answer = await packetSpectrum(design, energies, 1e-6, {});
    expect(answer.packets.length).toBeGreaterThan(2);
    expect(servings(answer)).toBeGreaterThanOrEqual(energies.length);
    expect(Math.max(...expectTrue(design, answer))).toBeLessThan(1e-6);
    for (const { energy, energies: served, runs, steps, points, step_nm, end_fs } of answer.packets) {
      // Energies from (1 - 1/2)^2 to (1 + 1/2)^2 of its own at most.
      const near = energies.filter((e) => e / energy > 0.2 && e / energy < 2.3);
      expect(served).toBeLessThanOrEqual(near.length);
      expect(runs).toBeGreaterThanOrEqual(5);
      for (const fact of [steps, points, step_nm, end_fs]) expect(fact).toBeGreaterThan(0);
    }
  });

  it("are one for close energies, which come back in the order that they were asked for", async () => {
    const design = rectangular(3);
    const answer = await packetSpectrum(design, [0.25, 0.15, 0.2], 1e-6, {});
    expect(answer.rows.map(({ energy }) => energy)).toEqual([0.25, 0.15, 0.2]);
    expect(answer.packets).toHaveLength(1);
    expect(answer.packets[0].energies).toBe(3);
    expectTrue(design, answer);
    const [low] = (await packetSpectrum(design, [0.15, 0.2, 0.25], 1e-6, {})).rows;
    expect(answer.rows[1]).toEqual(low);
  });

  it("grow narrower in k for what rings, and the best reading of each energy is kept", async () => {
    // A level of 3.6 ueV at 39.4 meV: the second energy lies beside it, the first well below.
    const walls = [
      { width: 7, height: 0.3 },
      { width: 9, height: 0 },
      { width: 7, height: 0.3 },
    ];
    const design = designOf(potentialOf("layers", { layers: walls }), PACKET);
    const answer = await packetSpectrum(design, [0.035, 0.0395], 1e-6, {});
    expect(answer.packets.length).toBeGreaterThan(1);
    const widths = answer.packets.map(({ width }) => width);
    expect(widths).toEqual([...widths].sort((a, b) => a - b));
    // One of the two was read more than once, and its bound is within what was asked for.
    expect(servings(answer)).toBeGreaterThan(2);
    expect(Math.max(...expectTrue(design, answer))).toBeLessThan(1e-6);
    answer.rows.forEach(({ energy, transmission }) => {
      const truth = slabs(walls)(energy, MASS);
      expect(Math.abs(transmission.value - truth)).toBeLessThanOrEqual(transmission.error + 1e-12 * truth);
    });
  });
});

describe("the accuracy", () => {
  it("asked for is reached where it can be, with more work for more of it", async () => {
    const design = rectangular(5);
    let runs = 0;
    for (const accuracy of [1e-4, 1e-8, 1e-11]) {
      const answer = await packetSpectrum(design, [0.1], accuracy, {});
      expect(expectTrue(design, answer)[0]).toBeLessThanOrEqual(accuracy);
      const total = answer.packets.reduce((sum, packet) => sum + packet.runs, 0);
      expect(total).toBeGreaterThan(runs - 1);
      runs = total;
    }
    expect(runs).toBeGreaterThan(5);
  });

  it("of 1e-13, the finest that a design may ask for and beyond what rounding leaves, ends in a larger bound that holds and is still small", async () => {
    const design = rectangular(5);
    const answer = await packetSpectrum(design, [0.1], FINEST_ACCURACY, {});
    const [relative] = expectTrue(design, answer);
    expect(relative).toBeGreaterThan(FINEST_ACCURACY);
    // 1e-11 is reached above with seven small runs.
    expect(relative).toBeLessThan(1e-8);
  });

  it("cannot be reached below the floor of rounding: the bound says it, and the floor is stated", async () => {
    const design = rectangular(75);
    const answer = await packetSpectrum(design, [0.05, 0.2], 1e-6, {});
    const [deep, shallow] = expectTrue(design, answer);
    expect(answer.rows[0].transmission.value).toBeLessThan(1e-40);
    expect(deep).toBeGreaterThan(1e-6);
    expect(answer.rows[0].transmission.error).toBeLessThan(1e-40);
    expect(shallow).toBeLessThan(1e-6);
    expect(answer.floor).toBeGreaterThan(0);
    expect(answer.floor).toBeLessThan(answer.rows[1].transmission.value);
  });
});

describe("the design's own packet and numerics", () => {
  it("are ignored: the spectrum is a matter of the potential", async () => {
    const plain = rectangular(5);
    const answer = await packetSpectrum(plain, [0.1, 0.2], 1e-6, {});
    const forced: Design = {
      ...plain,
      packet: { energy: 3, width: 1, from: "right", start: 50 },
      numerics: {
        stepper: "split-operator",
        order: 4,
        step: 2,
        timeStep: 7,
        end: 20,
        length: 100,
        accuracy: 0.1,
      },
    };
    expect(await packetSpectrum(forced, [0.1, 0.2], 1e-6, {})).toEqual(answer);
  });
});

describe("a spectrum under way", () => {
  it("names its packet, says how far it is, and stops when told to", async () => {
    const seen: { stage: string; done?: number }[] = [];
    const onProgress = (stage: string, done?: number) => {
      seen.push({ stage, done });
    };
    await packetSpectrum(rectangular(5), [0.1], 1e-6, { onProgress });
    expect(seen.map(({ stage }) => stage)).toContain("spectrum, packet of 0.1000 eV");
    for (const { done = 0 } of seen) expect(done).toBeLessThanOrEqual(1);
    const signal = AbortSignal.abort(new Error("enough"));
    await expect(packetSpectrum(rectangular(5), [0.1], 1e-6, { signal })).rejects.toThrow("enough");
  });
});
