import type { Calendar } from "./calendar.ts";
import { isoDay } from "./civil.ts";
import { currentPeriod } from "./currentPeriod.ts";
import { isoInstant, ordinalOf, ordinalStart, weekdays } from "./periods.ts";

/** The dates of a table on the count of its periods. */
export interface Grid {
  /** Key indexes by date, ascending; keys without a date are not in it. */
  readonly order: Int32Array;
  /** The ordinal of the period of each, in the same order. */
  readonly ordinals: Int32Array;
  /** How many of them lie before the period that is not over yet. */
  readonly complete: number;
  /** First period that is not over. */
  readonly current: number;
}

const hourLength = 3_600_000;

/** Number of the period that holds a day, or for hours an instant. */
export function ordinalAt({ every, weekStart, phase }: Calendar, at: number): number {
  return ordinalOf(every, every === "hour" ? at - phase : at, weekStart);
}

/** Start of a period, as an ISO date or instant. */
export function startOf({ every, weekStart, phase }: Calendar, ordinal: number): string {
  if (every !== "hour" || phase === 0) return ordinalStart(every, ordinal, weekStart);
  return isoInstant(ordinal * hourLength + phase);
}

/** @param order indexes of `at` by date */
export function layGrid(
  order: Int32Array,
  at: Float64Array,
  calendar: Calendar,
  asOf: Date | string,
  timeZone: string,
): Grid {
  const ordinals = order.map((index) => ordinalAt(calendar, at[index]));
  const { every, weekStart } = calendar;
  const current =
    every === "hour"
      ? ordinalAt(calendar, new Date(asOf).getTime())
      : ordinalAt(calendar, isoDay(currentPeriod(asOf, every, timeZone, weekdays[weekStart])));
  let complete = ordinals.length;
  while (complete > 0 && ordinals[complete - 1] >= current) complete--;
  return { order, ordinals, complete, current };
}
