import { type ChildProcessWithoutNullStreams, spawn, spawnSync } from "node:child_process";
import { createInterface } from "node:readline";
import { fileURLToPath } from "node:url";

export interface PythonVersions {
  readonly python: string;
  readonly numpy: string;
  readonly scipy: string;
}

/** Interpreters to try, in this order: the distribution's own first. */
const CANDIDATES = ["/usr/bin/python3", "python3"];

/** Settings that pin NumPy's linear algebra to another kind of processor or cache; the reference is to run as it likes. */
const environment = { ...process.env };
delete environment.OPENBLAS_CORETYPE;
delete environment.OPENBLAS_L2_SIZE;

/** The first interpreter that runs `code` without a fault, or undefined. */
export function interpreterFor(code: string): string | undefined {
  return CANDIDATES.find((python) => spawnSync(python, ["-c", code], { env: environment }).status === 0);
}

/** A running python-reference.py. */
export class PythonReference {
  private constructor(
    private readonly child: ChildProcessWithoutNullStreams,
    private readonly lines: AsyncIterator<string>,
    readonly versions: PythonVersions,
  ) {}

  /** Starts it on a problem; undefined when no interpreter has NumPy and SciPy. */
  static async start(setup: object): Promise<PythonReference | undefined> {
    const python = interpreterFor("import numpy, scipy.linalg");
    if (python === undefined) return undefined;
    const script = fileURLToPath(new URL("python-reference.py", import.meta.url));
    const child = spawn(python, [script], { env: environment });
    child.stderr.pipe(process.stderr);
    const lines = createInterface({ input: child.stdout })[Symbol.asyncIterator]();
    const reference = new PythonReference(child, lines, await answer<PythonVersions>(lines));
    child.stdin.write(`${JSON.stringify(setup)}\n`);
    return reference;
  }

  /** Advances one of its states ("cn" or "fft") and says how long that took and where the packet's mean is now. */
  advance(name: "cn" | "fft", count: number): Promise<{ seconds: number; meanNm: number }> {
    this.child.stdin.write(`${name} ${count}\n`);
    return answer(this.lines);
  }

  stop(): void {
    this.child.stdin.end();
  }
}

async function answer<T>(lines: AsyncIterator<string>): Promise<T> {
  const line = await lines.next();
  if (line.done) throw new Error("the Python reference ended early; its message stands above");
  return JSON.parse(line.value) as T;
}
