import { describe, expect, it } from "vitest";
import { readMessage } from "../../lib/job/readBack.ts";
import { runJob } from "../../lib/job/run.ts";
import { fillStore, smallTables } from "../support/jobStores.ts";
import { MemoryStore } from "../support/memoryStore.ts";

const asOf = "2026-11-30T06:00:00Z";

describe("a file of events that cannot be used", () => {
  it("is told by its name and remedy, stops no table, and is not called one", async () => {
    const store = new MemoryStore();
    await fillStore(store, { ...smallTables(), "events/fairs.csv": "what happened\nthe fair\n" });
    const summary = await runJob({ store, asOf, webhooks: [] });
    expect(summary).toMatchObject({ tables: 3, failed: [{ table: "events/fairs", beside: true }] });
    const message = await readMessage(store, asOf, "business");
    expect(message?.title).toMatch(/^3 tables: .*1 file of events or settings not usable/);
    const line = message?.lines.find((one) => one.startsWith("events/fairs could not be used."));
    expect(line).toMatch(/date/);
    expect(message?.lines.join("\n")).not.toMatch(/earlier forecast/);
  });

  it("with a country that has no known holidays is told the same way", async () => {
    const store = new MemoryStore();
    await fillStore(store, { ...smallTables(), "settings.json": '{ "country": "XX" }' });
    const summary = await runJob({ store, asOf, webhooks: [] });
    expect(summary).toMatchObject({ tables: 3, failed: [{ table: "settings.json", beside: true }] });
  });
});
