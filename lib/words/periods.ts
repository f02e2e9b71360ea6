import type { Period } from "../series/series.ts";
import { dateFormat } from "./formats.ts";

const hour = 3_600_000;

/** The instant a period named by an ISO date or instant starts, in milliseconds. Dates are read as UTC. */
export function instantOf(period: string): number {
  const instant = Date.parse(period);
  if (Number.isNaN(instant))
    throw new RangeError(`instantOf: ${JSON.stringify(period)} is not an ISO date or instant`);
  return instant;
}

/** How a period is named, and how it stands in a sentence after "since" or "for". */
export interface PeriodNames {
  /** "week of 7 December", "Monday 7 December", "December 2026", "Q4 2026", "2026". */
  readonly name: (start: string) => string;
  /** The name as it stands inside a sentence: "the week of 7 December". */
  readonly inText: (start: string) => string;
  /** "in the week of 7 December", "on Monday 7 December", "at 14:00 on Monday 7 December". */
  readonly when: (start: string) => string;
  /** Short label for an axis: "7 Dec". */
  readonly short: (start: string) => string;
  /** Short label for an axis over more than most of a year: "Dec 2026". */
  readonly coarse: (start: string) => string;
}

/**
 * Names for the periods of one series. Dates are calendar dates and are the same everywhere; hours are
 * instants and are told in `timeZone`. The year is left out of days and weeks within about half a year of `now`.
 */
export function periodNames(period: Period, locale: string, timeZone: string, now: string): PeriodNames {
  const zone = period === "hour" ? timeZone : "UTC";
  const format = (options: Intl.DateTimeFormatOptions) => {
    return (start: string) => dateFormat(locale, { timeZone: zone, ...options }).format(instantOf(start));
  };
  const near = (start: string) => Math.abs(instantOf(start) - instantOf(now)) < 183 * 24 * hour;
  const yearly = (short: (start: string) => string, long: (start: string) => string) => (start: string) =>
    near(start) ? short(start) : long(start);
  const dayAndMonth = yearly(
    format({ day: "numeric", month: "long" }),
    format({ day: "numeric", month: "long", year: "numeric" }),
  );
  const weekday = yearly(
    format({ weekday: "long", day: "numeric", month: "long" }),
    format({ weekday: "long", day: "numeric", month: "long", year: "numeric" }),
  );
  const monthAndYear = format({ month: "long", year: "numeric" });
  const year = format({ year: "numeric" });
  const time = format({ hour: "2-digit", minute: "2-digit" });
  const shortDay = format({ day: "numeric", month: "short" });
  const quarter = (start: string) => {
    const month = new Date(instantOf(start)).getUTCMonth();
    return `Q${Math.floor(month / 3) + 1} ${year(start)}`;
  };
  const shortMonth = format({ month: "short", year: "numeric" });
  const bare = (name: (start: string) => string, short = name): PeriodNames => ({
    name,
    inText: name,
    when: (start) => `in ${name(start)}`,
    short,
    coarse: short,
  });
  switch (period) {
    case "hour":
      return {
        name: (start) => `${weekday(start)}, ${time(start)}`,
        inText: (start) => `${time(start)} on ${weekday(start)}`,
        when: (start) => `at ${time(start)} on ${weekday(start)}`,
        short: (start) => `${shortDay(start)} ${time(start)}`,
        coarse: shortMonth,
      };
    case "day":
      return {
        name: weekday,
        inText: weekday,
        when: (start) => `on ${weekday(start)}`,
        short: shortDay,
        coarse: shortMonth,
      };
    case "week": {
      const name = (start: string) => `week of ${dayAndMonth(start)}`;
      return {
        name,
        inText: (start) => `the ${name(start)}`,
        when: (start) => `in the ${name(start)}`,
        short: shortDay,
        coarse: shortMonth,
      };
    }
    case "month":
      return bare(monthAndYear, shortMonth);
    case "quarter":
      return bare(quarter);
    case "year":
      return bare(year);
  }
}
