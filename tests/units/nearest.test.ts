import { expect, test } from "vitest";
import { nearest } from "../../src/units/nearest.js";

const KEYS = ["energy", "width", "energySpread", "start", "from"];

test.each([
  ["wdth", "width"],
  ["widht", "width"],
  ["Width", "width"],
  ["enregy", "energy"],
  ["energy_spread", "energySpread"],
  ["energyspread", "energySpread"],
  ["form", "from"],
  ["starting", "start"],
  ["colour", undefined],
  ["x", undefined],
])("%s probably means %s", (word, meant) => {
  expect(nearest(word, KEYS)).toBe(meant);
});

test("nothing is near when there is nothing to choose from", () => {
  expect(nearest("width", [])).toBeUndefined();
});
