import { runJob } from "../../lib/job/run.ts";
import { MemoryStore } from "../support/memoryStore.ts";
import { type BenchRow, benchRow } from "./benchRow.ts";
import { costTable, type Measured, monthlyCost, scenarios } from "./costs.ts";
import { packedTable } from "./packedTable.ts";
import prices from "./prices.json" with { type: "json" };

const tables = 2;
const seriesPerTable = 100;

type Kind = "puts" | "gets" | "lists";

/** A store in memory that counts its calls by kind, as S3 charges them: those of tables apart from those of the run. */
class CountingStore extends MemoryStore {
  ofTables: Record<Kind, number> = { puts: 0, gets: 0, lists: 0 };
  ofRun: Record<Kind, number> = { puts: 0, gets: 0, lists: 0 };
  #count(key: string, kind: Kind): void {
    (/^(models|forecasts|series)\/./.test(key) ? this.ofTables : this.ofRun)[kind]++;
  }
  override read(key: string) {
    this.#count(key, "gets");
    return super.read(key);
  }
  override stream(key: string) {
    this.#count(key, "gets");
    return super.stream(key);
  }
  override create(key: string, bytes: Uint8Array) {
    this.#count(key, "puts");
    return super.create(key, bytes);
  }
  override write(key: string, bytes: Uint8Array) {
    this.#count(key, "puts");
    return super.write(key, bytes);
  }
  override list(prefix: string) {
    this.#count(prefix, "lists");
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
  await lay(259);
  await runJob({ store, asOf: "2026-11-23T06:00:00Z", webhooks: [] });
  await lay(260);
  const before = { all: size(store), runs: size(store, "runs/") };
  store.ofTables = { puts: 0, gets: 0, lists: 0 };
  store.ofRun = { puts: 0, gets: 0, lists: 0 };
  // Time of the processor, so that what else the machine does is not counted.
  const began = process.cpuUsage();
  await runJob({ store, asOf: "2026-11-30T06:00:00Z", webhooks: [] });
  const { user, system } = process.cpuUsage(began);
  const ofRun = size(store, "runs/") - before.runs;
  const perTable = (kind: Kind) => store.ofTables[kind] / tables;
  return {
    millisecondsPerSeries: (user + system) / 1000 / (tables * seriesPerTable),
    requestsPerTable: { puts: perTable("puts"), gets: perTable("gets"), lists: perTable("lists") },
    requestsPerRun: store.ofRun,
    bytesPerSeries: (size(store) - before.all - ofRun) / (tables * seriesPerTable),
    bytesPerRun: ofRun,
    millisecondsPerRequest: 20,
  };
}

const size = (store: MemoryStore, prefix = "") =>
  [...store.objects].reduce((sum, [key, bytes]) => sum + (key.startsWith(prefix) ? bytes.length : 0), 0);

/** Prints the README's cost table from what a run takes here and the dated price file. */
export async function costBench(): Promise<BenchRow[]> {
  const measured = await measure();
  console.log(`\nMeasured here: ${JSON.stringify(measured)}`);
  console.log(`Prices: ${prices.region}, ${prices.date}, before free tiers\n`);
  console.log(`${costTable(measured, prices)}\n`);
  return scenarios.map((scenario) =>
    benchRow(scenario.name, monthlyCost(scenario, measured, prices).total, "USD a month"),
  );
}
