import { spawn, spawnSync } from "node:child_process";
import {
  chmodSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from "node:fs";
import { tmpdir } from "node:os";
import { join, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { checkFolder, OutputError, writeFileAtomic, writeFolder } from "../../src/files/atomic.js";
import { asOutputError } from "../../src/files/output-error.js";

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), "postern-atomic-"));
});
afterEach(() => {
  rmSync(folder, { recursive: true, force: true });
});

const at = (...parts: string[]) => join(folder, ...parts);
const read = (path: string) => readFileSync(at(path), "utf8");
const program = fileURLToPath(new URL("./atomic-child.ts", import.meta.url));
const root = resolve(fileURLToPath(new URL("../..", import.meta.url)));

/** The error of a promise that has to fail, which must be an OutputError of one line. */
async function failure(promise: Promise<unknown>): Promise<string> {
  const error = await promise.then(
    () => undefined,
    (reason) => reason,
  );
  expect(error).toBeInstanceOf(OutputError);
  expect(error.message).not.toContain("\n");
  return error.message;
}

describe("writeFolder", () => {
  it("creates the folder and its parents, writes text and bytes, leaves nothing else", async () => {
    await writeFolder(at("a", "b"), { "summary.json": "{}\n", "map.png": Uint8Array.of(1, 2, 255) });
    expect(readdirSync(at("a", "b")).sort()).toEqual(["map.png", "summary.json"]);
    expect(read("a/b/summary.json")).toBe("{}\n");
    expect([...readFileSync(at("a", "b", "map.png"))]).toEqual([1, 2, 255]);
  });

  it("replaces files that are there, and keeps the others", async () => {
    writeFileSync(at("old.txt"), "old");
    writeFileSync(at("kept.txt"), "kept");
    await writeFolder(folder, { "old.txt": "new" });
    expect([read("old.txt"), read("kept.txt")]).toEqual(["new", "kept"]);
    expect(readdirSync(folder)).toHaveLength(2);
  });

  it("changes nothing when one of the files cannot be written", async () => {
    writeFileSync(at("a.txt"), "old");
    mkdirSync(at("b.txt"));
    expect(await failure(writeFolder(folder, { "a.txt": "new", "b.txt": "new" }))).toContain(
      "b.txt: there is a folder",
    );
    expect(read("a.txt")).toBe("old");
    expect(readdirSync(folder).sort()).toEqual(["a.txt", "b.txt"]);
  });

  it("takes the folders that it made away again when it fails", async () => {
    const long = "x".repeat(300);
    expect(await failure(writeFolder(at("new", "deep"), { [long]: "a" }))).toContain("too long");
    expect(readdirSync(folder)).toEqual([]);
  });

  it("refuses a file in place of the folder, and one in place of its parent", async () => {
    writeFileSync(at("file"), "");
    expect(await failure(writeFolder(at("file"), { a: "" }))).toBe(
      `${at("file")}: this is a file, and a folder is needed; choose another name or remove it`,
    );
    expect(await failure(writeFolder(at("file", "deeper"), { a: "" }))).toContain("is a file, not a folder");
  });

  it("refuses names with a folder in them", async () => {
    for (const name of ["", ".", "..", "a/b", "a\\b", "../a"])
      await expect(writeFolder(folder, { [name]: "" })).rejects.toThrow(TypeError);
    expect(readdirSync(folder)).toEqual([]);
  });

  it("says so when the folder must not be written to", async () => {
    mkdirSync(at("locked"));
    chmodSync(at("locked"), 0o555);
    chmodSync(folder, 0o755);
    // The superuser may write everywhere: as somebody else, then.
    const user = process.getuid?.() === 0;
    if (user) process.seteuid?.(65534);
    try {
      expect(await failure(writeFolder(at("locked"), { a: "" }))).toContain("no permission to write here");
      expect(await failure(writeFolder(at("locked", "in"), { a: "" }))).toContain(
        "no permission to write here",
      );
      expect(() => checkFolder(at("locked"))).toThrow(OutputError);
    } finally {
      if (user) process.seteuid?.(0);
    }
    expect(readdirSync(at("locked"))).toEqual([]);
  });
});

