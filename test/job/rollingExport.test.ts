import { describe, expect, it } from "vitest";
import { modelKey } from "../../lib/job/keys.ts";
import type { ModelDocument } from "../../lib/job/modelDocument.ts";
import { runJob } from "../../lib/job/run.ts";
import { MemoryStore } from "../support/memoryStore.ts";

const monday = (index: number) =>
  new Date(Date.UTC(2024, 0, 1) + index * 7 * 86_400_000).toISOString().slice(0, 10);

/** Level 200 with small shocks from a fixed congruential generator; 60 more from week `stepAt` on. */
function weeks(count: number, stepAt: number): string[] {
  let state = 99;
  return Array.from({ length: count }, (_, week) => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return `${monday(week)},${(200 + 20 * (state / 2 ** 32 - 0.5) + (week >= stepAt ? 60 : 0)).toFixed(1)}`;
  });
}

async function run(
  store: MemoryStore,
  rows: readonly string[],
  end: number,
): Promise<ModelDocument["series"][number]> {
  await store.write("series/till.csv", new TextEncoder().encode(["week,sales", ...rows, ""].join("\n")));
  const asOf = `${monday(end)}T06:00:00Z`;
  await runJob({ store, asOf, webhooks: [] });
  return (JSON.parse(store.texts()[modelKey("till", asOf)]) as ModelDocument).series[0];
}

describe("a file that always holds the last two years", () => {
  it("is watched on as its rows move: a step is noticed, and no row that left counts as revised", async () => {
    const rows = weeks(130, 112);
    const store = new MemoryStore();
    const codes = new Set<string>();
    let looksUsed = 0;
    for (let end = 104; end <= 130; end++) {
      const { facts } = await run(store, rows.slice(end - 104, end), end);
      for (const finding of facts.findings) codes.add(finding.code);
      looksUsed = Math.max(looksUsed, facts.monitor?.looksUsed ?? 0);
    }
    expect(codes).toContain("change");
    expect(codes).not.toContain("revised");
    expect(looksUsed).toBeGreaterThan(30); // 26 at first sight, and one for each week since
  });

  it("begins anew when the step of its periods changes, instead of counting months as weeks", async () => {
    const store = new MemoryStore();
    await run(store, weeks(104, 999), 104);
    await store.write(
      "settings.json",
      new TextEncoder().encode('{ "tables": { "till": { "every": "month" } } }'),
    );
    const { facts, watchOrigin } = await run(store, weeks(108, 999), 108);
    expect(facts).toMatchObject({ period: "month", trackRecord: null, comparison: null });
    expect(watchOrigin.slice(8)).toBe("01");
  });
});
