import { describe, expect, it } from "vitest";
import { modelKey } from "../../lib/job/keys.ts";
import type { ModelDocument } from "../../lib/job/modelDocument.ts";
import { runJob } from "../../lib/job/run.ts";
import { choiceThatStands } from "../../lib/job/standingChoice.ts";
import { MemoryStore } from "../support/memoryStore.ts";

const monday = (index: number) =>
  new Date(Date.UTC(2024, 0, 1) + index * 7 * 86_400_000).toISOString().slice(0, 10);

function rows(count: number): string[] {
  let state = 4;
  return Array.from({ length: count }, (_, week) => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return `${monday(week)},${(200 + 20 * (state / 2 ** 32 - 0.5)).toFixed(1)}`;
  });
}

describe("what a forecast decided", () => {
  it("stands for a horizon of new values, and falls with a revision", async () => {
    const store = new MemoryStore();
    const all = rows(120);
    const madeOn: (string | undefined)[] = [];
    const run = async (lines: readonly string[], end: number) => {
      await store.write("series/till.csv", new TextEncoder().encode(["week,sales", ...lines, ""].join("\n")));
      const asOf = `${monday(end)}T06:00:00Z`;
      await runJob({ store, asOf, webhooks: [], settings: { horizon: 4 } });
      const [series] = (JSON.parse(store.texts()[modelKey("till", asOf)]) as ModelDocument).series;
      madeOn.push(series.choice?.lastPeriod);
    };
    for (let end = 104; end <= 109; end++) await run(all.slice(0, end), end);
    expect(madeOn).toEqual([103, 103, 103, 103, 107, 107].map(monday));
    const revised = all.map((line, week) => (week === 100 ? `${monday(100)},150.0` : line));
    await run(revised.slice(0, 110), 110);
    expect(madeOn.at(-1)).toBe(monday(109));
  });

  it("falls when a change was noticed since, and when its period is not in the series any more", () => {
    const before = { lastPeriod: "w9", changedAt: null, choice: {} as never };
    const question = { horizon: 4, newest: 11, indexOf: () => 9, changedAt: null, dataFindings: [] };
    expect(choiceThatStands(before, question)).toBe(before);
    expect(choiceThatStands(before, { ...question, changedAt: "w5" })).toBeUndefined();
    expect(choiceThatStands(before, { ...question, indexOf: () => 12 })).toBeUndefined();
    expect(choiceThatStands(null, question)).toBeUndefined();
  });
});
