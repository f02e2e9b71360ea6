import { createServer } from "node:http";
import type { AddressInfo } from "node:net";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { modelDocumentSchema, summarySchema } from "../../lib/job/documentSchemas.ts";
import { readMessage } from "../../lib/job/readBack.ts";
import { runJob } from "../../lib/job/run.ts";
import type { Webhook } from "../../lib/job/webhooks.ts";
import { FolderStore } from "../../lib/store/folderStore.ts";
import type { ObjectStore } from "../../lib/store/objectStore.ts";
import type { Message } from "../../lib/webhook/message.ts";
import { cephStore, hasGateway } from "../support/cephStore.ts";
import { fillStore, smallTables, storeTexts } from "../support/jobStores.ts";
import { MemoryStore } from "../support/memoryStore.ts";
import { temporaryFolder } from "../support/temporaryFolder.ts";

const received: { id: string; body: string }[] = [];
const server = createServer((request, response) => {
  const pieces: Buffer[] = [];
  request.on("data", (piece) => pieces.push(piece));
  request.on("end", () => {
    received.push({ id: String(request.headers["webhook-id"]), body: Buffer.concat(pieces).toString() });
    response.end("ok");
  });
});
let webhooks: Webhook[] = [];
beforeAll(async () => {
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  const address = `http://127.0.0.1:${(server.address() as AddressInfo).port}/note`;
  webhooks = [{ name: "counter", audience: "business", body: "text", address }];
});
afterAll(() => server.close());

const asOf = "2026-11-30T06:00:00Z";

/** Clock and owner are given, so that even the claims of a post are the same. */
const run = (store: ObjectStore) =>
  runJob({ store, asOf, webhooks, allowLocalWebhooks: true, clock: () => 1_800_000_000_000, owner: "one" });

describe("a run", () => {
  it("that is repeated sends nothing and changes no byte", async () => {
    const store = new MemoryStore();
    await fillStore(store, smallTables());
    received.length = 0;
    const first = await run(store);
    expect(first).toMatchObject({
      tables: 3,
      series: 4,
      failed: [],
      left: [],
      deliveries: [{ status: "delivered" }],
    });
    const before = await storeTexts(store);
    const second = await run(store);
    expect(second.deliveries).toMatchObject([{ status: "already-delivered" }]);
    expect(received).toHaveLength(1);
    for (const [key, text] of Object.entries(before)) {
      if (key.startsWith("models/")) modelDocumentSchema.parse(JSON.parse(text));
      if (key.endsWith("/summary.json")) summarySchema.parse(JSON.parse(text));
    }
    expect(await storeTexts(store)).toEqual(before);
  });

  it("gives the same documents in memory and in a folder", async () => {
    const memory = new MemoryStore();
    const folder = new FolderStore(await temporaryFolder());
    for (const store of [memory, folder]) {
      await fillStore(store, smallTables());
      await run(store);
    }
    expect(await storeTexts(folder)).toEqual(await storeTexts(memory));
  });

  it.skipIf(!hasGateway)("gives the same documents in a folder and in a bucket", async () => {
    const bucket = (await cephStore("some/prefix")) as ObjectStore;
    const folder = new FolderStore(await temporaryFolder());
    for (const store of [bucket, folder]) {
      await fillStore(store, smallTables());
      await run(store);
    }
    expect(await storeTexts(bucket)).toEqual(await storeTexts(folder));
  });

  it("reports a bad table with line and remedy, forecasts the others, and leaves what stood", async () => {
    const store = new MemoryStore();
    await fillStore(store, smallTables());
    await run(store);
    const before = await storeTexts(store);
    await fillStore(store, {
      "series/weekly.csv": "week,East\nlast Tuesday,12\nsome day,13\n",
      "series/empty.csv": "",
      "series/binary.csv": "\u0000\u0001\u0002PNG\u0000",
      "series/headerless.csv": "2026-01-05,1\n2026-01-12,2\n",
    });
    const later = await runJob({ store, asOf: "2026-12-07T06:00:00Z", webhooks: [] });
    expect(later.tables).toBe(2);
    expect(later.failed.map((one) => one.table)).toEqual(["binary", "empty", "headerless", "weekly"]);
    for (const { table, problems } of later.failed) {
      expect(problems.length).toBeGreaterThan(0);
      for (const problem of problems) expect(problem).toMatchObject({ table, message: /\w/, remedy: /\w/ });
    }
    expect(later.failed.find((one) => one.table === "weekly")?.problems[0].line).toBe(2);
    const { lines } = (await readMessage(store, later.asOf, "business")) as Message;
    const text = lines.join(" ");
    expect(text).toContain("empty was not refitted; there is no forecast of it yet.");
    const failed = later.failed.filter((one) => one.hasForecast).map((one) => one.table);
    expect(failed).toEqual(["weekly"]);
    const report = (await storeTexts(store))[later.report];
    expect(report).toContain("weekly <small>not refitted; an earlier forecast stands as it was</small>");
    expect(report).toContain("empty <small>not refitted; there is no forecast of it yet</small>");
    const after = await storeTexts(store);
    for (const [key, text] of Object.entries(before))
      if (!key.startsWith("series/") && !key.endsWith("latest.csv")) expect(after[key]).toBe(text);
    expect(after["forecasts/weekly/latest.csv"]).toBe(before["forecasts/weekly/latest.csv"]);
  });

  it("older than the newest run is refused, and allowed as a replay", async () => {
    const store = new MemoryStore();
    await fillStore(store, smallTables());
    await run(store);
    const older = { store, asOf: "2026-11-23T06:00:00Z", webhooks: [] };
    await expect(runJob(older)).rejects.toThrow(/2026-11-30/);
    const latest = store.texts()["forecasts/weekly/latest.csv"];
    expect((await runJob({ ...older, replaying: true })).tables).toBe(3);
    expect(store.texts()["forecasts/weekly/latest.csv"]).toBe(latest);
  });

  it("with little time left stops, says what is left, and is finished by the next try with one further part", async () => {
    const store = new MemoryStore();
    await fillStore(store, smallTables());
    let calls = 0;
    const remainingMilliseconds = () => (++calls > 1 ? 0 : 1e6);
    const options = { store, asOf, webhooks, allowLocalWebhooks: true };
    received.length = 0;
    const first = await runJob({ ...options, remainingMilliseconds });
    expect(first.left).toEqual(["north/daily", "weekly"]);
    const second = await runJob(options);
    expect(second.left).toEqual([]);
    expect(received).toHaveLength(2);
    expect(received[0].body).toMatch(/members/);
    expect(received[1].body).toMatch(/East/);
    expect(received[1].body).not.toMatch(/members/);
  });
});
