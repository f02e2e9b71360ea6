import { describe, expect, it } from "vitest";
import { eventColumns } from "../../lib/series/eventColumns.ts";
import { publicHolidays } from "../../lib/series/publicHolidays.ts";
import { readEvents } from "../../lib/series/readEvents.ts";
import type { Period, Series } from "../../lib/series/series.ts";

const series = (period: Period, start: string, count: number): Series => ({
  name: "v",
  period,
  start,
  values: new Float64Array(count).fill(1),
  observed: count,
  gaps: 0,
});
const options = { table: "loans", horizon: 2, timeZone: "Europe/Lisbon" };

describe("readEvents", () => {
  it("reads date and name, with until and tables where they stand", () => {
    const { events, problems } = readEvents(
      "date,name,until,tables\n2026-03-04,street fair,,\n2026-03-10,closed,2026-03-20,loans north/loans\n5 May 2026,book day,,\n",
      "events/city.csv",
    );
    expect(problems).toEqual([]);
    expect(events).toEqual([
      { name: "street fair", from: "2026-03-04", until: "2026-03-04", tables: null },
      { name: "closed", from: "2026-03-10", until: "2026-03-20", tables: ["loans", "north/loans"] },
      { name: "book day", from: "2026-05-05", until: "2026-05-05", tables: null },
    ]);
  });

  it("says which events it had to leave out, and keeps the others", () => {
    const { events, problems } = readEvents(
      "name;date;until\nfair;2026-03-04;\n;2026-03-05;\nsale;soon;\nlate;2026-03-09;2026-03-08\n",
      "events/city.csv",
    );
    expect(events.map(({ name }) => name)).toEqual(["fair"]);
    expect(problems.map(({ line, code, fatal }) => [line, code, fatal])).toEqual([
      [3, "no-name", false],
      [4, "bad-date", false],
      [5, "bad-date", false],
    ]);
  });

  it("asks for the two columns an events file needs", () => {
    expect(readEvents("when,how\n2026-03-04,fair\n", "events/city.csv").problems).toMatchObject([
      { line: 1, code: "events-header", fatal: true },
    ]);
    expect(readEvents("", "events/city.csv").problems).toMatchObject([
      { code: "events-header", fatal: true },
    ]);
  });
});

describe("eventColumns", () => {
  const fair = { name: "fair", from: "2026-03-04", until: "2026-03-04", tables: null };

  it("marks the day of an event, past and to come", () => {
    const next = { ...fair, from: "2026-03-07", until: "2026-03-07" };
    expect(eventColumns([fair, next], series("day", "2026-03-02", 5), options)).toEqual([
      { name: "fair", values: Float64Array.of(0, 0, 1, 0, 0, 1, 0), seen: 1 },
    ]);
  });

  it("gives a week the share of the days a closure took of it", () => {
    const closed = { name: "closed", from: "2026-03-05", until: "2026-03-18", tables: null };
    // Thursday to Sunday are four days, then seven, then Monday to Wednesday three.
    expect(eventColumns([closed], series("week", "2026-03-02", 3), options)[0].values).toEqual(
      Float64Array.of(4 / 7, 1, 3 / 7, 0, 0),
    );
  });

  it("marks the hours of the zone's day", () => {
    const [{ values }] = eventColumns([fair], series("hour", "2026-03-03T22:00:00Z", 28), options);
    expect([...values].map((value, at) => (value ? at : -1)).filter((at) => at >= 0)).toEqual(
      Array.from({ length: 24 }, (_, at) => at + 2),
    );
  });

  it("leaves out events of other tables, and those never seen in a period with a value", () => {
    const other = { ...fair, tables: ["members"] };
    const future = { ...fair, from: "2026-03-20", until: "2026-03-20" };
    expect(eventColumns([other], series("day", "2026-03-02", 5), options)).toEqual([]);
    expect(eventColumns([future], series("day", "2026-03-02", 5), options)).toEqual([]);
    const withGap = series("day", "2026-03-02", 5);
    withGap.values[2] = Number.NaN;
    expect(eventColumns([fair], withGap, options)).toEqual([]);
  });
});

describe("publicHolidays", () => {
  // Lei n.º 7/2009 (Código do Trabalho), artigo 234.º; Easter 2026 is 5 April (Meeus, Astronomical Algorithms, ch. 8).
  it("knows the mandatory holidays of Portugal in 2026", async () => {
    const holidays = await publicHolidays("PT", 2026, 2026);
    const days = holidays.map(({ from }) => from);
    for (const day of [
      "2026-01-01",
      "2026-04-03",
      "2026-04-05",
      "2026-04-25",
      "2026-05-01",
      "2026-06-04",
      "2026-06-10",
      "2026-08-15",
      "2026-10-05",
      "2026-11-01",
      "2026-12-01",
      "2026-12-08",
      "2026-12-25",
    ])
      expect(days).toContain(day);
    expect(days).toHaveLength(13);
    expect(holidays.every(({ from, until, tables }) => from === until && tables === null)).toBe(true);
  });

  it("knows a region's own holidays, and calls a holiday by one name in every year", async () => {
    const bavaria = await publicHolidays("DE-BY", 2025, 2026);
    const berlin = await publicHolidays("DE-BE", 2025, 2026);
    expect(bavaria.filter(({ from }) => from.endsWith("-01-06"))).toHaveLength(2);
    expect(berlin.filter(({ from }) => from.endsWith("-01-06"))).toHaveLength(0);
    expect(new Set(bavaria.filter(({ from }) => from.endsWith("-01-06")).map(({ name }) => name)).size).toBe(
      1,
    );
  });

  it("refuses a country it does not know", async () => {
    await expect(publicHolidays("XX", 2026, 2026)).rejects.toThrow(RangeError);
  });
});
