import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { estimate } from "../../src/index.js";
import { describeDesignFile, readDesignFile } from "../../src/node.js";
import { parseConcise } from "./parse-concise.js";
import { referenceFor } from "./reference.js";

const folder = new URL("../../examples/", import.meta.url);
const files = readdirSync(folder).filter((file) => file.endsWith(".yaml"));

/** Longest that an example may compute, s of this process's own time: "a few seconds", doubled for a slow machine. */
const LONGEST_S = 20;
/** Digits that a comment must be good for. */
const WORTH = 1e-5;

/** A number that an example's comment states, as `#   name: 0.0123456(7)`. */
function stated(text: string, name: string) {
  const line = text.match(new RegExp(`^#\\s+${name}: (\\S+)$`, "m"));
  if (line === null) throw new Error(`no comment line "# ${name}: 0.0123456(7)"`);
  return parseConcise(line[1]);
}

describe("the examples", () => {
  it("are at least seven, the blocking barrier among them", () => {
    expect(files.length).toBeGreaterThanOrEqual(7);
    expect(files).toContain("blocking-barrier.yaml");
  });
});

describe.each(files)("examples/%s", (file) => {
  const path = new URL(file, folder).pathname;
  const text = readFileSync(path, "utf8");

  it("says what it is for and what it gives, before the design", () => {
    const comment = text.slice(0, text.search(/^[^#]/m));
    expect(comment).toMatch(/^# What it is for: /m);
    expect(comment).toMatch(/^# What it gives/m);
  });

  it("is trusted and gives the numbers of its comment, which outside values confirm", async () => {
    const design = readDesignFile(path);
    const start = process.cpuUsage();
    const answer = await estimate(design);
    expect(process.cpuUsage(start).user / 1e6).toBeLessThan(LONGEST_S);
    expect(answer.checks.filter(({ passed }) => !passed)).toEqual([]);
    expect(answer.verdict).toBe("trusted");

    const computed = {
      transmission: answer.transmission,
      reflection: answer.reflection,
      "transmission of a plane wave at the mean energy": answer.atMeanEnergy,
    };
    const reference = referenceFor(describeDesignFile(path).design);
    const outside = {
      transmission: reference.packet,
      reflection: 1 - reference.packet,
      "transmission of a plane wave at the mean energy": reference.planeWave,
    };
    for (const [name, { value, error }] of Object.entries(computed)) {
      const comment = stated(text, name);
      const reach = comment.error + error;
      expect(Math.abs(comment.value - value), `${name} against the comment`).toBeLessThanOrEqual(reach);
      const truth = outside[name as keyof typeof outside];
      const slack = reference.error * reference.packet + 2 * Number.EPSILON;
      expect(Math.abs(value - truth), `${name} computed, against ${truth}`).toBeLessThanOrEqual(
        error + slack,
      );
      expect(Math.abs(comment.value - truth), `${name} stated, against ${truth}`).toBeLessThanOrEqual(
        comment.error + slack,
      );
    }
    const transmission = stated(text, "transmission");
    expect(transmission.error).toBeLessThanOrEqual(WORTH * transmission.value);
  });
});
