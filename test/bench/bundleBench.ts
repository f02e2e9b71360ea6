import { execFile } from "node:child_process";
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { promisify } from "node:util";
import { gzipSync } from "node:zlib";
import { FolderStore } from "../../lib/store/folderStore.ts";
import { type FunctionName, functionBundles } from "../support/functionBundles.ts";
import { hasLambdaRuntime, node24 } from "../support/lambdaRuntime.ts";
import { type BenchRow, benchRow } from "./benchRow.ts";
import { packedTable } from "./packedTable.ts";
import { inTemporaryFolder } from "./temporaryFolder.ts";

const run = promisify(execFile);
const names: readonly FunctionName[] = ["Scheduled", "Portion", "Closing"];
/** The runtime's Node where it is installed, else this one. */
const node = hasLambdaRuntime ? node24 : process.execPath;
const repeats = 9;

const row = (name: string, value: number, unit: string, goal = ""): BenchRow =>
  benchRow(name, value, unit, { goal });

/** Milliseconds to import a bundle in a new process, by the clock and of the processor: the medians of several. */
async function importMilliseconds(file: string): Promise<{ clock: number; processor: number }> {
  const script = `
    const began = performance.now();
    const cpu = process.cpuUsage();
    await import(${JSON.stringify(pathToFileURL(file).href)});
    const { user, system } = process.cpuUsage(cpu);
    console.log(JSON.stringify([performance.now() - began, (user + system) / 1000]));`;
  const times: [number, number][] = [];
  for (let count = 0; count < repeats; count++) {
    const { stdout } = await run(node, ["--input-type=module", "-e", script]);
    times.push(JSON.parse(stdout));
  }
  const median = (which: 0 | 1) =>
    times.map((pair) => pair[which]).sort((a, b) => a - b)[Math.floor(repeats / 2)];
  return { clock: median(0), processor: median(1) };
}

/** The scheduled bundle does a whole run of 100 series in a process of its own: time and largest memory. */
function hundredSeries(
  file: string,
): Promise<{ milliseconds: number; processor: number; megabytes: number }> {
  return inTemporaryFolder(async (folder) => {
    const store = new FolderStore(folder);
    for (let table = 0; table < 4; table++)
      await store.write(
        `series/table${table}.csv`,
        new TextEncoder().encode(packedTable(25, 260, 11 + table)),
      );
    const script = `
      const { handler } = await import(${JSON.stringify(pathToFileURL(file).href)});
      const began = performance.now();
      const answer = await handler({ asOf: "now" }, { awsRequestId: "bench", getRemainingTimeInMillis: () => 900000 });
      if (answer.series !== 100 || answer.failedCount > 0) throw new Error(JSON.stringify(answer));
      console.error(JSON.stringify({ milliseconds: performance.now() - began, processor: process.cpuUsage().user / 1000, megabytes: process.resourceUsage().maxRSS / 1024 }));`;
    const { stderr } = await run(node, ["--input-type=module", "-e", script], {
      env: { EBBWIRE_STORE: folder, EBBWIRE_DEPLOYMENT: "bench" },
      maxBuffer: 1e8,
    });
    return JSON.parse(stderr.trim().split("\n").at(-1) ?? "");
  });
}

/** Size of each deployed bundle, time to import it, and memory and time of a run of 100 series in it. */
export async function bundleBench(): Promise<BenchRow[]> {
  const { folders, remove } = await functionBundles();
  try {
    const version = (await run(node, ["--version"])).stdout.trim();
    const rows: BenchRow[] = [];
    for (const name of names) {
      const file = join(folders[name], "index.mjs");
      const bytes = readFileSync(file);
      const { clock, processor } = await importMilliseconds(file);
      rows.push(
        row(`${name}: bundle`, bytes.length / 1000, "KB", "at most 600"),
        row(`${name}: bundle, gzipped`, gzipSync(bytes).length / 1000, "KB"),
        row(`${name}: import on Node ${version}`, clock, "ms", "at most 250"),
        row(`${name}: import, processor time`, processor, "ms"),
      );
    }
    const { milliseconds, processor, megabytes } = await hundredSeries(join(folders.Scheduled, "index.mjs"));
    rows.push(
      row("run of 100 series in the bundle", milliseconds, "ms"),
      row("its processor time, import included", processor, "ms"),
      row("its largest memory", megabytes, "MB", "at most 256"),
    );
    return rows;
  } finally {
    await remove();
  }
}
