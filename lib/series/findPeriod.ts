import { civilDate, daysInMonth, weekday } from "./civil.ts";
import { ordinalOf } from "./periods.ts";
import type { Period } from "./series.ts";

/** Upper ends, in days, of the usual distance between two dates of a series, and the period it speaks for. */
const spans: readonly (readonly [low: number, high: number, period: Period])[] = [
  [1, 4, "day"],
  [5, 9, "week"],
  [13, 15, "week"],
  [26, 35, "month"],
  [55, 66, "month"],
  [84, 98, "quarter"],
  [175, 190, "quarter"],
  [350, 380, "year"],
];

const median = (values: readonly number[]) => [...values].sort((a, b) => a - b)[values.length >> 1];

/**
 * The step of a series from its distinct days, ascending, by the usual distance between neighbours, so that gaps and
 * a holiday's shifted date do not matter. `undefined` when no step fits.
 */
export function periodOfDays(days: readonly number[]): Period | undefined {
  if (days.length < 2) return undefined;
  const steps = days.slice(1).map((day, at) => day - days[at]);
  const dates = days.map(civilDate);
  const isMonthly =
    dates.every(({ day }) => day === dates[0].day) ||
    dates.every(({ year, month, day }) => day === daysInMonth(year, month));
  const usual = median(steps);
  if (isMonthly && usual >= 28) {
    const months = days
      .slice(1)
      .map((day, at) => ordinalOf("month", day, 0) - ordinalOf("month", days[at], 0));
    return months.every((count) => count % 12 === 0)
      ? "year"
      : months.every((count) => count % 3 === 0)
        ? "quarter"
        : "month";
  }
  if (steps.every((step) => step % 7 === 0)) return "week";
  return spans.find(([low, high]) => usual >= low && usual <= high)?.[2];
}

/**
 * The weekday (0 for Monday) on which weeks should begin so that weekly dates fall into different weeks: the
 * commonest weekday of the dates, unless another start separates more of them.
 */
export function weekStartOfDays(days: readonly number[]): number {
  const counts = new Array<number>(7).fill(0);
  for (const day of days) counts[weekday(day)]++;
  let best = 0;
  let bestWeeks = -1;
  const starts = [0, 1, 2, 3, 4, 5, 6].sort((a, b) => counts[b] - counts[a]);
  for (const start of starts) {
    const weeks = new Set(days.map((day) => ordinalOf("week", day, start))).size;
    if (weeks > bestWeeks) {
      best = start;
      bestWeeks = weeks;
    }
  }
  return best;
}

/**
 * Whether instants (milliseconds, distinct, ascending) step by the hour or finer and regularly, rather than as events
 * that come when they come. `undefined` when they step by some hours, which no period of ours is.
 */
export function stepOfInstants(instants: readonly number[]): "hour" | "day" | undefined {
  if (instants.length < 3) return instants.every((one) => one % 3_600_000 === 0) ? "hour" : "day";
  const steps = instants.slice(1).map((instant, at) => instant - instants[at]);
  const usual = median(steps);
  const regular = steps.filter((step) => step % usual === 0).length >= 0.9 * steps.length;
  if (usual >= 20 * 3_600_000 || !regular || usual % 60_000 !== 0) return "day";
  return usual <= 3_600_000 ? "hour" : undefined;
}
