import { describe, expect, it } from "vitest";
import { COARSE, RECTANGULAR, RECTANGULAR_TRANSMISSION, workplace } from "./run.js";

const { postern, shell, write } = workplace();
write("rect.yaml", RECTANGULAR);
write("coarse.yaml", COARSE);
/** It takes seconds, so two tests share it. */
const coarse = {
  json: postern("estimate", "coarse.yaml", "--json"),
  text: postern("estimate", "coarse.yaml"),
};

/**
 * What a better grid builder or another machine changes is hidden: sizes of round-off and bounds, the numbers of grid and
 * time, and digits after the third. All else is exact.
 */
function stable(text: string): string {
  return text
    .replace(/\b\d+(?:\.\d+)?e-\d+\b/g, (size) => (size === "1e-6" || size === "1e-9" ? size : "x"))
    .replace(/(\d\.\d{3})\d*\(\d+\) */g, "$1... ")
    .replace(/^\(\d+\)/m, "(x)")
    .replace(/( eV) {2,}/g, "$1  ")
    .replace(/^(?:grid|time) .*$/gm, (line) => line.replace(/\d+(?:\.\d+)?/g, "x"))
    .replace(/ +limit/g, " limit")
    .replace(/ +$/gm, "");
}

describe("postern estimate --json", () => {
  it("prints one document with the keys of the contract and exits 0", () => {
    const { code, out, err } = postern("estimate", "rect.yaml", "--json");
    expect({ code, err }).toEqual({ code: 0, err: "" });
    const answer = JSON.parse(out);
    const probability = { value: expect.any(Number), error: expect.any(Number) };
    expect(answer).toMatchObject({
      design: { title: "Rectangular barrier", sha256: expect.stringMatching(/^[0-9a-f]{64}$/) },
      transmission: probability,
      reflection: probability,
      remaining: expect.any(Number),
      norm: { drift: expect.any(Number) },
      stepper: "crank-nicolson",
      order: 2,
      grid: { points: expect.any(Number), step_nm: expect.any(Number) },
      time: { step_fs: expect.any(Number), end_fs: expect.any(Number), steps: expect.any(Number) },
      verdict: "trusted",
      accuracy: { asked: 1e-6, reached: expect.any(Number) },
      atMeanEnergy: probability,
      meanEnergy_eV: 0.15,
      carryingEnergy_eV: expect.any(Number),
      version: "0.1.0",
    });
    expect(answer.checks.length).toBeGreaterThan(0);
    for (const check of answer.checks)
      expect(check).toEqual({
        name: expect.any(String),
        value: expect.any(Number),
        limit: expect.any(Number),
        passed: true,
        explanation: expect.any(String),
      });
    const { value, error } = answer.transmission;
    expect(Math.abs(value - RECTANGULAR_TRANSMISSION)).toBeLessThanOrEqual(error);
    expect(error).toBeLessThanOrEqual(1e-6 * value);
    expect(Math.abs(answer.reflection.value - (1 - RECTANGULAR_TRANSMISSION))).toBeLessThanOrEqual(
      answer.reflection.error,
    );
  });

  it("says the same twice, byte for byte", () => {
    const twice = [0, 1].map(() => postern("estimate", "rect.yaml", "--json").out);
    expect(twice[0]).toBe(twice[1]);
  });

  it("never trusts a forced coarse calculation, and its bound holds", () => {
    const { code, out, err } = coarse.json;
    expect({ code, err }).toEqual({ code: 3, err: "" });
    const { verdict, transmission, stepper, order, checks } = JSON.parse(out);
    expect({ verdict, stepper, order }).toEqual({ verdict: "doubtful", stepper: "split-operator", order: 2 });
    expect(Math.abs(transmission.value - RECTANGULAR_TRANSMISSION)).toBeLessThanOrEqual(transmission.error);
    // Wrong by more than a tenth, or the design would be no test of the bound.
    expect(Math.abs(transmission.value / RECTANGULAR_TRANSMISSION - 1)).toBeGreaterThan(0.1);
    expect(checks.filter((check: { passed: boolean }) => !check.passed).length).toBeGreaterThan(0);
  });

  it("takes --set over the file", () => {
    const { code, out } = postern("estimate", "rect.yaml", "--set", "potential.width=4 nm", "--json");
    expect(code).toBe(0);
    expect(JSON.parse(out).transmission.value).toBeGreaterThan(0.03);
  });

  it("obeys --stepper, --order and --accuracy", () => {
    const options = ["--stepper", "split-operator", "--order", "4", "--accuracy", "1e-3"];
    const { code, out } = postern("estimate", "rect.yaml", ...options, "--json");
    const answer = JSON.parse(out);
    expect(answer).toMatchObject({ stepper: "split-operator", order: 4, accuracy: { asked: 1e-3 } });
    expect(code).toBe(answer.verdict === "trusted" ? 0 : 3);
  });
});

describe("postern estimate as text", () => {
  it("shows probabilities with bounds, the mean energy beside them, numerics, checks and the verdict", () => {
    const { code, out, err } = postern("estimate", "rect.yaml");
    expect({ code, err }).toEqual({ code: 0, err: "" });
    expect(stable(out)).toMatchInlineSnapshot(`
      "Rectangular barrier

      transmission  0.026...
      reflection    0.973...

      (x): a bound on the error, in units of the last digits; the true value of the model lies within it

      a packet is not its mean energy
        transmission of the packet        0.026... all its energies, each with its weight
        transmission at its mean energy   0.023... a plane wave of 0.15 eV
        energy that carried most through  0.162 eV  the peak of the energies of what got through

      remaining   x of the packet, inside the structure or on its way at the end
      norm drift  x
      stepper     crank-nicolson, order 2
      grid        x points, step x nm, finest x nm
      time        x steps of x fs, end x fs

      checks
        passed  start      x limit 1e-9
        passed  packet     x limit 1e-9
        passed  norm       x limit 1e-9
        passed  remaining  x limit 1e-6
        passed  spacing    x limit 1e-6
        passed  accuracy   x limit 1e-6

      trusted: all checks passed; the bound is x of the transmission, 1e-6 was asked for
      "
    `);
  });

  it("says in words why an answer is doubtful", () => {
    const { code, out } = coarse.text;
    expect(code).toBe(3);
    expect(out).toMatch(/^ {2}FAILED {2}kinetic phase {4}6\.8 +limit 1$/m);
    expect(out).toMatch(/\ndoubtful:\n/);
    expect(out).toMatch(/^ {2}kinetic phase is 6\.8, above its limit 1: /m);
  });

  it("keeps every line within 100 columns", () => {
    const lines = [coarse.text, postern("estimate", "rect.yaml")].flatMap(({ out }) => out.split("\n"));
    expect(lines.filter((line) => line.length > 100)).toEqual([]);
  });

  it("is quiet when the reader closes the pipe", () => {
    const { out, err } = shell("postern estimate rect.yaml | true; echo $PIPESTATUS");
    expect({ out, err }).toEqual({ out: "0\n", err: "" });
  });

  it.runIf(process.platform === "linux")("says when standard output cannot take the result", () => {
    const { code, err } = shell("postern estimate rect.yaml --json > /dev/full");
    expect({ code, err }).toEqual({ code: 1, err: "postern: standard output: the disk is full\n" });
  });
});
