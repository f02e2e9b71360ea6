import { describe, expect, it } from "vitest";
import { runJob } from "../../lib/job/run.ts";
import { FolderStore } from "../../lib/store/folderStore.ts";
import { forecastFaults } from "../support/completeForecasts.ts";
import { withR } from "../support/r.ts";
import { temporaryFolder } from "../support/temporaryFolder.ts";

// Series that come with R (package datasets), as tables a person might have.
const datasets = [
  { name: "LakeHuron", firstYear: 1875, perYear: 1 },
  { name: "lynx", firstYear: 1821, perYear: 1 },
  { name: "Nile", firstYear: 1871, perYear: 1 },
  { name: "sunspot.year", firstYear: 1700, perYear: 1 },
  { name: "co2", firstYear: 1959, perYear: 12 },
  { name: "nottem", firstYear: 1920, perYear: 12 },
  { name: "UKDriverDeaths", firstYear: 1969, perYear: 12 },
  { name: "presidents", firstYear: 1945, perYear: 4 },
] as const;

function dateOf(index: number, firstYear: number, perYear: number): string {
  const month = (index * 12) / perYear;
  return `${firstYear + Math.floor(month / 12)}-${String((month % 12) + 1).padStart(2, "0")}-01`;
}

const r = withR();

describe("the job on series that come with R", () => {
  it("forecasts each of them completely, gaps included, and reports no failure", async () => {
    const folder = await temporaryFolder();
    const store = new FolderStore(folder);
    const encode = (text: string) => new TextEncoder().encode(text);
    for (const { name, firstYear, perYear } of datasets) {
      const values = await r.evaluate(name);
      const rows = values.map(
        (value, index) => `${dateOf(index, firstYear, perYear)},${Number.isNaN(value) ? "" : value}`,
      );
      await store.create(`series/${name}.csv`, encode(["date,value", ...rows, ""].join("\n")));
    }
    const summary = await runJob({ store, asOf: "2026-11-30T06:00:00Z", webhooks: [] });
    expect(summary.failed).toEqual([]);
    expect(summary).toMatchObject({ tables: datasets.length, series: datasets.length, left: [] });
    for (const { name } of datasets) {
      const file = await store.read(`forecasts/${name}/latest.csv`);
      expect(forecastFaults(new TextDecoder().decode(file?.bytes), ["value"], 8)).toEqual([]);
      const model = await store.read((await store.list(`models/${name}/`))[0].key);
      expect(new TextDecoder().decode(model?.bytes)).not.toMatch(/NaN|Infinity/);
    }
    // presidents has six missing quarters, four of them after its first value (R: which(is.na(presidents))).
    const presidents = await store.read((await store.list("models/presidents/"))[0].key);
    const facts = JSON.parse(new TextDecoder().decode(presidents?.bytes)).series[0].facts;
    expect(facts.gaps).toBe((await r.evaluate("sum(is.na(presidents[2:119]))"))[0]);
  });
});
