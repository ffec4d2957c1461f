import { describe, expect, it } from "vitest";
import {
  CLEARANCE_WIDTHS,
  cayleyClock,
  departure,
  passage,
  roomFor,
  slowing,
} from "../../src/grid/journey.js";
import { integrate } from "../../src/numerics/quadrature.js";
import { kineticEnergy, wavenumberOf, wavenumberWeight } from "../../src/packets/gaussian.js";
import { HBAR } from "../../src/units/constants.js";
import { designOf, MASS, potentialOf } from "./samples.js";

const barrier = potentialOf("rectangular", { height: 0.3, width: 5 });
const exact = { kind: "exact" } as const;

describe("departure", () => {
  it("starts clear of the face that the packet meets, on its own side", () => {
    for (const [from, face, sign] of [
      ["left", -2.5, 1],
      ["right", 2.5, -1],
    ] as const) {
      const start = departure(designOf(barrier, { energy: 0.15, width: 10, from }));
      expect(start.packet.center).toBeCloseTo(face - sign * CLEARANCE_WIDTHS * 10, 12);
      expect(start.distance).toBeCloseTo(CLEARANCE_WIDTHS * 10, 12);
      expect(Math.sign(start.packet.wavenumber)).toBe(sign);
    }
  });

  it("takes the start that the design gives", () => {
    const start = departure(designOf(barrier, { energy: 0.15, width: 10, start: -80 }));
    expect([start.packet.center, start.distance]).toEqual([-80, 77.5]);
  });

  it("counts its energies from the level on its own side", () => {
    const step = potentialOf("step", { height: 0.2 });
    const left = departure(designOf(step, { energy: 0.3, width: 10 }));
    const right = departure(designOf(step, { energy: 0.3, width: 10, from: "right" }));
    expect([left.near, left.far, left.energy]).toEqual([0, 0.2, 0.3]);
    expect([right.near, right.far, right.energy]).toEqual([0.2, 0, 0.5]);
    expect(right.highest - left.highest).toBeCloseTo(0.2, 14);
  });

  it("holds all but 2e-9 of the packet between its lowest and highest energies", () => {
    const { lowest, highest, k0 } = departure(designOf(barrier, { energy: 0.15, width: 10 }));
    const within = integrate(
      (k) => wavenumberWeight(k, k0, 10),
      wavenumberOf(lowest, MASS),
      wavenumberOf(highest, MASS),
      0.02,
      16,
    );
    expect(1 - within).toBeGreaterThan(1.9e-9);
    expect(1 - within).toBeLessThan(2e-9);
  });

  it.each([0.5, 2, 6, 9])("keeps the digits of the share that moves away, %s spreads below k0", (spreads) => {
    const energy = kineticEnergy(spreads / 20, MASS);
    const { backward, k0 } = departure(designOf(barrier, { energy, width: 10 }));
    const expected = integrate((k) => wavenumberWeight(k, k0, 10), -1.2, 0, 0.01, 16);
    expect(Math.abs(backward / expected - 1)).toBeLessThan(1e-12);
  });
});

describe("Cayley clock", () => {
  it("slows a group as the arctangent of its phase does", () => {
    const clock = { kind: "cayley", reference: 0.1, cutoff: 0.25 } as const;
    const dt = (2 * HBAR) / clock.cutoff;
    const frequency = (e: number) => (2 / dt) * Math.atan(((e - clock.reference) * dt) / (2 * HBAR));
    for (const e of [0, 0.05, 0.1, 0.3, 1.7]) {
      const slope = ((frequency(e + 1e-5) - frequency(e - 1e-5)) / 2e-5) * HBAR;
      expect(slowing(clock, e)).toBeCloseTo(slope, 8);
      expect(slowing(exact, e)).toBe(1);
    }
  });

  it("keeps half its speed or better for every group of a prompt packet", () => {
    const from = departure(designOf(barrier, { energy: 0.15, width: 20 }));
    const clock = cayleyClock(from);
    expect(clock.reference).toBe(from.energy);
    for (const e of [from.lowest, from.energy, from.highest])
      expect(slowing(clock, e)).toBeGreaterThanOrEqual(0.5);
  });

  it("stands at the slow groups where there are some: near k = 0, or at a level on the far side", () => {
    const broad = departure(designOf(barrier, { energy: 0.15, width: 3 }));
    expect(cayleyClock(broad).reference).toBe(0);
    const step = departure(designOf(potentialOf("step", { height: 0.14 }), { energy: 0.15, width: 10 }));
    expect(cayleyClock(step).reference).toBe(0.14);
    expect(slowing(cayleyClock(step), 0.14)).toBe(1);
  });

  it("always has a finite positive cutoff", () => {
    for (const height of [-0.3, 0, 0.1, 0.149999])
      for (const width of [0.3, 3, 30, 300]) {
        const { cutoff } = cayleyClock(
          departure(designOf(potentialOf("step", { height }), { energy: 0.15, width })),
        );
        expect(cutoff).toBeGreaterThan(0);
        expect(cutoff).toBeLessThan(100);
      }
  });
});

