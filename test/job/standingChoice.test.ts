import { describe, expect, it } from "vitest";
import type { DescribingModel } from "../../lib/forecast/forecast.ts";
import { modelKey } from "../../lib/job/keys.ts";
import type { ModelDocument } from "../../lib/job/modelDocument.ts";
import { runJob } from "../../lib/job/run.ts";
import { simulateFading } from "../../lib/job/simulateFading.ts";
import { basisOf, choiceThatStands } from "../../lib/job/standingChoice.ts";
import { randomNormal } from "../../lib/numeric/randomNormal.ts";
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
    const before = { lastPeriod: "w9", changedAt: null, basis: "b", choice: {}, simulated: {} } as never;
    const question = {
      ...{ horizon: 4, newest: 11, indexOf: () => 9, changedAt: null, dataFindings: [] },
      basisUntil: () => "b",
    };
    expect(choiceThatStands(before, question)).toBe(before);
    expect(choiceThatStands(before, { ...question, changedAt: "w5" })).toBeUndefined();
    expect(choiceThatStands(before, { ...question, indexOf: () => 12 })).toBeUndefined();
    expect(choiceThatStands(before, { ...question, basisUntil: () => "c" })).toBeUndefined();
    expect(choiceThatStands(null, question)).toBeUndefined();
  });

  it("rests on the events of its past and on what an empty period means, not on events to come", () => {
    const basis = (settings: object, dates: readonly string[]) =>
      basisOf(
        settings,
        dates.map((day) => ({ name: "fair", from: day, until: day, tables: null })),
        "2025-01-06",
        "2026-11-30",
      );
    expect(basis({}, ["2026-05-01", "2027-05-01", "2024-05-01"])).toBe(basis({}, ["2026-05-01"]));
    expect(basis({}, ["2026-05-01"])).not.toBe(basis({}, []));
    expect(basis({ emptyMeans: "zero" }, [])).not.toBe(basis({}, []));
    expect(basis({ unit: "loans", horizon: 4 }, [])).toBe(basis({}, []));
  });

  it("rests on events that touch the first or the last period, wherever in it they fall", () => {
    const rests = (from: string, until: string, start: string, next: string, timeZone = "UTC") =>
      basisOf({ timeZone }, [{ name: "fair", from, until, tables: null }], start, next) !==
      basisOf({ timeZone }, [], start, next);
    const weeks = ["2025-01-06", "2026-11-30"] as const;
    expect(rests("2026-11-25", "2026-11-25", ...weeks)).toBe(true);
    expect(rests("2026-11-29", "2026-12-06", ...weeks)).toBe(true);
    expect(rests("2026-11-30", "2026-12-06", ...weeks)).toBe(false);
    expect(rests("2024-12-20", "2025-01-06", ...weeks)).toBe(true);
    expect(rests("2024-12-20", "2025-01-05", ...weeks)).toBe(false);
    // Noon to four of the afternoon of 30 November in London, which is the small hours of 1 December in Auckland.
    const hours = ["2026-11-30T12:00:00Z", "2026-11-30T16:00:00Z"] as const;
    expect(rests("2026-12-01", "2026-12-01", ...hours)).toBe(false);
    expect(rests("2026-12-01", "2026-12-01", ...hours, "Pacific/Auckland")).toBe(true);
    expect(rests("2026-11-30", "2026-11-30", ...hours)).toBe(true);
    expect(rests("2026-11-30", "2026-11-30", ...hours, "Pacific/Auckland")).toBe(false);
  });
});

describe("what is simulated for an account", () => {
  const model = (coefficient: number, observations = 100): DescribingModel => ({
    ...{ scale: "raw", trend: false, season: 0, weight: 1 },
    fit: {
      ...{ method: "maximum-likelihood", order: 1, mean: 0, meanStandardError: 1, innovationVariance: 1 },
      ...{ logLikelihood: 0, aic: 0, aicc: 0, bic: 0, observations },
      coefficients: Float64Array.of(coefficient),
      standardErrors: Float64Array.of(0.08),
      residuals: new Float64Array(observations),
    },
  });
  const normal = randomNormal(2);
  const values = Float64Array.from({ length: 100 }, normal);

  it("is kept for small steps, but not for many of them in one direction, nor for a longer series", () => {
    const first = simulateFading(model(0.6), values);
    expect(simulateFading(model(0.61), values, first)).toBe(first);
    expect(simulateFading(model(0.615), values, simulateFading(model(0.61), values, first))).toBe(first);
    // Two steps of 0.19 standard errors are 0.38 from the fit it was simulated for.
    const further = simulateFading(model(0.63), values, simulateFading(model(0.615), values, first));
    expect(further).not.toBe(first);
    expect(further).toEqual(simulateFading(model(0.63), values));
    expect(simulateFading(model(0.6, 106), values, first)).toBe(first);
    expect(simulateFading(model(0.6, 107), values, first)).not.toBe(first);
  });

  it("is not kept for a half-life outside its range", () => {
    const first = { ...simulateFading(model(0.6), values), halfLifeRange: { low: 5, high: null } };
    expect(simulateFading(model(0.6), values, first)).not.toBe(first);
  });
});
