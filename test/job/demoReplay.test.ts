import { readFileSync } from "node:fs";
import { subWeeks } from "date-fns";
import { describe, expect, it } from "vitest";
import { demoTables } from "../../events/demo/makeDemo.ts";
import { demoTruths as truths } from "../../events/demo/truths.ts";
import type { ModelDocument } from "../../lib/job/modelDocument.ts";
import { readMessage } from "../../lib/job/readBack.ts";
import { replayRuns } from "../../lib/job/replay.ts";
import type { Finding, SeriesFacts } from "../../lib/words/facts.ts";
import { fillStore } from "../support/jobStores.ts";
import { MemoryStore } from "../support/memoryStore.ts";

type ChangeFinding = Extract<Finding, { code: "change" }>;

async function replayDemo(weeks: number): Promise<MemoryStore> {
  const store = new MemoryStore();
  const tables = Object.entries(demoTables()).map(([name, text]) => [`series/${name}`, text]);
  const settings = readFileSync("events/demo/settings.json", "utf8");
  await fillStore(store, { ...Object.fromEntries(tables), "settings.json": settings });
  const from = subWeeks(new Date(truths.asOf), weeks - 1);
  await replayRuns({ store, from, until: truths.asOf, every: "week" });
  return store;
}

/** Facts of every series after every run, oldest first. */
function allFacts(store: MemoryStore): SeriesFacts[] {
  return Object.entries(store.texts())
    .filter(([key]) => key.startsWith("models/"))
    .flatMap(([, text]) => (JSON.parse(text) as ModelDocument).series.map((one) => one.facts));
}

const changesOf = (facts: readonly SeriesFacts[], series: string): ChangeFinding[] =>
  facts
    .filter((one) => one.series === series)
    .flatMap((one) => one.findings)
    .filter((finding): finding is ChangeFinding => finding.code === "change");

describe("the demo, replayed", () => {
  it("brings the planted change in its newest message after 16 weeks, with old and new half-life", async () => {
    const store = await replayDemo(16);
    const message = await readMessage(store, truths.asOf, "business");
    const line = message?.lines.find((one) => /Quay: .*lose half/.test(one));
    expect(line).toMatch(
      /shocks now lose half their effect in about [3-8] weeks; it was (about |under )?1 week/,
    );
    const [change] = changesOf(allFacts(store), "Quay").slice(-1);
    expect(change).toMatchObject({ kind: "persistence", status: "confirmed" });
    expect(change.change.low <= truths.loans.Quay.changedInWeek).toBe(true);
    expect(truths.loans.Quay.changedInWeek <= change.change.high).toBe(true);
    // Planted: 0.8 weeks before, 5.4 after. Some twenty weeks of data cannot say more than the right half of that.
    expect(change.before.halfLife).toBeLessThan(1.5);
    expect(change.after.halfLife).toBeGreaterThan(2.5);
  });

  it("brings no lasting change for the steady series in 52 weeks, and finds Mill's closed fortnight as gaps", async () => {
    const facts = allFacts(await replayDemo(52));
    for (const steady of ["Mill", "Park", "Station", "calls", "members"])
      expect(changesOf(facts, steady)).toEqual([]);
    const newest = facts.filter((one) => one.series === "Mill").at(-1);
    expect(newest?.findings).toContainEqual({
      code: "gaps",
      count: 2,
      latest: truths.loans.Mill.closedWeeks[1],
    });
  });

  it("tells Station's week as a one-off that fades, never as a change", async () => {
    const facts = allFacts(await replayDemo(2));
    const surprise = facts.flatMap((one) => one.findings).find((finding) => finding.code === "surprise");
    expect(surprise).toMatchObject({ period: truths.loans.Station.surpriseWeek });
  });
});
