import { runJob } from "../../lib/job/run.ts";
import { MemoryStore } from "../support/memoryStore.ts";
import type { BenchRow } from "./benchRow.ts";
import { costTable, type Measured, monthlyCost, scenarios } from "./costs.ts";
import { packedTable } from "./packedTable.ts";
import prices from "./prices.json" with { type: "json" };

const tables = 2;
const seriesPerTable = 100;

/** A store in memory that counts its calls by kind, as S3 charges them. */
class CountingStore extends MemoryStore {
  puts = 0;
  gets = 0;
  lists = 0;
  override read(key: string) {
    this.gets++;
    return super.read(key);
  }
  override create(key: string, bytes: Uint8Array) {
    this.puts++;
    return super.create(key, bytes);
  }
  override write(key: string, bytes: Uint8Array) {
    this.puts++;
    return super.write(key, bytes);
  }
  override list(prefix: string) {
    this.lists++;
    return super.list(prefix);
  }
}

/** A later run on packed tables, with one new week: what a deployment does every week. */
async function measure(): Promise<Measured> {
  const store = new CountingStore();
  const lay = async (weeks: number) => {
    for (let table = 0; table < tables; table++)
      await store.write(
        `series/packed${table}.csv`,
        new TextEncoder().encode(packedTable(seriesPerTable, weeks, 7 + table)),
      );
  };
  await lay(260);
  await runJob({ store, asOf: "2026-11-23T06:00:00Z", webhooks: [] });
  const before = size(store);
  store.puts = store.gets = store.lists = 0;
  const began = performance.now();
  await runJob({ store, asOf: "2026-11-30T06:00:00Z", webhooks: [] });
  const milliseconds = performance.now() - began;
  return {
    millisecondsPerSeries: milliseconds / (tables * seriesPerTable),
    putsPerTable: store.puts / tables,
    getsPerTable: store.gets / tables,
    listsPerTable: store.lists / tables,
    bytesPerSeries: (size(store) - before) / (tables * seriesPerTable),
    millisecondsPerRequest: 20,
  };
}

const size = (store: MemoryStore) =>
  [...store.objects.values()].reduce((sum, bytes) => sum + bytes.length, 0);

/** Prints the README's cost table from what a run takes here and the dated price file. */
export async function costBench(): Promise<BenchRow[]> {
  const measured = await measure();
  console.log(`\nMeasured here: ${JSON.stringify(measured)}`);
  console.log(`Prices: ${prices.region}, ${prices.date}, before free tiers\n`);
  console.log(`${costTable(measured, prices)}\n`);
  return scenarios.map((scenario) => ({
    name: scenario.name,
    value: monthlyCost(scenario, measured, prices).total,
    unit: "USD a month",
    against: "",
    ratio: Number.NaN,
    goal: "",
  }));
}
