import { describe, expect, it } from "vitest";
import { runJob } from "../../lib/job/run.ts";
import { seeded } from "../support/faultProxy.ts";
import { fillStore } from "../support/jobStores.ts";
import { MemoryStore } from "../support/memoryStore.ts";

/** Values by week, "" for a gap, of series that divide by zero somewhere if anything does. */
const awkward: Readonly<Record<string, (week: number, random: () => number) => number | "">> = {
  constant: () => 7,
  zero: () => 0,
  "constant after a gap": (week) => (week < 10 ? "" : 4),
  "constant with gaps": (week) => (week % 3 === 1 ? "" : 4),
  "constant, then another constant": (week) => (week < 60 ? 1 : 2),
  "constant, then noise": (week, random) => (week < 60 ? 5 : 5 + random()),
  "noise, then constant": (week, random) => (week < 60 ? 5 + random() : 5),
  "one spike": (week) => (week === 60 ? 100 : 5),
  "spike at the end": (week) => (week === 110 ? 100 : 5),
  line: (week) => week,
  parabola: (week) => -week * week,
  doubling: (week) => 2 ** (week / 4),
  alternating: (week) => week % 2,
  "seldom one": (week) => (week % 13 === 0 ? 1 : 0),
  "mostly gaps": (week) => (week % 9 === 0 ? 10 + (week % 4) : ""),
  "one gap in four": (week, random) => (week % 4 === 3 ? "" : 10 + random()),
  "large offset": (_, random) => 1e12 + random(),
  "large numbers": (_, random) => 1e100 * random(),
  "small numbers": (_, random) => 1e-9 * random(),
  "random walk": (() => {
    let at = 0;
    return (_: number, random: () => number) => {
      at += random() - 0.5;
      return at;
    };
  })(),
};

/** The same series as a weekly table of so many weeks from 2024-01-01. */
function table(name: string, weeks: number): string {
  const random = seeded(1);
  const rows = Array.from({ length: weeks }, (_, week) => {
    const date = new Date(Date.UTC(2024, 0, 1 + 7 * week)).toISOString().slice(0, 10);
    return `${date},${awkward[name]!(week, random)}`;
  });
  return `week,value\n${rows.join("\n")}\n`;
}

describe("a table that is awkward", () => {
  it.each(Object.keys(awkward))("(%s) is forecast in numbers, run after run", async (name) => {
    const store = new MemoryStore();
    for (const weeks of [3, 5, 8, 24, 100, 101, 106, 112]) {
      await fillStore(store, { "series/t.csv": table(name, weeks) });
      const asOf = new Date(Date.UTC(2024, 0, 1 + 7 * weeks, 6)).toISOString();
      const { failed } = await runJob({ store, asOf, webhooks: [] });
      const gone = name === "constant after a gap" && weeks < 10;
      // Nothing but gaps is no series; that is a problem with a remedy.
      if (gone || (name === "mostly gaps" && weeks < 24)) continue;
      expect(failed, `${weeks} weeks`).toEqual([]);
      const [head, ...rows] = store.texts()["forecasts/t/latest.csv"]!.trim().split("\n");
      expect(rows, head).toHaveLength(8);
      for (const row of rows) {
        const [point, low80, high80, low95, high95] = row.split(",").slice(2).map(Number) as [
          number,
          number,
          number,
          number,
          number,
        ];
        for (const value of [point, low80, high80, low95, high95])
          expect(Number.isFinite(value), row).toBe(true);
        expect(low95 <= low80 && low80 <= high80 && high80 <= high95, row).toBe(true);
      }
      for (const [key, text] of Object.entries(store.texts())) {
        if (!key.startsWith("series/")) expect(text, key).not.toMatch(/\bNaN\b|\bundefined\b|-?\bInfinity\b/);
      }
    }
  });
});

describe("counts with closures known beforehand", () => {
  it("stay at zero or above in the closed weeks to come", async () => {
    const random = seeded(4);
    const closed = [12, 24, 37, 51, 66, 80, 95, 101, 105];
    const monday = (week: number) => new Date(Date.UTC(2024, 0, 1 + 7 * week)).toISOString().slice(0, 10);
    const rows = Array.from(
      { length: 104 },
      (_, week) => `${monday(week)},${closed.includes(week) ? 0 : 8 + Math.floor(9 * random())}`,
    );
    const store = new MemoryStore();
    await fillStore(store, {
      "series/t.csv": `week,value\n${rows.join("\n")}\n`,
      "events/closures.csv": `date,name\n${closed.map((week) => `${monday(week)},closed`).join("\n")}\n`,
    });
    await runJob({ store, asOf: `${monday(104)}T06:00:00Z`, webhooks: [] });
    const lines = store.texts()["forecasts/t/latest.csv"]!.trim().split("\n").slice(1);
    const closedWeek = lines
      .find((line) => line.includes(monday(105)))!
      .split(",")
      .slice(2)
      .map(Number);
    expect(closedWeek[0]).toBeLessThan(4);
    for (const line of lines) {
      for (const value of line.split(",").slice(2).map(Number)) expect(value, line).toBeGreaterThanOrEqual(0);
    }
  });
});

describe("a branch that opened after its table began", () => {
  it("has the effect of events from when it was open, and says where it began", async () => {
    const random = seeded(6);
    const monday = (week: number) => new Date(Date.UTC(2024, 0, 1 + 7 * week)).toISOString().slice(0, 10);
    const works = Array.from({ length: 12 }, (_, quarter) => 5 + 11 * quarter);
    const rows = Array.from({ length: 130 }, (_, week) => {
      const sold = 60 + Math.floor(9 * random()) - (works.includes(week) ? 20 : 0);
      return `${monday(week)},${week < 60 ? 0 : sold}`;
    });
    const store = new MemoryStore();
    await fillStore(store, {
      "series/t.csv": `week,value\n${rows.join("\n")}\n`,
      "events/works.csv": `date,name\n${works.map((week) => `${monday(week)},works`).join("\n")}\n`,
    });
    await runJob({ store, asOf: `${monday(130)}T06:00:00Z`, webhooks: [] });
    const [key] = Object.keys(store.texts()).filter((one) => one.startsWith("models/t/"));
    const { findings } = JSON.parse(store.texts()[key!]!).series[0].facts;
    const effect = findings.find((one: { code: string }) => one.code === "event-effect");
    expect(Math.abs(effect.effect + 20)).toBeLessThan(3 * effect.standardError);
    expect(findings).toContainEqual({ code: "forecast-note", note: { code: "zeros-first", index: 60 } });
    const [line] = store.texts()["forecasts/t/latest.csv"]!.split("\n").slice(1);
    expect(line!.split(",").slice(3).map(Number).every(Number.isInteger), line).toBe(true);
  });
});
