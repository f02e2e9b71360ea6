import { describe, expect, it } from "vitest";
import { readFacts, whyNoFacts } from "../../lib/job/readBack.ts";
import { runJob } from "../../lib/job/run.ts";
import { FolderStore } from "../../lib/store/folderStore.ts";
import { fillStore } from "../support/jobStores.ts";
import { MemoryStore } from "../support/memoryStore.ts";
import { temporaryFolder } from "../support/temporaryFolder.ts";
import { tinyAsOf, tinyTables } from "../support/tinyTables.ts";

async function filled(tables: Record<string, string> = tinyTables()): Promise<MemoryStore> {
  const store = new MemoryStore();
  await fillStore(store, tables);
  return store;
}

describe("a table of which nothing is known", () => {
  it("has not been run yet", async () => {
    expect(await whyNoFacts(await filled(), "quay", tinyAsOf)).toBe(
      'no model of table "quay" stands in memory yet: run first',
    );
  });

  it("is probably the one with the nearest name", async () => {
    const store = await filled();
    expect(await whyNoFacts(store, "quai", tinyAsOf)).toBe(
      'there is no table "quai" in memory: did you mean "quay"?',
    );
    expect(await whyNoFacts(store, "north/deks", tinyAsOf)).toContain('did you mean "north/desk"?');
  });

  it("is none of those there are, which are listed as long as they are few", async () => {
    expect(await whyNoFacts(await filled(), "warehouse", tinyAsOf)).toBe(
      'there is no table "warehouse" in memory: it has lanes, north/desk, quay',
    );
    const many = Object.fromEntries(Array.from({ length: 40 }, (_, at) => [`series/t${at}.csv`, ""]));
    expect(await whyNoFacts(await filled(many), "warehouse", tinyAsOf)).toBe(
      'there is no table "warehouse" in memory: check lists its 40 tables',
    );
    expect(await whyNoFacts(await filled({}), "warehouse", tinyAsOf)).toMatch(
      /^There are no tables in memory/,
    );
  });

  it("had its first model later than asked for", async () => {
    const store = await filled();
    await runJob({ store, asOf: tinyAsOf, webhooks: [] });
    const before = "2026-11-29T06:00:00Z";
    expect(await readFacts(store, "quay", before)).toBeUndefined();
    expect(await whyNoFacts(store, "quay", before)).toBe(
      'the first model of table "quay" is of 2026-11-30T06:00:00Z: there is none yet at 2026-11-29T06:00:00Z',
    );
  });

  it("may have a name that no table can have", async () => {
    const store = new FolderStore(await temporaryFolder());
    await fillStore(store, tinyTables());
    expect(await readFacts(store, "../quay", tinyAsOf)).toBeUndefined();
    expect(await whyNoFacts(store, "../quay", tinyAsOf)).toContain('there is no table "../quay"');
  });
});
