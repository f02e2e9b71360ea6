import { addHours, addMonths, differenceInCalendarISOWeeks, getISOWeek, getISOWeekYear } from "date-fns";
import * as fc from "fast-check";
import { describe, expect, it } from "vitest";
import { civilDate, dayNumber, isoDate, isoDay, isoWeekStart, weekday } from "../../lib/series/civil.ts";
import { currentPeriod } from "../../lib/series/currentPeriod.ts";
import { periodIndex, periodStart, periods, weekdays } from "../../lib/series/periods.ts";
import { periodsLate } from "../../lib/series/periodsLate.ts";

const day = 86_400_000;
const anyDay = fc.integer({ min: -700_000, max: 700_000 });

describe("the civil calendar", () => {
  it("agrees with Date, the proleptic Gregorian calendar of ECMA-262", () => {
    fc.assert(
      fc.property(anyDay, (days) => {
        const date = new Date(days * day);
        expect(civilDate(days)).toEqual({
          year: date.getUTCFullYear(),
          month: date.getUTCMonth() + 1,
          day: date.getUTCDate(),
        });
        expect(dayNumber(date.getUTCFullYear(), date.getUTCMonth() + 1, date.getUTCDate())).toBe(days);
        expect(weekday(days)).toBe((date.getUTCDay() + 6) % 7);
      }),
    );
  });

  it("writes and reads ISO dates", () => {
    expect(isoDate(0)).toBe("1970-01-01");
    expect(isoDay("2000-02-29")).toBe(Date.UTC(2000, 1, 29) / day);
    expect(() => isoDay("2023-02-29")).toThrow(RangeError);
    expect(() => isoDay("30/11/2026")).toThrow(RangeError);
  });
});

describe("isoWeekStart", () => {
  // ISO 8601:2004, 3.2.2, 4.1.4 and annex B; the table of the week dates of 1 January and 31 December is in
  // the usual accounts of the standard (English Wikipedia, "ISO week date", Examples).
  it.each([
    [1976, 53, 6, "1977-01-01"],
    [1977, 52, 6, "1977-12-31"],
    [1977, 52, 7, "1978-01-01"],
    [1978, 1, 1, "1978-01-02"],
    [1978, 52, 7, "1978-12-31"],
    [1979, 1, 1, "1979-01-01"],
    [1980, 1, 1, "1979-12-31"],
    [1980, 1, 2, "1980-01-01"],
    [1980, 52, 7, "1980-12-28"],
    [1981, 1, 3, "1980-12-31"],
    [1981, 53, 4, "1981-12-31"],
    [1981, 53, 5, "1982-01-01"],
    [1982, 52, 5, "1982-12-31"],
    [1983, 52, 6, "1983-12-31"],
    [1985, 15, 5, "1985-04-12"],
    [1995, 1, 7, "1995-01-08"],
    [1996, 52, 2, "1996-12-24"],
    [2004, 53, 6, "2005-01-01"],
    [2009, 1, 1, "2008-12-29"],
    [2009, 53, 7, "2010-01-03"],
  ])("puts %i-W%i-%i on %s, as ISO 8601 does", (year, week, dayOfWeek, date) => {
    expect(isoDate((isoWeekStart(year, week) as number) + dayOfWeek - 1)).toBe(date);
  });

  it("agrees with date-fns on every day of two centuries, and knows no week that a year has not", () => {
    for (let days = isoDay("1900-01-01"); days < isoDay("2100-01-01"); days++) {
      const { year, month, day: dayOfMonth } = civilDate(days);
      const local = new Date(year, month - 1, dayOfMonth);
      expect(isoWeekStart(getISOWeekYear(local), getISOWeek(local))).toBe(days - weekday(days));
    }
    expect(isoWeekStart(2021, 53)).toBeUndefined();
    expect(isoWeekStart(2020, 53)).toBe(isoDay("2020-12-28"));
    expect(isoWeekStart(2020, 0)).toBeUndefined();
  });
});

