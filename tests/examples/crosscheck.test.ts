import { readdirSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { crosscheck } from "../../src/index.js";
import { readDesignFile } from "../../src/node.js";

const folder = new URL("../../examples/", import.meta.url);
const files = readdirSync(folder).filter((file) => file.endsWith(".yaml"));
/** Distance of the final states that smooth designs have to reach. */
const SMOOTH_DISTANCE = 1e-6;

describe.each(files)("examples/%s", (file) => {
  it("agrees between both steppers and the witness, every check passed", async () => {
    const design = readDesignFile(new URL(file, folder).pathname);
    const answer = await crosscheck(design);
    expect(answer.checks.filter(({ passed }) => !passed)).toEqual([]);
    expect(answer.agree).toBe(true);
    const smooth = design.potential.slopeTransform === undefined;
    if (smooth || answer.steppers.length === 1) expect(answer.difference.state).toBeLessThan(SMOOTH_DISTANCE);
  }, 300_000);
});
