import { describe, expect, it } from "vitest";
import { runJob } from "../../lib/job/run.ts";
import { leaks } from "../support/canary.ts";
import { fillStore } from "../support/jobStores.ts";
import { MemoryStore } from "../support/memoryStore.ts";
import { receiver } from "../support/receiver.ts";
import { tinyAsOf, tinyTables } from "../support/tinyTables.ts";

describe("a run whose webhooks keep silent", () => {
  it("ends before its time is over, owes each of them its note, and still reaches one that answers", async () => {
    const silent = await Promise.all([receiver(() => undefined), receiver(() => undefined)]);
    const working = await receiver();
    const store = new MemoryStore();
    await fillStore(store, tinyTables());
    // An earlier try refitted the tables; this one has little time, and that for the posts.
    await runJob({ store, asOf: tinyAsOf, webhooks: [] });
    const began = Date.now();
    const time = 14_000;
    const summary = await runJob({
      store,
      asOf: tinyAsOf,
      allowLocalWebhooks: true,
      remainingMilliseconds: () => began + time - Date.now(),
      webhooks: [...silent, working].map(({ address }, i) => ({
        name: `hook ${i}`,
        audience: "business",
        body: "text",
        address,
      })),
    });
    expect(Date.now() - began).toBeLessThan(time);
    expect(summary.deliveries.map(({ status }) => status)).toEqual([
      "undelivered",
      "undelivered",
      "delivered",
    ]);
    expect(Object.keys(store.texts()).filter((key) => key.includes("/undelivered-"))).toHaveLength(2);
    expect(leaks(JSON.stringify([summary, store.texts()]))).toEqual([]);
    expect(store.texts()).toHaveProperty([`runs/${tinyAsOf.replaceAll(":", "-")}/summary.json`]);
  }, 60_000);
});
