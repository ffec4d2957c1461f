import { spawn, spawnSync } from "node:child_process";
import { existsSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll } from "vitest";

export const root = resolve(dirname(fileURLToPath(import.meta.url)), "..", "..");
const program = join(root, "dist", "cli", "main.js");
if (!existsSync(program)) throw new Error("dist/ is missing: npm test builds it, and so does npm run build");

/** How the real program ended. */
export interface Ended {
  readonly code: number | null;
  readonly out: string;
  readonly err: string;
}

const env = { ...process.env, NO_COLOR: "1", LC_ALL: "C.UTF-8", TERM: "xterm" };

/** A folder of its own for a test file, removed at the end; the program runs in it, so that messages show short names. */
export function workplace() {
  const folder = mkdtempSync(join(tmpdir(), "postern-cli-"));
  afterAll(() => rmSync(folder, { recursive: true, force: true }));
  return {
    folder,
    path: (name: string) => join(folder, name),
    write(name: string, content: string | Uint8Array): string {
      writeFileSync(join(folder, name), content);
      return name;
    },
    postern(...args: string[]): Ended {
      const run = spawnSync(process.execPath, [program, ...args], { cwd: folder, encoding: "utf8", env });
      return { code: run.status, out: run.stdout, err: run.stderr };
    },
    /** The same through a shell, where `postern` is the program. */
    shell(command: string): Ended {
      const script = `postern() { "${process.execPath}" "${program}" "$@"; }\n${command}`;
      const run = spawnSync("bash", ["-c", script], { cwd: folder, encoding: "utf8", env });
      return { code: run.status, out: run.stdout, err: run.stderr };
    },
    start: (...args: string[]) => spawn(process.execPath, [program, ...args], { cwd: folder, env }),
  };
}

export const RECTANGULAR = `title: Rectangular barrier
particle: { mass: 0.067 m_e }
potential: { shape: rectangular, height: 0.3 eV, width: 5 nm }
packet: { energy: 0.15 eV, width: 10 nm }
`;

/**
 * Transmission of RECTANGULAR: integral |phi(k)|^2 T(k) dk with the closed form of T(k) (L. D. Landau and E. M. Lifshitz,
 * Quantum Mechanics, par. 25, problem 2; citation from memory), by adaptive quadrature at 30 digits.
 */
export const RECTANGULAR_TRANSMISSION = 0.02662290308416971;

/** Far too coarse: wrong by tens of per cents. */
export const COARSE = `${RECTANGULAR}numerics: { stepper: split-operator, order: 2, step: 0.4 nm, timeStep: 0.4 fs }
`;
