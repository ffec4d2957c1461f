import { chmodSync, mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { DesignError } from "../../src/design/design-error.js";
import { isPotentialPath, potentialNames, readPotential } from "../../src/files/potential-library.js";
import { describeDesignFile, designFilePathValue, readDesignFile } from "../../src/files/read-design-file.js";

const DESIGN = `title: T
potential: { use: ./mine.yaml }
packet: { energy: 0.15 eV, width: 10 nm }
`;
const MINE = `name: mine
title: Mine
summary: A barrier beside its design.
source: common practice, no source
potential: { shape: rectangular, height: 0.3 eV, width: 5 nm }
`;

let folder = "";
const path = (name: string): string => join(folder, name);
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "postern-design-"));
  mkdirSync(path("folder.yaml"));
  writeFileSync(path("design.yaml"), DESIGN);
  writeFileSync(path("mine.yaml"), MINE);
  writeFileSync(path("elsewhere.yaml"), DESIGN.replace("./mine.yaml", "other.yaml"));
  writeFileSync(path("binary.yaml"), Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 0, 0xff));
  writeFileSync(path("latin.yaml"), Uint8Array.of(0x74, 0x3a, 0x20, 0xe9, 0x0a));
  writeFileSync(path("large.yaml"), "#".repeat(5_000_000));
  writeFileSync(path("marked.yaml"), `\ufeff${DESIGN.replace("10 nm", "10 eV")}`);
  symlinkSync(path("loop.yaml"), path("loop.yaml"));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function failure(name: string): DesignError {
  try {
    readDesignFile(name);
  } catch (error) {
    if (error instanceof DesignError) return error;
    throw error;
  }
  throw new Error("the file was read without an error");
}

describe("readDesignFile", () => {
  test("finds a ready-made potential beside the design, wherever the program runs", () => {
    expect(readDesignFile(path("design.yaml")).potential.interfaces).toEqual([-2.5, 2.5]);
    expect(
      readDesignFile(path("design.yaml"), { set: ["potential.with.width=4 nm"] }).potential.interfaces,
    ).toEqual([-2, 2]);
    expect(describeDesignFile(path("design.yaml")).yaml).toContain("shape: rectangular");
    expect(designFilePathValue(path("design.yaml"), "potential.width").text).toBe("5 nm");
  });

  test.each([
    ["absent.yaml", "no such file"],
    ["design.yaml/part.yaml", "no such file: a part of its path is not a folder"],
    ["folder.yaml", "this is a folder; a file is needed"],
    ["binary.yaml", "the file is not text in UTF-8"],
    ["latin.yaml", "the file is not text in UTF-8"],
    ["large.yaml", "the file is too large: 5000000 bytes, 1000000 characters at most"],
    ["loop.yaml", "the file is a link that leads back to itself"],
  ])("%s: %s", (name, problem) => {
    expect(failure(path(name)).message).toBe(`${path(name)}: ${problem}`);
  });

  test("a path with an impossible character", () => {
    expect(failure("a\0b").problem).toMatch(/^the file cannot be read: [^\n]+$/);
  });

  test("an unreadable file", () => {
    writeFileSync(path("closed.yaml"), DESIGN);
    chmodSync(path("closed.yaml"), 0o000);
    // The super-user reads it all the same.
    if (process.getuid?.() === 0) expect(readDesignFile(path("closed.yaml")).title).toBe("T");
    else expect(failure(path("closed.yaml")).problem).toBe("the file may not be read: permission denied");
  });

  test("a device without an end", () => {
    expect(failure("/dev/zero").message).toBe("/dev/zero: a device or socket; a file is needed");
  });

  test("a missing file of a ready-made potential is named with its path", () => {
    expect(failure(path("elsewhere.yaml")).message).toBe(`${path("other.yaml")}: no such file`);
  });

  test("columns are right after a byte order mark", () => {
    expect(failure(path("marked.yaml"))).toMatchObject({ line: 3, column: 35, key: "packet.width" });
  });
});

describe("the library", () => {
  test("every ready-made potential reads, is named after its file and says where it comes from", () => {
    for (const name of potentialNames())
      expect(readPotential(name)).toMatchObject({ name, source: expect.stringMatching(/.{5}/) });
    expect(readPotential("no-such-potential")).toBeUndefined();
    expect(readPotential("mine.yaml", folder)?.title).toBe("Mine");
  });

  test("names that leave the folder are paths, not names of the library", () => {
    expect(isPotentialPath("../package.json")).toBe(true);
    expect(isPotentialPath("oxide-barrier")).toBe(false);
    expect(readPotential("..")).toBeUndefined();
  });
});
