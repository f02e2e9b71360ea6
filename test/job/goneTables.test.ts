import { describe, expect, it } from "vitest";
import { summarySchema } from "../../lib/job/documentSchemas.ts";
import { summaryKey } from "../../lib/job/keys.ts";
import { planRun } from "../../lib/job/plan.ts";
import { readMessage } from "../../lib/job/readBack.ts";
import { replayRuns } from "../../lib/job/replay.ts";
import { type RunOptions, runJob } from "../../lib/job/run.ts";
import type { Message } from "../../lib/webhook/message.ts";
import { fillStore } from "../support/jobStores.ts";
import { MemoryStore } from "../support/memoryStore.ts";
import { tinyAsOf, tinyTables } from "../support/tinyTables.ts";

const second = "2026-12-01T06:00:00Z";
const third = "2026-12-02T06:00:00Z";
const whole =
  'The table "north/desk" of the last run is not there any more; its last forecast stands as it was. Nothing to do, if that is meant; a renamed table begins anew under its new name.';

/** Nobody hears of these runs; a listener makes them word the note to operations too. */
const run = (store: MemoryStore, asOf: string, more: Partial<RunOptions> = {}) =>
  runJob({ store, asOf, webhooks: [{ audience: "operations", address: "env:NONE" }], ...more });

async function filled(): Promise<MemoryStore> {
  const store = new MemoryStore();
  await fillStore(store, tinyTables());
  return store;
}

/** What a run said to an audience, as one text. */
async function said(
  store: MemoryStore,
  asOf: string,
  audience: "business" | "operations" = "business",
): Promise<string> {
  const { title, lines } = (await readMessage(store, asOf, audience)) as Message;
  return [title, ...lines].join(" ");
}

describe("a table of the last run that is gone", () => {
  it("is told once, to business and operations, in report and summary; its forecast stands", async () => {
    const store = await filled();
    expect(await run(store, tinyAsOf)).toMatchObject({ gone: [] });
    const latest = store.texts()["forecasts/north/desk/latest.csv"];
    store.objects.delete("series/north/desk.csv");
    expect(await run(store, second)).toMatchObject({ tables: 2, failed: [], gone: ["north/desk"] });

    const business = await said(store, second);
    expect(business).toMatch(/^2 tables: 1 table gone since the last run /);
    expect(business).toContain(whole);
    const operations = await said(store, second, "operations");
    expect(operations).toMatch(/^Needs a look/);
    expect(operations).toContain(whole);
    const texts = store.texts();
    expect(texts["runs/2026-12-01T06-00-00Z/report.html"]).toContain(
      "of the last run is not there any more; its last forecast stands as it was.",
    );
    expect(summarySchema.parse(JSON.parse(texts[summaryKey(second)])).gone).toEqual(["north/desk"]);
    expect(texts["forecasts/north/desk/latest.csv"]).toBe(latest);

    expect(await run(store, third)).toMatchObject({ gone: [] });
    expect(await said(store, third)).not.toMatch(/north\/desk|gone/);
    expect(await said(store, third, "operations")).toMatch(/^All done/);
  });

  it("is one line with others, as when a folder was renamed, and names the new tables by their own news", async () => {
    const store = await filled();
    await run(store, tinyAsOf);
    for (const name of ["lanes", "north/desk"]) {
      const text = store.texts()[`series/${name}.csv`];
      store.objects.delete(`series/${name}.csv`);
      await fillStore(store, { [`series/town/${name}.csv`]: text });
    }
    await run(store, second);
    expect(await said(store, second)).toMatch(/^3 tables: 2 tables gone since the last run /);
    expect(await said(store, second)).toContain(
      "2 tables of the last run are not there any more (lanes, north/desk); their last forecasts stand as they were.",
    );
  });

  it("without a forecast has none that stands", async () => {
    const store = await filled();
    await fillStore(store, { "series/broken.csv": "" });
    await run(store, tinyAsOf);
    store.objects.delete("series/broken.csv");
    await run(store, second);
    expect(await said(store, second)).toContain(
      'The table "broken" of the last run is not there any more; there was no forecast of it.',
    );
  });

  it("is told by the one table left under no name but its own", async () => {
    const store = await filled();
    await run(store, tinyAsOf);
    for (const name of ["lanes", "north/desk"]) store.objects.delete(`series/${name}.csv`);
    await run(store, second);
    expect(await said(store, second)).toMatch(/^1 table: 2 tables gone since the last run /);
  });

  it("changes no byte when the run is repeated, even with the file back", async () => {
    const store = await filled();
    await run(store, tinyAsOf);
    store.objects.delete("series/north/desk.csv");
    await run(store, second);
    await fillStore(store, tinyTables());
    const before = store.texts();
    expect(await run(store, second)).toMatchObject({ gone: ["north/desk"] });
    expect(store.texts()).toEqual(before);
  });

  it("is told by the first part of a run whose time ran out, not by the next", async () => {
    const store = await filled();
    await run(store, tinyAsOf);
    store.objects.delete("series/north/desk.csv");
    let looks = 0;
    await run(store, second, { remainingMilliseconds: () => (++looks > 1 ? 0 : 1e6) });
    await run(store, second);
    const parts = Object.entries(store.texts()).filter(([key]) =>
      key.includes("2026-12-01T06-00-00Z/message-business"),
    );
    expect(parts).toHaveLength(2);
    expect(parts.filter(([, text]) => text.includes("not there any more"))).toHaveLength(1);
  });

  it("is told by the next run when the one that missed it never came to its end", async () => {
    const store = await filled();
    await run(store, tinyAsOf);
    store.objects.delete("series/north/desk.csv");
    await planRun({ store, asOf: second });
    expect(await run(store, third)).toMatchObject({ gone: ["north/desk"] });
  });

  it("is told by a run that comes a year after the last", async () => {
    const store = await filled();
    await run(store, tinyAsOf);
    store.objects.delete("series/north/desk.csv");
    expect(await run(store, "2027-11-29T06:00:00Z")).toMatchObject({ gone: ["north/desk"] });
  });

  it("is told again after a replay, whose messages nobody was sent", async () => {
    const store = await filled();
    await run(store, tinyAsOf);
    store.objects.delete("series/north/desk.csv");
    const replayed = await replayRuns({ store, from: second, until: third, every: "day" });
    expect(replayed.map((one) => one.gone)).toEqual([["north/desk"], ["north/desk"]]);
    expect(await run(store, "2026-12-03T06:00:00Z")).toMatchObject({ gone: ["north/desk"] });
    expect(await run(store, "2026-12-04T06:00:00Z")).toMatchObject({ gone: [] });
  });

  it("is told where no table is left at all", async () => {
    const store = await filled();
    await run(store, tinyAsOf);
    for (const key of Object.keys(tinyTables())) store.objects.delete(key);
    expect(await run(store, second)).toMatchObject({
      tables: 0,
      gone: ["lanes", "north/desk", "quay"],
    });
    expect(await said(store, second)).toMatch(/^0 tables: 3 tables gone since the last run /);
  });
});
