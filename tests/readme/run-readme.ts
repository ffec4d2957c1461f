/**
 * Runs what README.md shows, in a fresh copy of the project: every command of its `sh` blocks that starts with
 * `npx postern`, `postern` or `npm`, and every `js` block that imports postern. A command may end in `# exit N` when
 * it is meant to end with another code than 0. Exits 1 when one of them ends otherwise, or when there is none at all.
 */
import { spawnSync } from "node:child_process";
import { chmodSync, cpSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { delimiter, dirname, join, resolve } from "node:path";
import { fileURLToPath } from "node:url";

/** Commands that belong to a README but not to this check, and why. */
const ELSEWHERE: readonly (readonly [RegExp, string])[] = [
  [/^npm (?:ci|install|i)\b/, "the copy was installed already"],
  [/^npm (?:test|run test\S*)\b/, "a section of its own in .ci/run"],
  [/^npm run bench\b/, "measures speed, which this machine may not have to itself"],
];
const RUN = /^(?:npx postern|postern|npm)(?:\s|$)/;

interface ReadmeCommand {
  readonly line: number;
  readonly command: string;
  readonly exit: number;
}
interface Block {
  readonly line: number;
  readonly language: string;
  readonly text: string;
}

/** The fenced blocks of a Markdown text; `line` is that of the block's first line of content. */
function fencedBlocks(markdown: string): Block[] {
  return [...markdown.matchAll(/^```(\w+)[^\n]*\n([\s\S]*?)^```/gm)].map((match) => ({
    line: markdown.slice(0, match.index).split("\n").length + 1,
    language: match[1],
    text: match[2],
  }));
}

/** The commands of a shell block, continued lines joined, comment lines and a leading "$ " dropped. */
function shellCommands({ line, text }: Pick<Block, "line" | "text">): ReadmeCommand[] {
  const commands: ReadmeCommand[] = [];
  let open = "";
  let openLine = line;
  text.split("\n").forEach((row, index) => {
    if (open === "") openLine = line + index;
    open += row.replace(/^\$ /, "");
    if (open.endsWith("\\")) {
      open = open.slice(0, -1);
      return;
    }
    const exit = /#\s*exit (\d+)\s*$/.exec(open);
    const command = (exit ? open.slice(0, exit.index) : open).trim();
    if (command !== "" && !command.startsWith("#"))
      commands.push({ line: openLine, command, exit: exit ? Number(exit[1]) : 0 });
    open = "";
  });
  return commands;
}

/** Copies what git would take (committed or not yet) into a new folder and installs it there as a user would. */
function freshCopy(root: string): string {
  const list = spawnSync("git", ["ls-files", "-z", "--cached", "--others", "--exclude-standard"], {
    cwd: root,
    encoding: "utf8",
  });
  if (list.status !== 0) throw new Error(`git ls-files: ${list.stderr}`);
  const copy = mkdtempSync(join(tmpdir(), "postern-readme-"));
  for (const file of list.stdout.split("\0").filter((name) => name !== "")) {
    mkdirSync(dirname(join(copy, file)), { recursive: true });
    cpSync(join(root, file), join(copy, file));
  }
  const install = spawnSync("npm", ["ci", "--prefer-offline"], { cwd: copy, encoding: "utf8" });
  if (install.status !== 0) throw new Error(`npm ci in the copy: ${install.stdout}${install.stderr}`);
  const shim = join(copy, "node_modules", ".bin", "postern");
  writeFileSync(shim, `#!/bin/sh\nexec node "${join(copy, "dist", "cli", "main.js")}" "$@"\n`);
  chmodSync(shim, 0o755);
  return copy;
}

/** Runs one program in the copy; says what it did, and all that it printed when it ended with the wrong code. */
function runs(copy: string, label: string, program: string, args: readonly string[], exit: number): boolean {
  const from = performance.now();
  const run = spawnSync(program, args, {
    cwd: copy,
    encoding: "utf8",
    timeout: 300_000,
    env: { ...process.env, PATH: `${join(copy, "node_modules", ".bin")}${delimiter}${process.env.PATH}` },
  });
  const good = run.status === exit;
  const seconds = ((performance.now() - from) / 1000).toFixed(1);
  console.log(
    `${good ? "ok    " : "FAILED"} ${label}  (exit ${run.status ?? run.signal}, ${exit} expected, ${seconds} s)`,
  );
  if (!good) console.log(`${run.stdout}${run.stderr}`);
  return good;
}

function main(): number {
  const root = resolve(dirname(fileURLToPath(import.meta.url)), "..", "..");
  const blocks = fencedBlocks(readFileSync(join(root, "README.md"), "utf8"));
  const copy = freshCopy(root);
  let passed = 0;
  let failed = 0;
  const count = (good: boolean) => (good ? passed++ : failed++);
  try {
    for (const block of blocks.filter(({ language }) => language === "sh"))
      for (const { line, command, exit } of shellCommands(block)) {
        const reason = RUN.test(command)
          ? ELSEWHERE.find(([pattern]) => pattern.test(command))?.[1]
          : "no command of this project";
        if (reason) console.log(`not run: line ${line}: ${command}  (${reason})`);
        else count(runs(copy, `line ${line}: ${command}`, "bash", ["-o", "pipefail", "-c", command], exit));
      }
    for (const block of blocks.filter(
      ({ language, text }) => language === "js" && text.includes('from "postern'),
    )) {
      const file = join(copy, `readme-line-${block.line}.mjs`);
      writeFileSync(file, block.text);
      count(runs(copy, `line ${block.line}: js block`, process.execPath, [file], 0));
    }
  } finally {
    rmSync(copy, { recursive: true, force: true });
  }
  console.log(`README.md: ${passed} passed, ${failed} failed`);
  if (passed === 0) console.log("README.md shows no command that could be run: that cannot be right");
  return failed === 0 && passed > 0 ? 0 : 1;
}

process.exitCode = main();
