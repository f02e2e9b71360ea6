import { describe, expect, it } from "vitest";
import { runJob } from "../../lib/job/run.ts";
import { fillStore, smallTables } from "../support/jobStores.ts";
import { MemoryStore } from "../support/memoryStore.ts";

const weekly = { "series/weekly.csv": smallTables()["series/weekly.csv"] };
const [older, newer] = ["2026-11-23T06:00:00Z", "2026-11-30T06:00:00Z"];
const latest = "forecasts/weekly/latest.csv";

/** A store in which a later run does all its work just before the first write of the latest forecasts. */
class OvertakenStore extends MemoryStore {
  private overtaken = false;

  override async write(key: string, bytes: Uint8Array): Promise<void> {
    if (key === latest && !this.overtaken) {
      this.overtaken = true;
      await runJob({ store: this, asOf: newer, webhooks: [] });
    }
    await super.write(key, bytes);
  }
}

describe("a run that is overtaken by a later one", () => {
  it("leaves the later run's forecasts as the latest, and its own under its instant", async () => {
    const store = new OvertakenStore();
    await fillStore(store, weekly);
    await runJob({ store, asOf: older, webhooks: [] });
    const texts = store.texts();
    const of = (asOf: string) => texts[`forecasts/weekly/${asOf.replaceAll(":", "-")}.csv`];
    expect(texts[latest]).toBe(of(newer));
    expect(of(older)).toBeDefined();
    expect(of(older)).not.toBe(of(newer));
  });
});
