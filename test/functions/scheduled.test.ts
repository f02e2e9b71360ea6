import { describe, expect, it } from "vitest";
import { runScheduled } from "../../functions/scheduled.ts";
import { canary } from "../support/canary.ts";
import { fillStore } from "../support/jobStores.ts";
import { MemoryStore } from "../support/memoryStore.ts";
import { tinyTables } from "../support/tinyTables.ts";
import { lambdaContext, sampleEvent, testCloud } from "./testCloud.ts";

const run = "runs/2026-11-30T06-00-00Z/";
const settings = {
  webhooks: [{ name: "counter", audience: "business", body: "text", address: "secret:CHAT" }],
};

async function filled(overrides: Parameters<typeof testCloud>[0] = {}) {
  const store = new MemoryStore();
  await fillStore(store, { ...tinyTables(), "settings.json": JSON.stringify(settings) });
  return { store, cloud: testCloud({ store, ...overrides }) };
}

/** The documents without the claims of senders, which hold the time. */
const lasting = (store: MemoryStore) =>
  Object.fromEntries(Object.entries(store.texts()).filter(([key]) => !key.includes("/delivering-")));

describe("the scheduled function alone", () => {
  it("does a whole run and answers with counts", async () => {
    const { store, cloud } = await filled();
    const outcome = await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud);
    expect(outcome).toMatchObject({
      outcome: "closed",
      asOf: "2026-11-30T06:00:00Z",
      by: "one function",
      tables: 3,
      series: 3,
      failedCount: 0,
      left: 0,
    });
    for (const table of ["lanes", "north/desk", "quay"])
      expect(store.texts()).toHaveProperty([`forecasts/${table}/latest.csv`]);
    expect(store.texts()).toHaveProperty([`${run}message-business.json`]);
  });

  it("repeats itself to the byte when the schedule fires twice", async () => {
    const { store, cloud } = await filled();
    await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud);
    const first = lasting(store);
    await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud);
    expect(lasting(store)).toEqual(first);
  });

  it("delivers nothing while the secret is the one made at deploy, and says so in answer and log", async () => {
    const { cloud } = await filled({ readSecret: async () => "k3]generated" });
    const outcome = await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud);
    expect(outcome).toMatchObject({ deliveries: ["counter: not-configured"] });
    const messages = cloud.lines().map(({ message }) => message);
    expect(messages).toContain(
      "the secret holds no JSON object of names to values yet: nothing is delivered until it does",
    );
    expect(messages).toContain("a webhook has no address or key yet and gets nothing");
  });

  it("counts what it could not deliver and leaves it for the next run", async () => {
    // 192.0.2.1 is of the documentation range (RFC 5737): nobody answers, and the address guard refuses it.
    const { cloud, store } = await filled({ readSecret: async () => '{"CHAT":"https://192.0.2.1/hook"}' });
    const outcome = await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud);
    expect(outcome).toMatchObject({ deliveries: ["counter: undelivered"] });
    expect(cloud.lines().find(({ _aws }) => _aws)).toMatchObject({ Undelivered: 1, Tables: 3 });
    expect(Object.keys(store.texts())).toContain(`${run}undelivered-business.json`);
  });

  it("writes only JSON lines that carry the run and the request", async () => {
    const { cloud } = await filled();
    await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud);
    expect(cloud.lines().length).toBeGreaterThan(2);
    for (const line of cloud.lines())
      expect(line).toMatchObject({ runId: "2026-11-30T06-00-00Z", requestId: lambdaContext().awsRequestId });
  });

  it("lets no address, key, path of a webhook or value of a table into its log", async () => {
    const { cloud, store } = await filled({
      readSecret: async () => JSON.stringify({ CHAT: `https://192.0.2.1${canary.path}` }),
    });
    await store.write("series/broken.csv", new TextEncoder().encode("week,visits\nnot-a-date,98765.4321\n"));
    await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud);
    const text = JSON.stringify(cloud.lines());
    expect(text).toContain('"table":"broken"');
    for (const secret of [canary.path, "192.0.2.1", "98765.4321", "not-a-date"])
      expect(text).not.toContain(secret);
  });

  it("closes with what it has when time runs out, throws to be tried again, and then finishes", async () => {
    const { cloud, store } = await filled();
    let looks = 0;
    const short = lambdaContext(() => (++looks <= 1 ? 900_000 : 5_000));
    await expect(runScheduled(sampleEvent("scheduled"), short, cloud)).rejects.toMatchObject({
      name: "UnfinishedError",
      message: expect.stringContaining("2 tables are left"),
    });
    expect(cloud.lines().find(({ _aws }) => _aws)).toMatchObject({ Left: 2 });
    const outcome = await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud);
    expect(outcome).toMatchObject({ outcome: "closed", tables: 3, left: 0 });
    expect(store.texts()).toHaveProperty(["forecasts/quay/latest.csv"]);
  });

  it("lets a late trigger be when a newer run stands", async () => {
    const { cloud, store } = await filled();
    await runScheduled({ asOf: "2026-11-30T06:00:01Z" }, lambdaContext(), cloud);
    const before = lasting(store);
    expect(await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud)).toEqual({
      outcome: "outdated",
      asOf: "2026-11-30T06:00:00Z",
    });
    expect(lasting(store)).toEqual(before);
  });

  it("takes the present second when a person says now", async () => {
    const { cloud } = await filled();
    const outcome = await runScheduled(sampleEvent("by-hand"), lambdaContext(), cloud);
    expect(outcome).toMatchObject({ outcome: "closed", asOf: "2026-11-30T06:00:05Z" });
  });

  it.each(["never", "auto", "always"] as const)(
    "says that there are no tables yet, posts nothing and writes nothing (fleet: %s)",
    async (fleet) => {
      const { cloud, store } = await filled({ fleet });
      for (const key of Object.keys(tinyTables())) store.objects.delete(key);
      const before = store.texts();
      expect(await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud)).toEqual({
        outcome: "no tables",
        asOf: "2026-11-30T06:00:00Z",
      });
      expect(cloud.lines().map(({ message }) => message)).toEqual([
        "there are no tables under series/ yet: nothing was done",
      ]);
      expect(store.texts()).toEqual(before);
      expect(cloud.started).toEqual([]);
    },
  );

  it("fails on settings that cannot be used, before anything is written", async () => {
    const { cloud, store } = await filled();
    await store.write("settings.json", new TextEncoder().encode('{"horizon": "far"}'));
    const before = store.texts();
    await expect(runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud)).rejects.toMatchObject({
      name: "SettingsError",
    });
    expect(store.texts()).toEqual(before);
  });
});

