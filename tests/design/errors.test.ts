import { expect, test } from "vitest";
import { DesignError } from "../../src/design/design-error.js";
import { readDesign } from "../../src/design/read-design.js";
import { BAD_DESIGNS, RIGHT } from "./bad-designs.js";

function failure(text: string, options: Parameters<typeof readDesign>[1]): DesignError {
  try {
    readDesign(text, options);
  } catch (error) {
    if (error instanceof DesignError) return error;
    throw error;
  }
  throw new Error("the design was read without an error");
}

test("the design that the wrong ones are made from is right", () => {
  expect(readDesign(RIGHT, { file: "a.yaml" }).title).toBe("Blocking barrier");
});

test.each(BAD_DESIGNS)("$what", ({ text, message, what: _, ...options }) => {
  const error = failure(text, { file: "a.yaml", ...options });
  expect(error.message).toBe(message);
  // One line of problem, one line of help, both fit for a terminal.
  expect(error.message).not.toContain("\n");
  expect(error.help).toMatch(/^[^\n]{10,300}$/);
});

test("an error carries its parts", () => {
  const error = failure(RIGHT.replace("2.5 nm", "-3 nm"), { file: "b.yaml" });
  expect(error).toMatchObject({
    name: "DesignError",
    file: "b.yaml",
    line: 7,
    column: 14,
    key: "potential.layers[0].width",
    problem: 'a length above zero is needed, such as "2.5 nm"; got "-3 nm"',
    help: "A quantity is a number, a space and a unit: pm, nm, um, mm, Å, angstrom, m or bohr.",
  });
});

test("of several faults an unknown key comes first, then values in their order, then what is missing", () => {
  const twoValues = RIGHT.replace("2.5 nm", "-3 nm").replace("12 nm", "12 eV");
  expect(failure(twoValues, { file: "a.yaml" }).line).toBe(7);
  expect(failure(twoValues.replace("accuracy:", "acuracy:"), { file: "a.yaml" }).key).toBe(
    "numerics.acuracy",
  );
  const missing = RIGHT.replace("title: Blocking barrier\n", "").replace("12 nm", "12 eV");
  expect(failure(missing, { file: "a.yaml" }).key).toBe("packet.width");
});

test("places are right after a byte order mark and with line ends of other systems", () => {
  const text = RIGHT.replace("12 nm", "12 eV");
  expect(failure(text.replaceAll("\n", "\r\n"), { file: "a.yaml" })).toMatchObject({ line: 14, column: 10 });
  expect(failure(`\ufeff${text}`, { file: "a.yaml" })).toMatchObject({ line: 14, column: 10 });
});

test("places are right in JSON", () => {
  const json = JSON.stringify(
    {
      title: "T",
      potential: { shape: "delta", strength: "1 eV" },
      packet: { energy: "1 eV", width: "1 nm" },
    },
    undefined,
    "\t",
  );
  const error = failure(json, { file: "a.json" });
  expect(error.message).toBe(
    'a.json:5:15: potential.strength: a strength (energy times length) is needed, such as "0.5 eV nm"; "1 eV" is an energy',
  );
});
