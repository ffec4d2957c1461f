import { spawnSync } from "node:child_process";
import { cpSync, mkdirSync, mkdtempSync, readdirSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";

const root = resolve(dirname(fileURLToPath(import.meta.url)), "..");

interface Cruise {
  modules: { source: string; dependencies: unknown[] }[];
  summary: { violations: { from: string; to: string; rule: { name: string } }[] };
}

/** Runs the layer check of `npm run layers` in a folder and returns its report. */
function cruise(folder: string): Cruise {
  const program = join(root, "node_modules", "dependency-cruiser", "bin", "dependency-cruise.mjs");
  const args = [program, "--config", ".dependency-cruiser.cjs", "--output-type", "json", "src"];
  const run = spawnSync(process.execPath, args, { cwd: folder, encoding: "utf8", maxBuffer: 1 << 28 });
  if (!run.stdout.startsWith("{")) throw new Error(`the layer check did not run: ${run.stderr}`);
  return JSON.parse(run.stdout) as Cruise;
}

const broken = (report: Cruise): string[] =>
  report.summary.violations.map(({ rule, from, to }) => `${rule.name}: ${from} -> ${to}`).sort();

describe("layers of src/", () => {
  it("are kept, by every file", () => {
    const report = cruise(root);
    const seen = report.modules.filter((module) => module.source.startsWith("src/"));
    const imports = seen.reduce((sum, module) => sum + module.dependencies.length, 0);
    console.info(`layer check: ${seen.length} modules of src/ with ${imports} imports seen`);
    expect(broken(report)).toEqual([]);
    expect(seen.length).toBeGreaterThan(20);
    const files = readdirSync(join(root, "src"), { recursive: true }).map(String);
    expect(seen.length).toBe(files.filter((file) => file.endsWith(".ts")).length);
    // A checker that cannot read the files reports modules without imports: it would find nothing to complain about.
    expect(imports).toBeGreaterThan(seen.length);
  });
});

describe("the layer check", () => {
  let folder: string;

  /** Writes one file into the copy of the project's settings. */
  const write = (path: string, text: string) => {
    mkdirSync(dirname(join(folder, path)), { recursive: true });
    writeFileSync(join(folder, path), text);
  };

  beforeAll(() => {
    folder = mkdtempSync(join(tmpdir(), "postern-layers-"));
    for (const file of [".dependency-cruiser.cjs", "tsconfig.json", "package.json"])
      cpSync(join(root, file), join(folder, file));
    symlinkSync(join(root, "node_modules"), join(folder, "node_modules"), "dir");
    write("src/units/a.ts", 'import type { B } from "../potentials/b.js";\nexport type A = B;\n');
    write("src/potentials/b.ts", 'import { c } from "../packets/c.js";\nexport type B = typeof c;\n');
    write("src/packets/c.ts", 'import { readFileSync } from "node:fs";\nexport const c = readFileSync;\n');
    write(
      "src/figures/d.ts",
      'import { PNG } from "pngjs";\nexport { e } from "./e.js";\nexport const d = PNG;\n',
    );
    write("src/figures/e.ts", 'export { d } from "./d.js";\nexport const e = 1;\n');
    write("src/strange/f.ts", "export const f = 1;\n");
    write("src/strange/k.ts", 'import "../units/a.js";\n');
    write("src/cli/g.ts", 'import "node:fs";\nimport "../strange/f.js";\nimport "./absent.js";\n');
    write("src/studies/h.ts", "export const h = 1;\n");
    write("src/stationary/i.ts", 'import "../grid/j.js";\nimport "../packets/c.js";\nimport "vitest";\n');
    write("src/grid/j.ts", 'import "../units/a.js";\n');
  });
  afterAll(() => rmSync(folder, { recursive: true, force: true }));

  it("catches a wrong import of every kind, also of a type alone", () => {
    // The target of an npm import is a file inside the package: its name is enough.
    const found = broken(cruise(folder)).map((line) =>
      line.replace(/\S*node_modules\/(?:@types\/)?([^/]+).*/, "$1"),
    );
    expect(found).toEqual([
      "browser-safe-core: src/packets/c.ts -> fs",
      "browser-safe-npm: src/figures/d.ts -> pngjs",
      "declared-packages-only: src/stationary/i.ts -> vitest",
      "known-layer-entry: src/strange/k.ts -> src/units/a.ts",
      "known-layer: src/cli/g.ts -> src/strange/f.ts",
      "layer-cli: src/cli/g.ts -> src/strange/f.ts",
      "layer-potentials: src/potentials/b.ts -> src/packets/c.ts",
      "layer-units: src/units/a.ts -> src/potentials/b.ts",
      "no-cycles: src/figures/d.ts -> src/figures/e.ts",
      "no-orphans: src/studies/h.ts -> src/studies/h.ts",
      "resolvable: src/cli/g.ts -> ./absent.js",
      "witness-independent: src/stationary/i.ts -> src/grid/j.ts",
    ]);
  });
});
