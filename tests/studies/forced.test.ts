import { describe, expect, it } from "vitest";
import { departure } from "../../src/grid/journey.js";
import { relativeError } from "../../src/studies/common-checks.js";
import { forcedRoom, isForced } from "../../src/studies/forced.js";
import { DesignLimitError } from "../../src/studies/limits.js";
import { designOf, potentialOf } from "../grid/samples.js";

const barrier = potentialOf("rectangular", { height: 0.3, width: 5 });
const automatic = { near: 400, far: 200 };
const roomOf = (length?: number) => {
  const design = designOf(barrier, { energy: 0.15, width: 10 }, { length });
  return forcedRoom(design, departure(design), automatic);
};

describe("forced numerics", () => {
  it("are those that the error of the transmission depends on", () => {
    for (const key of ["step", "points", "length", "timeStep", "end"])
      expect(isForced({ [key]: 1 }), key).toBe(true);
    expect(isForced({})).toBe(false);
    expect(isForced({ stepper: "crank-nicolson", order: 4, accuracy: 1e-4, boundary: "closed" })).toBe(false);
  });

  it("share a length as the automatic room is shared, but hold the packet first", () => {
    expect(roomOf()).toBe(automatic);
    const long = roomOf(905);
    expect(long.near).toBeCloseTo(600, 10);
    expect(long.far).toBeCloseTo(300, 10);
    const short = roomOf(200);
    expect(short.near).toBe(180);
    expect(short.far).toBeCloseTo(15, 10);
  });

  it("refuse a length that does not hold the packet, and say how much would", () => {
    expect(() => roomOf(180)).toThrow(DesignLimitError);
    expect(() => roomOf(180)).toThrow(/here more than "189 nm"; got "180 nm"/);
    expect(roomOf(189).far).toBeGreaterThan(0);
  });
});

describe("a relative error", () => {
  it("is huge, and never NaN or negative, where there is no positive value to relate it to", () => {
    expect(relativeError(1e-9, 0.5)).toBe(2e-9);
    for (const [error, value] of [
      [0, 0],
      [1, 0],
      [1, -1e-20],
      [Number.NaN, 1],
      [Number.POSITIVE_INFINITY, 1],
      [1, Number.NaN],
      [1, 1e-320],
    ])
      expect(relativeError(error, value)).toBe(Number.MAX_VALUE);
  });
});