describe("checkFolder", () => {
  it("leaves nothing behind, whether it can be written to or not", () => {
    checkFolder(at("some", "where"));
    checkFolder(folder);
    writeFileSync(at("file"), "");
    expect(() => checkFolder(at("file"))).toThrow(OutputError);
    expect(readdirSync(folder)).toEqual(["file"]);
  });
});

describe("writeFileAtomic", () => {
  it("writes, replaces, and follows a link", async () => {
    await writeFileAtomic(at("deep", "map.svg"), "<svg/>");
    expect(read("deep/map.svg")).toBe("<svg/>");
    symlinkSync(at("deep", "map.svg"), at("link.svg"));
    await writeFileAtomic(at("link.svg"), "<svg></svg>");
    expect(read("deep/map.svg")).toBe("<svg></svg>");
    expect(readdirSync(at("deep"))).toEqual(["map.svg"]);
  });

  it("refuses a folder, a device and no name at all", async () => {
    mkdirSync(at("folder"));
    expect(await failure(writeFileAtomic(at("folder"), ""))).toContain("there is a folder of this name");
    expect(await failure(writeFileAtomic(`${folder}/`, ""))).toContain("a file name is needed");
    expect(await failure(writeFileAtomic("", ""))).toContain("a file name is needed");
    spawnSync("mkfifo", [at("pipe")]);
    expect(await failure(writeFileAtomic(at("pipe"), ""))).toContain("no ordinary file");
  });
});

describe("asOutputError", () => {
  it("words the faults of a disk, and leaves other errors alone", () => {
    const fault = (code: string, errno: number) =>
      asOutputError("out", Object.assign(new Error("x"), { code, errno })) as OutputError;
    expect(fault("ENOSPC", -28).message).toBe("out: the disk is full; nothing was written");
    expect(fault("EROFS", -30).message).toContain("can only be read");
    expect(fault("EIO", -5).message).toBe("out: cannot be written (i/o error)");
    const other = new TypeError("not a matter of files");
    expect(asOutputError("out", other)).toBe(other);
  });
});

describe("a program that writes", () => {
  const command = [process.execPath, "--import", "tsx", program];

  it("leaves no short file where the disk takes only part of it", { timeout: 30_000 }, () => {
    // A limit on the size of files gives the short write and the error of a full disk, without one.
    const script = `ulimit -f 256; exec "$@"`;
    const run = spawnSync("bash", ["-c", script, "bash", ...command, folder, "once"], {
      cwd: root,
      encoding: "utf8",
    });
    expect(run.stderr).toContain("larger than the system permits");
    expect(run.status).toBe(2);
    expect(readdirSync(folder)).toEqual([]);
  });

  it.each(["SIGINT", "SIGTERM"] as const)(
    "ended by %s leaves whole files or none",
    { timeout: 30_000 },
    async (signal) => {
      for (let round = 0; round < 3; round++) {
        const child = spawn(command[0], [...command.slice(1), folder, "forever"], {
          cwd: root,
          stdio: "pipe",
        });
        let again: NodeJS.Timeout | undefined;
        try {
          const ended = new Promise<string | null>((done) => child.once("exit", (_, by) => done(by)));
          await new Promise((ready) => child.stdout.once("data", ready));
          await new Promise((later) => setTimeout(later, 15 + 11 * round));
          child.kill(signal);
          // A signal is lost in the microseconds in which the listeners are taken off; a person would press again.
          again = setInterval(() => child.kill(signal), 1000);
          expect(await ended).toBe(signal);
        } finally {
          clearInterval(again);
          child.kill("SIGKILL");
        }
        const names = readdirSync(folder);
        for (const name of names) expect(["a.bin", "b.bin"]).toContain(name);
        const contents = names.map((name) => readFileSync(at(name)));
        for (const content of contents) {
          expect(content.length).toBe(3e5);
          expect(content.every((byte) => byte === content[0])).toBe(true);
        }
        // Both of the same round of writing.
        if (contents.length === 2) expect(contents[0][0]).toBe(contents[1][0]);
      }
    },
  );
});
