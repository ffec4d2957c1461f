import { spawn, spawnSync } from "node:child_process";
import { readFileSync } from "node:fs";
import { interpreterFor } from "./python.js";
import { type Spread, spread } from "./rounds.js";

/** Wall time of a whole process, start-up included, in seconds, over some runs that end with one of `statuses`. */
export function wallTime(
  program: string,
  args: readonly string[],
  runs: number,
  statuses: readonly number[] = [0],
): Spread {
  const seconds: number[] = [];
  for (let i = 0; i < runs; i++) {
    const begin = performance.now();
    const run = spawnSync(program, args, { stdio: ["ignore", "ignore", "pipe"], encoding: "utf8" });
    seconds.push((performance.now() - begin) / 1000);
    if (!statuses.includes(run.status ?? -1))
      throw new Error(`${program} ${args.join(" ")}: exit ${run.status}\n${run.stderr}`);
  }
  return spread(seconds);
}

/**
 * Greatest resident memory of a process in 10^6 bytes, from the kernel's own account: through a small Python that
 * starts it, or by looking every 2 ms at /proc where there is no Python (which may miss the last 2 ms).
 */
export async function peakMemory(
  program: string,
  args: readonly string[],
): Promise<{ megabytes: number; how: string }> {
  const account = [
    "import resource, subprocess, sys",
    "code = subprocess.call(sys.argv[1:], stdout=subprocess.DEVNULL)",
    "print(resource.getrusage(resource.RUSAGE_CHILDREN).ru_maxrss)",
    "sys.exit(code)",
  ].join("\n");
  const python = interpreterFor("import resource, subprocess");
  if (python === undefined) return { megabytes: await polledPeak(program, args), how: "/proc" };
  const run = spawnSync(python, ["-c", account, program, ...args], { encoding: "utf8" });
  if (run.status !== 0) throw new Error(`${program} ${args.join(" ")}: exit ${run.status}\n${run.stderr}`);
  // Linux counts in units of 1024 bytes, macOS in bytes (getrusage(2) of either).
  const unit = process.platform === "darwin" ? 1 : 1024;
  return { megabytes: (Number(run.stdout) * unit) / 1e6, how: "getrusage" };
}

function polledPeak(program: string, args: readonly string[]): Promise<number> {
  return new Promise((resolve, reject) => {
    let peak = 0;
    const child = spawn(program, args, { stdio: "ignore" });
    const look = setInterval(() => {
      try {
        const status = readFileSync(`/proc/${child.pid}/status`, "utf8");
        peak = Math.max(peak, (Number(/VmHWM:\s+(\d+)/.exec(status)?.[1] ?? 0) * 1024) / 1e6);
      } catch {
        // The process has ended between two looks; "exit" follows.
      }
    }, 2);
    child.on("error", reject);
    child.on("exit", (code) => {
      clearInterval(look);
      if (code === 0 && peak > 0) resolve(peak);
      else reject(new Error(`${program} ${args.join(" ")}: exit ${code}, peak ${peak}`));
    });
  });
}
