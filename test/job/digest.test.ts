import { describe, expect, it } from "vitest";
import { gatherTables, runFacts } from "../../lib/job/digest.ts";
import { encodeDocument } from "../../lib/job/documents.ts";
import { modelKey } from "../../lib/job/keys.ts";
import { runJob } from "../../lib/job/run.ts";
import { businessMessage } from "../../lib/words/businessMessage.ts";
import type { Finding, SeriesFacts } from "../../lib/words/facts.ts";
import { fillStore, smallTables } from "../support/jobStores.ts";
import { MemoryStore } from "../support/memoryStore.ts";

const asOf = "2026-11-30T06:00:00Z";
const voice = { locale: "en-GB", timeZone: "UTC", quietWhenSteady: false, reportBase: null };

/** Facts of one steady series as the job makes them, to be multiplied. */
async function steadyFacts(): Promise<SeriesFacts> {
  const store = new MemoryStore();
  await fillStore(store, { "series/weekly.csv": smallTables()["series/weekly.csv"] });
  await runJob({ store, asOf, webhooks: [] });
  return JSON.parse(store.texts()[modelKey("weekly", asOf)]).series[0].facts;
}

describe("the digest of very many series", () => {
  it("keeps those with news, counts most of the steady, and says how many", async () => {
    const one = { ...(await steadyFacts()), findings: [] };
    const late: Finding = { code: "stale", lastPeriod: "2026-01-05", periodsLate: 46 };
    const store = new MemoryStore();
    const tables = Array.from({ length: 25 }, (_, index) => `t${String(index).padStart(2, "0")}`);
    for (const table of tables) {
      const series = Array.from({ length: 100 }, (_, index) => ({
        facts: { ...one, series: `s${index}`, findings: index === 0 ? [late] : [] },
      }));
      await store.write(
        modelKey(table, asOf),
        encodeDocument({ schema: 1, table, asOf, problems: [], series }),
      );
    }
    const gathered = await gatherTables(store, asOf, tables);
    const kept = gathered.tables.reduce((sum, table) => sum + table.series.length, 0);
    expect(gathered.untold).toEqual({ steady: 2475 - 1000, news: 0, watched: 2475 - 1000 });
    expect(kept).toBe(1000 + 25);
    // A rate of 5 % over 52 looks, each a week: 2,500 weekly series bring 125 false notices a year.
    expect(gathered.expectedFalseNotices).toBeCloseTo(125, 6);
    const plan = { schema: 1, asOf, tables, portions: [tables], refused: [] } as const;
    const { lines } = businessMessage(runFacts(plan, gathered, [], []), voice);
    const counts = lines.find((line) => line.startsWith("… and"))?.match(/\d[\d,]*/g) ?? [];
    const [rest, withNews] = counts.map((text) => Number(text.replace(",", "")));
    expect(rest).toBeGreaterThan(2475);
    expect(rest).toBeLessThan(2500);
    expect(withNews).toBeLessThan(25);
  });
});
