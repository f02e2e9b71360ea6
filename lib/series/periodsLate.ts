import { isoDay, weekday } from "./civil.ts";
import { currentPeriod } from "./currentPeriod.ts";
import { periodIndex, weekdays } from "./periods.ts";
import type { Period } from "./series.ts";

/**
 * How many periods that are over at `asOf` have no value after the last one read; 0 when the table is up to date.
 *
 * @example periodsLate("2026-11-16", "week", "2026-11-30T06:00:00Z", "Europe/Lisbon") // 1: the week of 23 November
 * @throws RangeError when a date or the zone is unknown
 */
export function periodsLate(
  lastPeriod: string,
  period: Period,
  asOf: Date | string,
  timeZone: string,
): number {
  if (period === "hour")
    return Math.max(0, periodIndex(lastPeriod, period, new Date(asOf).toISOString()) - 1);
  const weekStart = period === "week" ? weekdays[weekday(isoDay(lastPeriod))] : "monday";
  const current = currentPeriod(asOf, period, timeZone, weekStart);
  return Math.max(0, periodIndex(lastPeriod, period, current) - 1);
}
