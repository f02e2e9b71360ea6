import { gunzipSync } from "node:zlib";
import { describe, expect, it } from "vitest";
import { latestForecastKey, modelKey, packedModelKey } from "../../lib/job/keys.ts";
import type { ModelDocument } from "../../lib/job/modelDocument.ts";
import { readFacts } from "../../lib/job/readBack.ts";
import { runJob } from "../../lib/job/run.ts";
import { packedTable } from "../bench/packedTable.ts";
import { MemoryStore } from "../support/memoryStore.ts";

const asOf = "2026-11-30T06:00:00Z";
const earlier = "2026-11-23T06:00:00Z";

const write = (store: MemoryStore, rows: readonly string[]) =>
  store.write("series/wide.csv", new TextEncoder().encode(`${rows.join("\n")}\n`));

describe("a table of fifty series", () => {
  it("has its models compressed, is gone on from, repeated without a change, and read back", async () => {
    const store = new MemoryStore();
    const rows = packedTable(50, 70, 3).trim().split("\n");
    await write(store, rows.slice(0, -1));
    await runJob({ store, asOf: earlier, webhooks: [] });
    await write(store, rows);
    const summary = await runJob({ store, asOf, webhooks: [] });
    expect(summary).toMatchObject({ tables: 1, series: 50, failed: [], left: [] });

    const stored = await store.read(packedModelKey("wide", asOf));
    const model = JSON.parse(gunzipSync(stored?.bytes ?? "").toString()) as ModelDocument;
    expect(model.series).toHaveLength(50);
    // The second run went on from the first: it compares with it, and scored its first forecasts.
    expect(model.series[7].facts.comparison?.since).toBe(earlier);
    expect(model.series[7].facts.trackRecord?.forecasts).toBeGreaterThan(0);
    expect(await store.read(modelKey("wide", asOf))).toBeUndefined();
    expect((await readFacts(store, "wide", asOf))?.series).toEqual(model.series.map(({ facts }) => facts));

    const before = store.texts();
    expect(await runJob({ store, asOf, webhooks: [] })).toMatchObject({ tables: 1, series: 50 });
    expect(store.texts()).toEqual(before);
    expect(before[latestForecastKey("wide")].split("\n")).toHaveLength(1 + 50 * 8 + 1);
  });

  it("goes on from models of a time when it had fewer series", async () => {
    const store = new MemoryStore();
    const rows = packedTable(50, 70, 3).trim().split("\n");
    const narrow = rows.slice(0, -1).map((row) => row.split(",").slice(0, 50).join(","));
    await write(store, narrow);
    await runJob({ store, asOf: earlier, webhooks: [] });
    expect(await store.read(modelKey("wide", earlier))).toBeDefined();
    await write(store, rows);
    await runJob({ store, asOf, webhooks: [] });
    const facts = await readFacts(store, "wide", asOf);
    expect(facts?.series.map(({ comparison }) => comparison?.since ?? "none")).toEqual([
      ...Array(49).fill(earlier),
      "none",
    ]);
  });
});
