import { civilDate, dayNumber, isoDate, isoDay, weekday } from "./civil.ts";
import type { Period } from "./series.ts";

/** The calendar steps, shortest first. */
export const periods = [
  "hour",
  "day",
  "week",
  "month",
  "quarter",
  "year",
] as const satisfies readonly Period[];

export const weekdays = [
  "monday",
  "tuesday",
  "wednesday",
  "thursday",
  "friday",
  "saturday",
  "sunday",
] as const;
export type Weekday = (typeof weekdays)[number];

const monthsIn = { month: 1, quarter: 3, year: 12 } as const;
const hourLength = 3_600_000;

/**
 * The number of a period on the calendar's own count: hours since 1970-01-01T00:00Z, days since 1970-01-01,
 * weeks (from the given weekday), months, quarters or years. Takes a day number, for hours an instant in milliseconds.
 */
export function ordinalOf(period: Period, at: number, weekStart: number): number {
  if (period === "hour") return Math.floor(at / hourLength);
  if (period === "day") return at;
  if (period === "week") return Math.floor((at + 3 - weekStart) / 7);
  const { year, month } = civilDate(at);
  return Math.floor((year * 12 + month - 1) / monthsIn[period]);
}

/** An instant to the second. */
export const isoInstant = (milliseconds: number) => `${new Date(milliseconds).toISOString().slice(0, 19)}Z`;

/** The start of the period with that ordinal, as an ISO date (an instant for hours). */
export function ordinalStart(period: Period, ordinal: number, weekStart: number): string {
  if (period === "hour") return isoInstant(ordinal * hourLength);
  if (period === "day") return isoDate(ordinal);
  if (period === "week") return isoDate(ordinal * 7 - 3 + weekStart);
  const months = ordinal * monthsIn[period];
  return isoDate(dayNumber(Math.floor(months / 12), (((months % 12) + 12) % 12) + 1, 1));
}

function atOf(text: string, period: Period): number {
  if (period !== "hour") return isoDay(text);
  const instant = Date.parse(text.includes("T") ? text : `${text}T00:00:00Z`);
  if (Number.isNaN(instant)) throw new RangeError(`${JSON.stringify(text)} is not an ISO instant`);
  return instant;
}

/**
 * The start of the period `index` steps after the one that starts at `start`: an ISO date, or for hours an instant.
 * Hours are 60 minutes of elapsed time from `start`, whatever a local clock does. Months, quarters and years start on a first.
 *
 * @example periodStart("2026-11-30", "week", 1) // "2026-12-07"
 * @throws RangeError when `start` is not a date
 */
export function periodStart(start: string, period: Period, index: number): string {
  const at = atOf(start, period);
  if (period === "hour") return isoInstant(at + index * hourLength);
  const weekStart = period === "week" ? weekday(at) : 0;
  return ordinalStart(period, ordinalOf(period, at, weekStart) + index, weekStart);
}

/**
 * How many periods after `start` the period lies that holds `date`; negative before it.
 *
 * @example periodIndex("2026-01-01", "month", "2026-03-17") // 2
 * @throws RangeError when either is not a date
 */
export function periodIndex(start: string, period: Period, date: string): number {
  const at = atOf(start, period);
  if (period === "hour") return Math.floor((atOf(date, period) - at) / hourLength);
  const weekStart = period === "week" ? weekday(at) : 0;
  return ordinalOf(period, atOf(date, period), weekStart) - ordinalOf(period, at, weekStart);
}