describe("the scheduled function with a fleet", () => {
  const portions = [{ portion: 1, tables: ["lanes", "north/desk", "quay"] }];

  it("hands every run over when told to, with the portions as an array in the store", async () => {
    const { cloud, store } = await filled({ fleet: "always" });
    const outcome = await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud);
    expect(outcome).toEqual({
      outcome: "handed over",
      asOf: "2026-11-30T06:00:00Z",
      because: "chosen for this deployment",
      portions: 1,
      execution: "started",
    });
    expect(JSON.parse(store.texts()[`${run}portions.json`])).toEqual(portions);
    expect(cloud.started).toEqual([
      {
        name: "run-2026-11-30T06-00-00Z",
        input: {
          asOf: "2026-11-30T06:00:00Z",
          portionsKey: `${run}portions.json`,
          resultsPrefix: `${run}fleet`,
          because: "chosen for this deployment",
        },
      },
    ]);
    expect(cloud.started[0].name).toMatch(/^[A-Za-z0-9_-]{1,80}$/); // what Step Functions takes for a name
  });

  it("starts nothing new when the schedule fires twice", async () => {
    const { cloud, store } = await filled({ fleet: "always" });
    await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud);
    const before = store.texts();
    const again = await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud);
    expect(again).toMatchObject({ execution: "standing" });
    expect(store.texts()).toEqual(before);
    expect(cloud.started[1]).toEqual(cloud.started[0]);
  });

  it("puts a bucket's prefix before the keys that Step Functions reads and writes", async () => {
    const { store, cloud } = await filled({ fleet: "always" });
    Object.assign(store, { address: "s3://their-bucket/team/forecasts" });
    await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud);
    expect(cloud.started[0].input).toMatchObject({
      portionsKey: `team/forecasts/${run}portions.json`,
      resultsPrefix: `team/forecasts/${run}fleet`,
    });
  });

  it("does a small run by itself", async () => {
    const { cloud } = await filled({ fleet: "auto" });
    const outcome = await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud);
    expect(outcome).toMatchObject({ outcome: "closed", by: "one function", tables: 3, left: 0 });
    expect(cloud.started).toEqual([]);
  });

  it("hands over a run that one function has no time for, and says why", async () => {
    const { cloud, store } = await filled({ fleet: "auto" });
    let looks = 0;
    const short = lambdaContext(() => (++looks <= 2 ? 900_000 : 5_000));
    const outcome = await runScheduled(sampleEvent("scheduled"), short, cloud);
    expect(outcome).toMatchObject({
      outcome: "handed over",
      because: "more work than one function has time for",
    });
    // What it had done stands; nothing was said yet.
    expect(store.texts()).toHaveProperty(["forecasts/lanes/latest.csv"]);
    expect(Object.keys(store.texts()).filter((key) => key.includes("/message-"))).toEqual([]);
  });

  it("lets a late trigger be as well", async () => {
    const { cloud } = await filled({ fleet: "always" });
    await runScheduled({ asOf: "2026-11-30T06:00:01Z" }, lambdaContext(), cloud);
    expect(await runScheduled(sampleEvent("scheduled"), lambdaContext(), cloud)).toMatchObject({
      outcome: "outdated",
    });
    expect(cloud.started).toHaveLength(1);
  });
});
