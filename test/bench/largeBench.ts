import { availableParallelism } from "node:os";
import { refitOnThreads } from "../../functions/tableWorkers.ts";
import { runJob } from "../../lib/job/run.ts";
import { FolderStore } from "../../lib/store/folderStore.ts";
import { type BenchRow, benchRow } from "./benchRow.ts";
import { packedTable } from "./packedTable.ts";
import { inTemporaryFolder } from "./temporaryFolder.ts";

const width = 1000;
const smallTables = 4;
const asOf = "2026-11-30T06:00:00Z";

interface Measured {
  readonly seconds: number;
  readonly rate: number;
  readonly megabytes: number;
}

/** One first run over so many packed tables in a new folder, on all cores; the tables repeat after a few. */
function measure(tables: number, texts: readonly Uint8Array[]): Promise<Measured> {
  return inTemporaryFolder(async (folder) => {
    const store = new FolderStore(folder);
    for (let table = 0; table < tables; table++)
      await store.write(`series/packed${table}.csv`, texts[table % texts.length]);
    const refit = refitOnThreads(folder, availableParallelism());
    const began = performance.now();
    const { series, failed, left } = await runJob({ store, asOf, webhooks: [], refit });
    const seconds = (performance.now() - began) / 1000;
    if (series !== tables * width || failed.length + left.length > 0)
      throw new Error(`${series} series of ${tables * width}, ${failed.length} tables failed`);
    return { seconds, rate: series / seconds, megabytes: process.resourceUsage().maxRSS / 1024 };
  });
}

/**
 * `bench large [--data N]`, a hundred thousand unless told: weekly series, n = 261, in tables of a thousand, on as many
 * threads as there are cores, against a small run in the same process. A quarter of an hour and more.
 */
export async function largeBench(series = 100_000): Promise<BenchRow[]> {
  const texts = Array.from({ length: smallTables }, (_, seed) =>
    new TextEncoder().encode(packedTable(width, 261, 7 + seed)),
  );
  const small = await measure(smallTables, texts);
  const large = await measure(Math.ceil(series / width), texts);
  return [
    benchRow(`${smallTables * width} series in ${smallTables} tables`, small.rate, "series/s"),
    benchRow(`${series} series in tables of ${width}`, large.rate, "series/s", {
      against: "the small run",
      ratio: large.rate / small.rate,
      goal: "at least 0.8",
    }),
    benchRow("time of the large run", large.seconds, "s"),
    benchRow("largest memory, all threads", large.megabytes, "MB", { goal: "at most 1500" }),
  ];
}
