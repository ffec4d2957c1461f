import { existsSync } from "node:fs";
import { dirname, join, resolve } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import { type Browser, chromium } from "playwright-core";
import { build } from "vite";
import { afterAll, beforeAll, describe, expect, it } from "vitest";

const root = resolve(dirname(fileURLToPath(import.meta.url)), "..", "..");
const library = join(root, "dist", "index.js");
const executablePath = process.env.CHROMIUM ?? "/usr/bin/chromium";

const DESIGN = `title: Rectangular barrier in a browser
particle: { mass: 0.067 m_e }
potential: { shape: rectangular, height: 0.3 eV, width: 5 nm }
packet: { energy: 0.15 eV, width: 10 nm }
`;

/**
 * integral |phi(k)|^2 T(k) dk with the closed-form T of the rectangular barrier (any quantum mechanics textbook), by
 * adaptive quadrature at 30 digits.
 */
const TRANSMISSION = 0.02662290308416971;

/** What both sides report of the same estimate. */
interface Answer {
  transmission: { value: number; error: number };
  verdict: string;
}

/** dist/index.js and all it needs as one script that a page can load; a module of Node in it is an error. */
async function bundle(): Promise<string> {
  const foreign: string[] = [];
  const result = await build({
    root,
    configFile: false,
    logLevel: "warn",
    plugins: [
      {
        name: "no-node-modules",
        enforce: "pre",
        resolveId(source: string, importer: string | undefined) {
          if (
            /^(?:node:|(?:fs|path|os|url|util|crypto|stream|buffer|process|child_process|worker_threads|zlib)$)/.test(
              source,
            )
          )
            foreign.push(`${source} from ${importer}`);
          return null;
        },
      },
    ],
    build: { write: false, minify: false, lib: { entry: library, formats: ["es"], fileName: "postern" } },
  });
  expect(foreign).toEqual([]);
  const output = (Array.isArray(result) ? result : [result]).flatMap((one) =>
    "output" in one ? one.output : [],
  );
  const chunks = output.filter((one) => one.type === "chunk");
  expect(chunks).toHaveLength(1);
  return chunks[0].code;
}

describe("the library in a page", () => {
  let browser: Browser;
  let code: string;

  beforeAll(async () => {
    if (!existsSync(executablePath))
      throw new Error(
        `${executablePath} is missing: install Debian's chromium, or name another one in CHROMIUM`,
      );
    code = await bundle();
    browser = await chromium.launch({
      executablePath,
      args: [
        "--no-sandbox",
        "--disable-gpu",
        "--disable-background-networking",
        "--disable-component-update",
        "--disable-sync",
        "--no-first-run",
      ],
    });
  });
  afterAll(() => browser?.close());

  it("is one script without any module of Node", () => {
    expect(code.length).toBeGreaterThan(10_000);
    expect(code).not.toMatch(/\bfrom\s*["']node:|\bimport\(\s*["']node:|\brequire\(\s*["']/);
    expect(code).not.toMatch(/__vite-browser-external/);
  });

  it("gives the transmission that Node gives", async () => {
    const page = await browser.newPage();
    const faults: string[] = [];
    page.on("pageerror", (error) => faults.push(String(error)));
    // As text, because the test runner rewrites an import() that it sees in a function.
    const inBrowser: Answer = await page.evaluate(`(async () => {
      const script = new Blob([${JSON.stringify(code)}], { type: "text/javascript" });
      const { readDesign, estimate } = await import(URL.createObjectURL(script));
      const { transmission, verdict } = await estimate(readDesign(${JSON.stringify(DESIGN)}));
      return { transmission, verdict };
    })()`);
    const { readDesign, estimate } = await import(pathToFileURL(library).href);
    const inNode: Answer = await estimate(readDesign(DESIGN));

    expect(faults).toEqual([]);
    expect(inBrowser.verdict).toBe("trusted");
    expect(inNode.verdict).toBe("trusted");
    expect(inBrowser.transmission.error).toBeGreaterThan(0);
    expect(inBrowser.transmission.error).toBeLessThan(1e-6 * TRANSMISSION);
    // Both bounds hold for the same model, so the values differ by no more than their sum.
    const difference = Math.abs(inBrowser.transmission.value - inNode.transmission.value);
    expect(difference).toBeLessThanOrEqual(inBrowser.transmission.error + inNode.transmission.error);
    expect(Math.abs(inBrowser.transmission.value - TRANSMISSION)).toBeLessThanOrEqual(
      inBrowser.transmission.error,
    );
  });
});
