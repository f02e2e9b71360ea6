import { execFileSync } from "node:child_process";
import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { CreateBucketCommand, S3Client } from "@aws-sdk/client-s3";
import { runJob } from "../../lib/job/run.ts";
import { FolderStore } from "../../lib/store/folderStore.ts";
import type { ObjectStore } from "../../lib/store/objectStore.ts";
import { S3Store } from "../../lib/store/s3Store.ts";
import { cephInstalled, startGateway } from "../support/cephGateway.ts";
import { forecastFaults } from "../support/completeForecasts.ts";
import { type BenchRow, benchRow } from "./benchRow.ts";
import { packedTable } from "./packedTable.ts";
import { inTemporaryFolder } from "./temporaryFolder.ts";

const encode = (text: string) => new TextEncoder().encode(text);
const horizon = 8;

/** Monday `index` weeks after 4 January 2010, as an ISO date. */
const weekOf = (index: number) =>
  new Date(Date.UTC(2010, 0, 4) + index * 7 * 86_400_000).toISOString().slice(0, 10);

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

const inFolder = <T>(work: (store: ReturnType<typeof counting>) => Promise<T>): Promise<T> =>
  inTemporaryFolder((folder) => work(counting(new FolderStore(folder))));

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

/** How long a piece of work took: by the clock, and of the processor on all threads. */
async function timed<T>(work: () => Promise<T>): Promise<{ seconds: number; processor: number; result: T }> {
  const began = performance.now();
  const cpu = process.cpuUsage();
  const result = await work();
  const { user, system } = process.cpuUsage(cpu);
  return { seconds: (performance.now() - began) / 1000, processor: (user + system) / 1e6, result };
}

const packedWidth = 100;

/** Weekly tables, all but the newest of their 261 weeks, or with it. */
async function fillPacked(store: ObjectStore, tables: number, width: number, newest: boolean): Promise<void> {
  for (let table = 0; table < tables; table++) {
    const rows = packedTable(width, 261, 7 + table)
      .trimEnd()
      .split("\n");
    await store.write(
      `series/packed${table}.csv`,
      encode(`${(newest ? rows : rows.slice(0, -1)).join("\n")}\n`),
    );
  }
}

/** Runs first without and then with the newest week; says the rates of both and the calls of the second. */
async function packedRuns(store: ReturnType<typeof counting>, tables: number, width: number) {
  const series = tables * width;
  await fillPacked(store, tables, width, false);
  const first = await timed(() => runJob({ store, asOf: "2026-11-23T06:00:00Z", webhooks: [] }));
  await fillPacked(store, tables, width, true);
  store.calls = 0;
  const second = await timed(() => runJob({ store, asOf: "2026-11-30T06:00:00Z", webhooks: [] }));
  return {
    first: series / first.seconds,
    second: series / second.seconds,
    firstPerProcessor: series / first.processor,
    secondPerProcessor: series / second.processor,
    calls: store.calls,
  };
}

/**
 * The whole job on tables of 100 weekly series, n = 260: first run, then a second one with one new week. Rates by the
 * processor's time do not count what else the machine does.
 */
async function packedRows(): Promise<BenchRow[]> {
  const tables = 5;
  await inFolder((store) => packedRuns(store, 1, packedWidth)); // warm up
  const one = await inFolder((store) => packedRuns(store, 1, packedWidth));
  const folder = await inFolder((store) => packedRuns(store, tables, packedWidth));
  const native = nativeRate(packedTable(packedWidth, 260, 7));
  const goal = "at least 80";
  const rows = [
    benchRow("first run, 100 series a table, n = 260", folder.first, "series/s", { goal }),
    benchRow("the same by the processor's time", folder.firstPerProcessor, "series/s", { goal }),
    ...(native === undefined
      ? []
      : [
          benchRow("first run, by the processor's time", folder.firstPerProcessor, "series/s", {
            against: `native R, ar + arima(method = "ML") + predict: ${native.toFixed(2)} series/s`,
            ratio: folder.firstPerProcessor / native,
            goal: "at least 25 times",
          }),
        ]),
    benchRow("second run with one new week", folder.second, "series/s", {
      against: "first run",
      ratio: folder.second / folder.first,
      goal: "at least 3 times",
    }),
    benchRow("the same by the processor's time", folder.secondPerProcessor, "series/s", {
      against: "first run",
      ratio: folder.secondPerProcessor / folder.firstPerProcessor,
    }),
    benchRow("object calls of a run", one.calls, "calls for one table"),
    benchRow("object calls for each further table", (folder.calls - one.calls) / (tables - 1), "calls", {
      goal: "at most 8",
    }),
    benchRow("largest memory", process.resourceUsage().maxRSS / 1024, "MB"),
  ];
  const bucket = await onBucket((store) => packedRuns(store, tables, packedWidth));
  if (bucket)
    rows.push(
      benchRow("first run on a bucket", bucket.first, "series/s", {
        against: "folder",
        ratio: bucket.first / folder.first,
        goal: "at least 0.85",
      }),
    );
  return rows;
}

/** Series a second of the processor's time that R itself fits and forecasts; `undefined` where it is not installed. */
function nativeRate(table: string): number | undefined {
  const code = `
    table <- read.csv(text = readLines("stdin"))
    used <- system.time(for (name in names(table)[-1]) {
      values <- table[[name]]
      order <- max(1, ar(values)$order)
      fit <- try(arima(values, order = c(order, 0, 0), method = "ML"), silent = TRUE)
      if (!inherits(fit, "try-error")) predict(fit, n.ahead = ${horizon})
    })
    cat((ncol(table) - 1) / (used[["user.self"]] + used[["sys.self"]]))`;
  try {
    return Number(execFileSync("Rscript", ["-e", code], { input: table, encoding: "utf8" }));
  } catch {
    return undefined;
  }
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
      benchRow("series of the file forecast", result.series, "series", {
        against: "in the file",
        ratio: result.series / lines.length,
      }),
      benchRow("failed tables", result.failed.length, "tables", { goal: "0" }),
      benchRow("faults in forecast files", faults, "faults", { goal: "0" }),
      benchRow("time for all of them", seconds, "s"),
    ];
  });
}

/** The demo as `npm start` runs it once it is built: its store laid, sixteen weeks replayed. */
function demoRow(): Promise<BenchRow> {
  return inTemporaryFolder(async (folder) => {
    const began = performance.now();
    const program = fileURLToPath(new URL("./local.js", import.meta.url));
    execFileSync(process.execPath, [program], { cwd: folder, stdio: "ignore" });
    const seconds = (performance.now() - began) / 1000;
    return benchRow("the demo, sixteen weeks replayed", seconds, "s", { goal: "at most 20" });
  });
}

/** `bench job [--data PATH]`. */
export async function jobBench(path?: string): Promise<BenchRow[]> {
  return [...(await packedRows()), await demoRow(), ...(path ? await fileRows(path) : [])];
}
