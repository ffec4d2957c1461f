import { once } from "node:events";
import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import { setTimeout as wait } from "node:timers/promises";
import { PNG } from "pngjs";
import { describe, expect, it } from "vitest";
import { RECTANGULAR, workplace } from "./run.js";

const { folder, path, postern, start, write } = workplace();
write("rect.yaml", RECTANGULAR);

describe("postern estimate --out", () => {
  const run = postern("estimate", "rect.yaml", "--out", "deep/results", "--json");
  const answer = JSON.parse(run.out);
  const summary = JSON.parse(readFileSync(path("deep/results/summary.json"), "utf8"));

  it("writes three files, names them on standard error, and keeps standard output to one document", () => {
    expect(run.code).toBe(0);
    expect(run.err).toBe("deep/results/summary.json\ndeep/results/series.csv\ndeep/results/map.png\n");
    expect(readdirSync(path("deep/results")).sort()).toEqual(["map.png", "series.csv", "summary.json"]);
  });

  it("puts the answer, the design in full and the numerics of the run that was looked at into summary.json", () => {
    const { design, history, ...rest } = summary;
    const { design: asked, ...same } = answer;
    expect(rest).toEqual(same);
    expect(design).toEqual({
      ...asked,
      full: {
        title: "Rectangular barrier",
        particle: { mass: "0.067 m_e" },
        potential: { shape: "rectangular", height: "0.3 eV", width: "5 nm", center: "0 nm" },
        packet: { energy: "0.15 eV", width: "10 nm", from: "left" },
        numerics: { accuracy: 1e-6 },
      },
    });
    expect(history.grid.points).toBeGreaterThan(100);
    expect(history.time.steps).toBeGreaterThan(100);
    for (const error of Object.values(history.errors)) expect(error).toBeLessThan(0.01);
  });

  it("writes a series whose last transmission is that of the answer, within the run's own error", () => {
    const rows = readFileSync(path("deep/results/series.csv"), "utf8").trimEnd().split("\n");
    const header = rows[0].split(",");
    expect(header.slice(0, 3)).toEqual(["time_fs", "transmission", "reflection"]);
    const last = rows[rows.length - 1].split(",").map(Number);
    expect(last.length).toBe(header.length);
    expect(Math.abs(last[1] - answer.transmission.value)).toBeLessThanOrEqual(
      // What is still inside at the end of the series has yet to come out.
      summary.history.errors.transmission + last[header.indexOf("inside")] + answer.transmission.error,
    );
    expect(rows.length).toBeGreaterThan(300);
  });

  it("writes a map that carries the design's hash", () => {
    const file = readFileSync(path("deep/results/map.png"));
    const { width, height } = PNG.sync.read(file);
    expect([width, height]).toEqual([1890, 1323]);
    expect(file.includes(`Design SHA-256\0${answer.design.sha256}`)).toBe(true);
    expect(file.includes("Software\0postern 0.1.0")).toBe(true);
  });
});

describe("an output folder that cannot be written", () => {
  it("is told before anything is computed, and what is there stays as it is", () => {
    mkdirSync(path("taken"));
    writeFileSync(path("taken/results"), "a file");
    const before = performance.now();
    // This calculation would take minutes.
    const slow = ["--stepper", "split-operator", "--set", "numerics.timeStep=0.0001 fs"];
    const { code, out, err } = postern("estimate", "rect.yaml", "--out", "taken/results", ...slow);
    expect(performance.now() - before).toBeLessThan(10_000);
    expect({ code, out, err }).toEqual({
      code: 2,
      out: "",
      err:
        "postern: taken/results: this is a file, and a folder is needed; choose another name or remove it\n" +
        "Give another place with --out.\n",
    });
    expect(readFileSync(path("taken/results"), "utf8")).toBe("a file");
  });

  it.runIf(process.platform === "linux")("is told where the system knows no such place", () => {
    const { code, err } = postern("estimate", "rect.yaml", "--out", "/proc/postern/results");
    expect({ code, err }).toEqual({
      code: 2,
      err: "postern: /proc/postern/results: there is no such place to write to\nGive another place with --out.\n",
    });
  });
});

describe("Ctrl-C", () => {
  it.each([
    ["estimate", "--out", "stopped"],
    ["map", "--out", "stopped/map.png"],
  ])("ends postern %s at once with 130 and leaves nothing behind", async (command, ...args) => {
    const slow = ["--stepper", "split-operator", "--set", "numerics.timeStep=0.0005 fs"];
    const run = start(command, "rect.yaml", ...slow, ...args);
    let out = "";
    let err = "";
    run.stdout.on("data", (chunk) => (out += chunk));
    run.stderr.on("data", (chunk) => (err += chunk));
    // Long enough to be propagating, on a slow machine too; the calculation takes minutes.
    await wait(3000);
    expect(run.exitCode).toBeNull();
    const pressed = performance.now();
    run.kill("SIGINT");
    const [code, signal] = await once(run, "close");
    expect(performance.now() - pressed).toBeLessThan(2000);
    expect({ code, signal, out, err }).toEqual({
      code: 130,
      signal: null,
      out: "",
      err: "postern: interrupted; no file was left half-written\n",
    });
    expect(existsSync(path("stopped"))).toBe(false);
    expect(readdirSync(folder).filter((name) => name.startsWith("."))).toEqual([]);
  });
});
