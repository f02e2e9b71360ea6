import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { CreateBucketCommand, S3Client } from "@aws-sdk/client-s3";
import { runJob } from "../../lib/job/run.ts";
import { FolderStore } from "../../lib/store/folderStore.ts";
import type { ObjectStore } from "../../lib/store/objectStore.ts";
import { S3Store } from "../../lib/store/s3Store.ts";
import { cephInstalled, startGateway } from "../support/cephGateway.ts";
import { forecastFaults } from "../support/completeForecasts.ts";
import type { BenchRow } from "./benchRow.ts";

const encode = (text: string) => new TextEncoder().encode(text);
const horizon = 8;

/** Monday `index` weeks after 4 January 2010, as an ISO date. */
const weekOf = (index: number) =>
  new Date(Date.UTC(2010, 0, 4) + index * 7 * 86_400_000).toISOString().slice(0, 10);

/** A wide weekly table of AR(1) series around 200, from a fixed seed. */
function weeklyTable(series: number, weeks: number, seed: number): string {
  let state = seed >>> 0;
  const uniform = () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0; // Numerical Recipes' linear congruential generator
    return state / 2 ** 32;
  };
  const deviations = new Float64Array(series);
  const names = Array.from({ length: series }, (_, index) => `s${index}`);
  const rows = Array.from({ length: weeks }, (_, week) => {
    const cells = Array.from(deviations, (deviation, index) => {
      const shock = 10 * (uniform() + uniform() + uniform() - 1.5);
      deviations[index] = (0.2 + 0.7 * (index / series)) * deviation + shock;
      return (200 + deviations[index]).toFixed(1);
    });
    return `${weekOf(week)},${cells.join(",")}`;
  });
  return [`week,${names.join(",")}`, ...rows, ""].join("\n");
}

/** Counts what a run asks of its store. */
function counting(store: ObjectStore): ObjectStore & { calls: number } {
  const count = <T>(answer: T): T => {
    counted.calls++;
    return answer;
  };
  const counted = {
    calls: 0,
    address: store.address,
    read: (key: string) => count(store.read(key)),
    stream: (key: string) => count(store.stream(key)),
    create: (key: string, bytes: Uint8Array) => count(store.create(key, bytes)),
    write: (key: string, bytes: Uint8Array) => count(store.write(key, bytes)),
    list: (prefix: string) => count(store.list(prefix)),
  };
  return counted;
}

async function inFolder<T>(work: (store: ReturnType<typeof counting>) => Promise<T>): Promise<T> {
  const folder = mkdtempSync(join(tmpdir(), "ebbwire-bench-"));
  try {
    return await work(counting(new FolderStore(folder)));
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** The same on a bucket of a gateway on this machine; `undefined` where Ceph is not installed. */
async function onBucket<T>(work: (store: ReturnType<typeof counting>) => Promise<T>): Promise<T | undefined> {
  if (!cephInstalled()) return undefined;
  const { gateway, stop } = await startGateway();
  try {
    process.env.AWS_ACCESS_KEY_ID = gateway.accessKey;
    process.env.AWS_SECRET_ACCESS_KEY = gateway.secretKey;
    process.env.AWS_REGION = "us-east-1";
    const client = new S3Client({ endpoint: gateway.endpoint, forcePathStyle: true });
    await client.send(new CreateBucketCommand({ Bucket: "bench" }));
    return await work(counting(new S3Store("bench", "", { endpoint: gateway.endpoint })));
  } finally {
    await stop();
  }
}

async function timed<T>(work: () => Promise<T>): Promise<{ seconds: number; result: T }> {
  const began = performance.now();
  const result = await work();
  return { seconds: (performance.now() - began) / 1000, result };
}

const row = (name: string, value: number, unit: string, rest: Partial<BenchRow> = {}): BenchRow => ({
  name,
  value,
  unit,
  against: "",
  ratio: Number.NaN,
  goal: "",
  ...rest,
});

const packedWidth = 100;
const at = (week: number) => `${weekOf(week)}T06:00:00Z`;

async function fillPacked(store: ObjectStore, tables: number, width: number): Promise<void> {
  for (let table = 0; table < tables; table++)
    await store.write(`series/packed${table}.csv`, encode(weeklyTable(width, 261, 7 + table)));
}

/** Runs first without and then with the newest week; says the rate of both and the calls of the second. */
async function packedRuns(store: ReturnType<typeof counting>, tables: number, width: number) {
  await fillPacked(store, tables, width);
  const first = await timed(() => runJob({ store, asOf: at(260), webhooks: [] }));
  store.calls = 0;
  const second = await timed(() => runJob({ store, asOf: at(261), webhooks: [] }));
  const series = tables * width;
  return { first: series / first.seconds, second: series / second.seconds, calls: store.calls };
}

/** The whole job on tables of 100 weekly series, n = 260: first run, then a second one with one new week. */
async function packedRows(): Promise<BenchRow[]> {
  const tables = 3;
  await inFolder((store) => packedRuns(store, 1, 20)); // warm up
  const one = await inFolder((store) => packedRuns(store, 1, packedWidth));
  const folder = await inFolder((store) => packedRuns(store, tables, packedWidth));
  const rows = [
    row("first run, 100 series a table, n = 260", folder.first, "series/s", { goal: "at least 80 a core" }),
    row("second run with one new week", folder.second, "series/s", {
      against: "first run",
      ratio: folder.second / folder.first,
      goal: "at least 3 times",
    }),
    row("object calls of a run", one.calls, "calls for one table"),
    row("object calls for each further table", (folder.calls - one.calls) / (tables - 1), "calls", {
      goal: "at most 8",
    }),
    row("largest memory", process.resourceUsage().maxRSS / 1024, "MB"),
  ];
  const bucket = await onBucket((store) => packedRuns(store, tables, packedWidth));
  if (bucket)
    rows.push(
      row("first run on a bucket", bucket.first, "series/s", {
        against: "folder",
        ratio: bucket.first / folder.first,
        goal: "at least 0.85",
      }),
    );
  return rows;
}

/** Every series of a JSON-lines file (`{id, values}`) as a table of its own: all must forecast completely. */
async function fileRows(path: string): Promise<BenchRow[]> {
  const lines = readFileSync(path, "utf8").trim().split("\n");
  return inFolder(async (store) => {
    for (const line of lines) {
      const { id, values } = JSON.parse(line) as { id: string; values: (number | null)[] };
      const rows = values.map((value, index) => `${weekOf(index)},${value ?? ""}`);
      await store.write(`series/${id}.csv`, encode(["week,value", ...rows, ""].join("\n")));
    }
    const { seconds, result } = await timed(() =>
      runJob({ store, asOf: "2099-01-01T00:00:00Z", webhooks: [] }),
    );
    let faults = 0;
    for (const line of lines) {
      const file = await store.read(`forecasts/${JSON.parse(line).id}/latest.csv`);
      faults += forecastFaults(new TextDecoder().decode(file?.bytes), ["value"], horizon).length;
    }
    return [
      row("series of the file forecast", result.series, "series", {
        against: "in the file",
        ratio: result.series / lines.length,
      }),
      row("failed tables", result.failed.length, "tables", { goal: "0" }),
      row("faults in forecast files", faults, "faults", { goal: "0" }),
      row("time for all of them", seconds, "s"),
    ];
  });
}

/** `bench job [--data PATH]`. */
export async function jobBench(path?: string): Promise<BenchRow[]> {
  return [...(await packedRows()), ...(path ? await fileRows(path) : [])];
}
