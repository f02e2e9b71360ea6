import { describe, expect, it } from "vitest";
import { adjustForEvents } from "../../lib/job/eventEffects.ts";
import { periodStart } from "../../lib/series/periods.ts";
import type { KnownEvent } from "../../lib/series/readEvents.ts";
import type { Series } from "../../lib/series/series.ts";
import { withR } from "../support/r.ts";

const start = "2022-01-03";
const weeks = 180;
const fairWeeks = [20, 45, 72, 97, 124, 149, 171];

/** An AR(1) around 200 with a fair that adds 60 in some weeks; shocks from a fixed congruential generator. */
function fairSeries(effect: number): Series {
  let state = 2024;
  const uniform = () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32 - 0.5;
  };
  let deviation = 0;
  const values = Float64Array.from({ length: weeks }, (_, week) => {
    deviation = 0.5 * deviation + 12 * (uniform() + uniform() + uniform());
    return 200 + deviation + (fairWeeks.includes(week) ? effect : 0);
  });
  return { name: "Quay", period: "week", start, values, observed: weeks, gaps: 0 };
}

const fair = (week: number): KnownEvent => {
  const from = periodStart(start, "week", week);
  return { name: "fair", from, until: periodStart(from, "day", 6), tables: null };
};
const context = {
  table: "loans",
  horizon: 4,
  timeZone: "UTC",
  periodOf: (ahead: number) => periodStart(start, "week", weeks + ahead),
};
const r = withR();

describe("known events", () => {
  it("have the effect that R's arima gives the same regression, and come off the past", async () => {
    const series = fairSeries(60);
    const { findings, values, effects } = adjustForEvents(
      series,
      0,
      [...fairWeeks, weeks + 1].map(fair),
      context,
    );
    expect(findings).toMatchObject([{ code: "event-effect", name: "fair" }]);
    // R: arima(x, order = c(p, 0, 0), xreg = fair, method = "ML"), whatever small order was chosen here.
    await r.assign("x", series.values);
    await r.assign(
      "fair",
      Array.from({ length: weeks }, (_, week) => (fairWeeks.includes(week) ? 1 : 0)),
    );
    const [effect, error] = await r.evaluate(
      'f <- arima(x, order = c(1, 0, 0), xreg = fair, method = "ML"); c(coef(f)["fair"], sqrt(diag(f$var.coef))["fair"])',
    );
    expect(Math.abs(findings[0].effect - effect)).toBeLessThan(error);
    expect(Math.abs(findings[0].effect - 60)).toBeLessThan(3 * findings[0].standardError);
    expect(values[20]).toBeCloseTo(series.values[20] - findings[0].effect, 9);
    const coming = effects.subarray(weeks);
    expect(Array.from(coming, (amount) => amount !== 0)).toEqual([false, true, false, false]);
    expect(coming[1]).toBeCloseTo(findings[0].effect, 9);
    expect(findings[0].coming).toEqual([
      { period: periodStart(start, "week", weeks + 1), amount: findings[0].effect },
    ]);
  });

  it("without evidence of an effect change nothing", () => {
    const series = fairSeries(0);
    const { findings, values } = adjustForEvents(series, 0, fairWeeks.map(fair), context);
    expect(findings).toEqual([]);
    expect(Array.from(values)).toEqual(Array.from(series.values));
  });

  it("are learnt from the values since a series began, not from the zeros before", () => {
    // Twelve values are too few to learn from, however many zeros stand before them.
    const short = fairSeries(0);
    short.values.fill(0, 0, weeks - 12);
    const { findings } = adjustForEvents(short, weeks - 12, fairWeeks.map(fair), context);
    expect(findings).toEqual([]);
    const long = fairSeries(60);
    const began = 50;
    const since = { ...long, start: periodStart(start, "week", began), values: long.values.slice(began) };
    const alone = adjustForEvents({ ...since, observed: weeks - began }, 0, fairWeeks.map(fair), context);
    long.values.fill(0, 0, began);
    const among = adjustForEvents(long, began, fairWeeks.map(fair), context);
    expect(among.findings).toEqual(alone.findings);
    expect([...among.values]).toEqual([...long.values.subarray(0, began), ...alone.values]);
    expect([...among.effects]).toEqual([...new Float64Array(began), ...alone.effects]);
  });

  it("meant for other tables are left aside", () => {
    const events = fairWeeks.map((week) => ({ ...fair(week), tables: ["desk-calls"] }));
    expect(adjustForEvents(fairSeries(60), 0, events, context).findings).toEqual([]);
  });

  it("that fall on every period cannot be told from the level, and are left aside without a failure", () => {
    const always = Array.from({ length: weeks + 4 }, (_, week) => fair(week));
    expect(adjustForEvents(fairSeries(60), 0, always, context).findings).toEqual([]);
  });
});

describe("events that always fall together", () => {
  const name = (one: KnownEvent, other: string): KnownEvent => ({ ...one, name: other });

  it("become one effect under both names, and leave the others theirs", () => {
    const together = fairWeeks.flatMap((week) => [
      name(fair(week), "Good Friday"),
      name(fair(week), "Easter"),
    ]);
    const others = [10, 60, 110, 160].map((week) => name(fair(week), "sale"));
    const { findings } = adjustForEvents(fairSeries(60), 0, [...together, ...others], context);
    expect(findings.map((finding) => finding.name)).toEqual(["Good Friday and Easter"]);
    expect(Math.abs(findings[0].effect - 60)).toBeLessThan(3 * findings[0].standardError);
  });

  it("or are made up by two others leave those two theirs", () => {
    const [early, late] = [fairWeeks.slice(0, 4), fairWeeks.slice(4)];
    const events = [
      ...early.map((week) => name(fair(week), "spring fair")),
      ...late.map((week) => name(fair(week), "autumn fair")),
      ...fairWeeks.map((week) => name(fair(week), "any fair")),
    ];
    const { findings } = adjustForEvents(fairSeries(60), 0, events, context);
    expect(findings.map((finding) => finding.name).sort()).toEqual(["autumn fair", "spring fair"]);
  });
});
