// Run by atomic.test.ts: writes two files of 300 kB into a folder, once or again and again until it is ended.
import { OutputError, writeFolder } from "../../src/files/atomic.js";

const [folder, mode] = process.argv.slice(2);

async function main(): Promise<void> {
  for (let round = 1; ; round++) {
    const content = new Uint8Array(3e5).fill(round % 256);
    await writeFolder(folder, { "a.bin": content, "b.bin": content });
    if (mode === "once") return;
    if (round === 1) console.log("writing");
  }
}

main().catch((error) => {
  console.error(error.message);
  process.exitCode = error instanceof OutputError ? 2 : 1;
});
