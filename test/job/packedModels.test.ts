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

  it("is compressed from the run on that follows one of many series, whatever the table holds by then", async () => {
    const store = new MemoryStore();
    const rows = packedTable(50, 72, 3).trim().split("\n");
    const narrow = (count: number) =>
      rows.slice(0, count).map((row) => row.split(",").slice(0, 50).join(","));
    const keys = (week: string) =>
      Object.keys(store.texts()).filter((key) => key.startsWith(`models/wide/${week}`));
    const run = async (lines: readonly string[], at: string) => {
      await write(store, lines);
      await runJob({ store, asOf: at, webhooks: [] });
    };
    await run(narrow(71), "2026-11-16T06:00:00Z"); // 49 series
    await run(rows.slice(0, 72), earlier); // 50, after 49
    await run(narrow(73), asOf); // 49 again, after 50
    expect(keys("2026-11-16")).toEqual([modelKey("wide", "2026-11-16T06:00:00Z")]);
    expect(keys("2026-11-23")).toEqual([modelKey("wide", earlier)]);
    expect(keys("2026-11-30")).toEqual([packedModelKey("wide", asOf)]);
    expect((await readFacts(store, "wide", asOf))?.series.map((one) => one.comparison?.since)).toEqual(
      Array(49).fill(earlier),
    );
  });
});
