import { describe, expect, it } from "vitest";
import { runClosing } from "../../functions/closing.ts";
import { runPortion } from "../../functions/portion.ts";
import { runScheduled } from "../../functions/scheduled.ts";
import { fillStore } from "../support/jobStores.ts";
import { MemoryStore } from "../support/memoryStore.ts";
import { tinyTables } from "../support/tinyTables.ts";
import { lambdaContext, sampleEvent, testCloud } from "./testCloud.ts";

/** A planned run, handed to the fleet; the tables are named as the sample events name them. */
async function planned(extra: Record<string, string> = {}) {
  const store = new MemoryStore();
  const texts = Object.values(tinyTables());
  const names = ["desk-calls", "loans", "members"];
  await fillStore(store, {
    ...Object.fromEntries(names.map((name, index) => [`series/${name}.csv`, texts[index]])),
    ...extra,
  });
  const cloud = testCloud({ store, fleet: "always" });
  await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud);
  return { store, cloud };
}

describe("a worker of the fleet", () => {
  it("refits its tables and answers with counts", async () => {
    const { cloud, store } = await planned();
    expect(await runPortion(sampleEvent("portion"), lambdaContext(), cloud)).toEqual({
      outcome: "refitted",
      tables: 3,
      refitted: 3,
      already: 0,
      series: 3,
      failed: [],
    });
    expect(Object.keys(store.texts())).toContain("forecasts/loans/latest.csv");
    expect(Object.keys(store.texts()).filter((key) => key.includes("/message-"))).toEqual([]);
  });

  it("does nothing again when it is given the same portion twice", async () => {
    const { cloud, store } = await planned();
    await runPortion(sampleEvent("portion"), lambdaContext(), cloud);
    const before = store.texts();
    expect(await runPortion(sampleEvent("portion"), lambdaContext(), cloud)).toMatchObject({
      refitted: 0,
      already: 3,
    });
    expect(store.texts()).toEqual(before);
  });

  it("names a table that fails and does the others", async () => {
    const { cloud } = await planned({ "series/loans.csv": "no header, no dates\n" });
    expect(await runPortion(sampleEvent("portion"), lambdaContext(), cloud)).toMatchObject({
      refitted: 2,
      failed: ["loans"],
    });
  });

  it("throws when its time runs out, so that it is tried again, and keeps what it did", async () => {
    const { cloud } = await planned();
    await expect(runPortion(sampleEvent("portion"), lambdaContext(5_000), cloud)).rejects.toMatchObject({
      name: "UnfinishedError",
    });
    expect(await runPortion(sampleEvent("portion"), lambdaContext(), cloud)).toMatchObject({ tables: 3 });
  });
});

describe("closing", () => {
  it("says one message for all portions, with the fleet and its reason in the answer", async () => {
    const { cloud, store } = await planned();
    await runPortion(sampleEvent("portion"), lambdaContext(), cloud);
    expect(await runClosing(sampleEvent("closing"), lambdaContext(), cloud)).toMatchObject({
      outcome: "closed",
      by: "fleet",
      because: "chosen for this deployment",
      tables: 3,
      left: 0,
    });
    const messages = Object.keys(store.texts()).filter((key) => key.includes("/message-business"));
    expect(messages).toHaveLength(1);
  });

  it("counts the duration from the start of the fleet", async () => {
    const { cloud } = await planned();
    await runPortion(sampleEvent("portion"), lambdaContext(), cloud);
    await runClosing(sampleEvent("closing"), lambdaContext(), cloud);
    // The sample's fleet started at 06:00:04, the test's clock stands just after 06:00:05.
    const { RunDuration } = cloud.lines().find(({ _aws }) => _aws);
    expect(RunDuration).toBeGreaterThanOrEqual(1000);
    expect(RunDuration).toBeLessThan(2000);
  });

  it("names the tables no worker finished, and is not the less done for it", async () => {
    const { cloud, store } = await planned();
    expect(await runClosing(sampleEvent("closing"), lambdaContext(), cloud)).toMatchObject({
      tables: 0,
      left: 3,
    });
    const [text] = Object.entries(store.texts())
      .filter(([key]) => key.includes("/message-business"))
      .map(([, one]) => one);
    for (const name of ["desk-calls", "loans", "members"]) expect(text).toContain(name);
  });

  it("tells a table of the last run that is gone, as one function does", async () => {
    const { cloud, store } = await planned();
    await runPortion(sampleEvent("portion"), lambdaContext(), cloud);
    await runClosing(sampleEvent("closing"), lambdaContext(), cloud);
    store.objects.delete("series/loans.csv");
    const asOf = "2026-12-01T06:00:00Z";
    expect(await runScheduled({ asOf }, lambdaContext(), cloud)).toMatchObject({ outcome: "handed over" });
    const portion = { BatchInput: { asOf }, Items: [{ tables: ["desk-calls", "members"] }] };
    await runPortion(portion, lambdaContext(), cloud);
    expect(await runClosing({ asOf }, lambdaContext(), cloud)).toMatchObject({ tables: 2, failedCount: 0 });
    const message = store.texts()["runs/2026-12-01T06-00-00Z/message-business.json"];
    expect(JSON.parse(message).message.title).toBe("2 tables: 1 table gone since the last run");
    expect(message).toContain("of the last run is not there any more; its last forecast stands as it was.");
    expect(cloud.lines()).toContainEqual(
      expect.objectContaining({ message: "a table of the last run is not there any more", table: "loans" }),
    );
  });
});