describe("periodStart and periodIndex", () => {
  it("undo each other for every period", () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...periods),
        fc.integer({ min: -300_000, max: 300_000 }),
        fc.integer({ min: -500, max: 500 }),
        (period, days, index) => {
          const date = period === "hour" ? `${isoDate(days)}T05:00:00Z` : isoDate(days);
          const start = periodStart(date, period, 0);
          expect(periodIndex(start, period, periodStart(start, period, index))).toBe(index);
        },
      ),
    );
  });

  it("step months, quarters and years as date-fns does from a first", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1900, max: 2100 }),
        fc.integer({ min: 0, max: 11 }),
        fc.integer({ min: 0, max: 90 }),
        (year, month, index) => {
          const local = addMonths(new Date(year, month, 1), index);
          const expected = `${local.getFullYear()}-${String(local.getMonth() + 1).padStart(2, "0")}-01`;
          const start = `${year}-${String(month + 1).padStart(2, "0")}-01`;
          expect(periodStart(start, "month", index)).toBe(expected);
        },
      ),
    );
    expect(periodStart("2026-01-01", "quarter", 5)).toBe("2027-04-01");
    expect(periodStart("2026-01-01", "year", -2)).toBe("2024-01-01");
  });

  it("keep the weekday a series of weeks began with", () => {
    expect(periodStart("2026-11-25", "week", 2)).toBe("2026-12-09");
    expect(periodIndex("2026-11-25", "week", "2026-12-08")).toBe(1);
    expect(periodIndex("2026-11-23", "week", "2026-11-22")).toBe(-1);
    expect(differenceInCalendarISOWeeks(new Date(2026, 11, 8), new Date(2026, 10, 23))).toBe(
      periodIndex("2026-11-23", "week", "2026-12-08"),
    );
  });

  it("count hours as elapsed time, half hours kept", () => {
    const start = "2026-10-25T00:00:00Z";
    expect(periodStart(start, "hour", 3)).toBe(`${addHours(new Date(start), 3).toISOString().slice(0, 19)}Z`);
    expect(periodStart("2026-03-01T04:30:00Z", "hour", 2)).toBe("2026-03-01T06:30:00Z");
    expect(periodIndex("2026-03-01T04:30:00Z", "hour", "2026-03-01T06:29:00Z")).toBe(1);
  });

  it("refuse what is no date", () => {
    expect(() => periodStart("soon", "day", 1)).toThrow(RangeError);
    expect(() => periodIndex("2026-01-01", "hour", "soon")).toThrow(RangeError);
  });
});

describe("currentPeriod and periodsLate", () => {
  it("end a day by the zone's own midnight", () => {
    expect(currentPeriod("2026-12-01T04:30:00Z", "day", "America/New_York")).toBe("2026-11-30");
    expect(currentPeriod("2026-12-01T05:30:00Z", "day", "America/New_York")).toBe("2026-12-01");
    expect(currentPeriod("2026-11-30T12:00:00Z", "month", "Pacific/Auckland")).toBe("2026-12-01");
  });

  it.each([...weekdays.entries()])("begin weeks as told (%i, %s)", (index, weekStartsOn) => {
    const start = currentPeriod("2026-12-02T12:00:00Z", "week", "UTC", weekStartsOn);
    expect(weekday(isoDay(start))).toBe(index);
    expect(isoDay("2026-12-02") - isoDay(start)).toBeLessThan(7);
  });

  it("refuse an instant or zone that is none", () => {
    expect(() => currentPeriod("soon", "day", "UTC")).toThrow(RangeError);
    expect(() => currentPeriod("2026-12-01T00:00:00Z", "day", "Mars/Base")).toThrow(RangeError);
  });

  it("count the periods that are over and missing", () => {
    expect(periodsLate("2026-11-23", "week", "2026-11-30T06:00:00Z", "Europe/Lisbon")).toBe(0);
    expect(periodsLate("2026-11-16", "week", "2026-11-30T06:00:00Z", "Europe/Lisbon")).toBe(1);
    expect(periodsLate("2026-11-18", "week", "2026-12-01T06:00:00Z", "Europe/Lisbon")).toBe(0);
    expect(periodsLate("2026-09-01", "month", "2026-12-01T06:00:00Z", "Europe/Lisbon")).toBe(2);
    expect(periodsLate("2026-12-05", "day", "2026-12-01T06:00:00Z", "Europe/Lisbon")).toBe(0);
    expect(periodsLate("2026-12-01T04:30:00Z", "hour", "2026-12-01T06:20:00Z", "Asia/Kolkata")).toBe(0);
    expect(periodsLate("2026-12-01T04:30:00Z", "hour", "2026-12-01T06:40:00Z", "Asia/Kolkata")).toBe(1);
  });
});