describe("room", () => {
  const from = departure(designOf(barrier, { energy: 0.15, width: 10 }));

  it("holds the packet at its start, however soon the end comes", () => {
    for (const rule of ["closed", "untouched"] as const)
      expect(roomFor(from, 1e-3, exact, rule).near).toBeGreaterThan(from.distance + 8 * from.packet.width);
  });

  it("grows with the end: by the way of the fastest followed group, half of it with closed ends", () => {
    const fastest = (HBAR * (from.k0 + 7.5 * from.spread)) / MASS;
    for (const [rule, share] of [
      ["untouched", 1],
      ["closed", 0.5],
    ] as const) {
      const [a, b] = [1000, 1500].map((end) => roomFor(from, end, exact, rule));
      // The front of a packet in exact time is that of its fastest group: no turning point, no width of its own.
      expect(b.far - a.far).toBeCloseTo(share * 500 * fastest, 6);
      expect(b.near - a.near).toBeCloseTo(share * 500 * fastest, 6);
    }
  });

  it("is wider downhill and narrower uphill", () => {
    const far = (height: number) =>
      roomFor(
        departure(designOf(potentialOf("step", { height }), { energy: 0.3, width: 10 })),
        500,
        exact,
        "untouched",
      ).far;
    expect(far(-0.2)).toBeGreaterThan(1.1 * far(0));
    expect(far(0.2)).toBeLessThan(0.9 * far(0));
  });

  it("is that of the mirrored design, sides exchanged", () => {
    const layers = [
      { width: 2, height: 0.3 },
      { width: 5, height: -0.1 },
      { width: 3, height: 0.2 },
    ];
    const left = departure(designOf(potentialOf("layers", { layers }), { energy: 0.15, width: 10 }));
    const right = departure(
      designOf(potentialOf("layers", { layers: [...layers].reverse() }), {
        energy: 0.15,
        width: 10,
        from: "right",
      }),
    );
    expect(right.packet.center).toBeCloseTo(10 - left.packet.center, 12);
    for (const rule of ["closed", "untouched"] as const)
      expect(roomFor(right, 700, cayleyClock(right), rule)).toEqual(
        roomFor(left, 700, cayleyClock(left), rule),
      );
  });
});

describe("passage", () => {
  it("is the time of the slowest of the packet's prompt groups", () => {
    const from = departure(designOf(barrier, { energy: 0.15, width: 20 }));
    const slowest = (HBAR * (from.k0 - 6 * from.spread)) / MASS;
    expect(passage(from, 300, exact)).toBeCloseTo(300 / slowest, 9);
    // With the clock of a large step, the fast groups may be the last.
    const clock = { kind: "cayley", reference: from.near, cutoff: 0.02 } as const;
    const fastest = ((HBAR * (from.k0 + 6 * from.spread)) / MASS) * slowing(clock, from.highest);
    expect(passage(from, 300, clock)).toBeCloseTo(300 / fastest, 9);
  });

  it("stays finite for a packet that hardly moves", () => {
    const from = departure(designOf(barrier, { energy: 1e-9, width: 10 }));
    expect(passage(from, 300, exact)).toBeLessThan(Number.POSITIVE_INFINITY);
  });
});
