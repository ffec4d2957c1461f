import { spawnSync } from "node:child_process";
import { fileURLToPath } from "node:url";
import { StepServer } from "./step-server.js";

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

/** A running python-reference.py on a problem; undefined when no interpreter has NumPy and SciPy. */
export async function startPython(setup: object): Promise<StepServer<PythonVersions> | undefined> {
  const python = interpreterFor("import numpy, scipy.linalg");
  if (python === undefined) return undefined;
  const script = fileURLToPath(new URL("python-reference.py", import.meta.url));
  const server = await StepServer.start<PythonVersions>(python, [script], environment);
  server.send(JSON.stringify(setup));
  return server;
}
