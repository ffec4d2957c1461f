import { type ChildProcessWithoutNullStreams, spawn } from "node:child_process";
import { createInterface } from "node:readline";

/** A process that greets with one line of JSON, then advances a state on request and says how long that took. */
export class StepServer<Greeting> {
  private constructor(
    private readonly child: ChildProcessWithoutNullStreams,
    private readonly lines: AsyncIterator<string>,
    readonly greeting: Greeting,
  ) {}

  static async start<Greeting>(
    program: string,
    args: readonly string[],
    env: NodeJS.ProcessEnv = process.env,
  ): Promise<StepServer<Greeting>> {
    const child = spawn(program, args, { env });
    child.stderr.pipe(process.stderr);
    const lines = createInterface({ input: child.stdout })[Symbol.asyncIterator]();
    return new StepServer(child, lines, await answer<Greeting>(lines));
  }

  send(line: string): void {
    this.child.stdin.write(`${line}\n`);
  }

  /** Advances one of its states ("cn" or "fft") and says how long that took and where the packet's mean is now. */
  advance(kind: "cn" | "fft", count: number): Promise<{ seconds: number; meanNm: number }> {
    this.send(`${kind} ${count}`);
    return answer(this.lines);
  }

  stop(): void {
    this.child.stdin.end();
  }
}

async function answer<T>(lines: AsyncIterator<string>): Promise<T> {
  const line = await lines.next();
  if (line.done) throw new Error("a process under test ended early; its message stands above");
  return JSON.parse(line.value) as T;
}
