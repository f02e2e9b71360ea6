import { ordinalOf, ordinalStart, type Weekday, weekdays } from "./periods.ts";
import type { Period } from "./series.ts";
import { zoneOffset } from "./zone.ts";

/** The day number that a wall calendar in the zone shows at an instant. */
export function localDay(instant: number, timeZone: string): number {
  return Math.floor((instant + zoneOffset(instant, timeZone)) / 86_400_000);
}

/**
 * The start of the period that holds the instant `asOf`, and is therefore not over yet: an ISO date in the zone's
 * calendar, or for hours an instant.
 *
 * @example currentPeriod("2026-12-02T06:00:00Z", "week", "Europe/Lisbon") // "2026-11-30"
 * @throws RangeError when `asOf` is no instant or the zone is unknown
 */
export function currentPeriod(
  asOf: Date | string,
  period: Period,
  timeZone: string,
  weekStartsOn: Weekday = "monday",
): string {
  const instant = typeof asOf === "string" ? Date.parse(asOf) : asOf.getTime();
  if (Number.isNaN(instant))
    throw new RangeError(`asOf must be an ISO instant, received ${JSON.stringify(asOf)}`);
  const weekStart = weekdays.indexOf(weekStartsOn);
  const at = period === "hour" ? instant : localDay(instant, timeZone);
  return ordinalStart(period, ordinalOf(period, at, weekStart), weekStart);
}
