import { gzipSync } from "node:zlib";
import { describe, expect, it } from "vitest";
import { runJob } from "../../lib/job/run.ts";
import { arrowTable } from "../series/corpus/parquetFiles.ts";
import { forecastFaults } from "../support/completeForecasts.ts";
import { smallTables } from "../support/jobStores.ts";
import { MemoryStore } from "../support/memoryStore.ts";

const asOf = "2026-11-30T06:00:00Z";
const encode = (text: string) => new TextEncoder().encode(text);

describe("the job", () => {
  it("forecasts a Parquet table of five days, by the simplest honest rule", async () => {
    const store = new MemoryStore();
    await store.write("series/days.parquet", arrowTable.snappy);
    await store.write("settings.json", encode('{ "tables": { "days": { "seriesName": null } } }'));
    const summary = await runJob({ store, asOf: "2026-03-06T06:00:00Z", webhooks: [] });
    expect(summary).toMatchObject({ tables: 1, series: 3, failed: [] });
    expect(forecastFaults(store.texts()["forecasts/days/latest.csv"], ["loans", "euro", "price"], 8)).toEqual(
      [],
    );
  });

  it("forecasts a gzipped table as the same table written plainly", async () => {
    const text = encode(smallTables()["series/weekly.csv"]);
    const [plain, packed] = [new MemoryStore(), new MemoryStore()];
    await plain.write("series/weekly.csv", text);
    await packed.write("series/weekly.csv.gz", gzipSync(text));
    for (const store of [plain, packed]) await runJob({ store, asOf, webhooks: [] });
    expect(packed.texts()["forecasts/weekly/latest.csv"]).toBe(plain.texts()["forecasts/weekly/latest.csv"]);
  });
});
