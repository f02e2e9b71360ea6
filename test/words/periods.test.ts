import { describe, expect, it } from "vitest";
import { periodNames } from "../../lib/words/periods.ts";

const now = "2026-12-07T06:00:00Z";

describe("the name of a period", () => {
  it("is as short as it can be while it stays clear", () => {
    const when = (period: Parameters<typeof periodNames>[0], start: string) =>
      periodNames(period, "en-GB", "Europe/Lisbon", now).when(start);
    expect(when("week", "2026-12-07")).toBe("in the week of 7 December");
    expect(when("week", "2027-01-11")).toBe("in the week of 11 January");
    expect(when("week", "2025-12-08")).toBe("in the week of 8 December 2025");
    expect(when("day", "2026-12-07")).toBe("on Monday 7 December");
    expect(when("month", "2026-12-01")).toBe("in December 2026");
    expect(when("quarter", "2026-10-01")).toBe("in Q4 2026");
    expect(when("year", "2027-01-01")).toBe("in 2027");
  });

  it("of a date is the same in every time zone", () => {
    for (const zone of ["Pacific/Auckland", "America/Los_Angeles", "UTC"]) {
      expect(periodNames("day", "en-GB", zone, now).name("2026-12-07")).toBe("Monday 7 December");
      expect(periodNames("month", "en-GB", zone, now).name("2026-12-01")).toBe("December 2026");
    }
  });

  it("of an hour is told in the reader's time zone", () => {
    const at = (zone: string) => periodNames("hour", "en-GB", zone, now).when("2026-12-07T23:00:00Z");
    expect(at("Europe/Lisbon")).toBe("at 23:00 on Monday 7 December");
    expect(at("Europe/Berlin")).toBe("at 00:00 on Tuesday 8 December");
    expect(at("America/New_York")).toBe("at 18:00 on Monday 7 December");
  });

  it("refuses what is no date", () => {
    expect(() => periodNames("week", "en-GB", "UTC", now).name("soon")).toThrow(/"soon" is not an ISO date/);
  });

  it("follows the locale's order of day and month", () => {
    expect(periodNames("week", "en-US", "UTC", now).inText("2026-12-07")).toBe("the week of December 7");
    expect(periodNames("week", "de-DE", "UTC", now).inText("2026-12-07")).toBe("the week of 7. Dezember");
  });
});
