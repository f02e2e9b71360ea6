import { periodIndex, periodStart } from "./periods.ts";
import type { Period, Series } from "./series.ts";

/** Values as an earlier run read them: from `start` on, `null` for a gap. */
export interface EarlierReading {
  readonly period: Period;
  readonly start: string;
  readonly values: readonly (number | null)[];
}

/** How past values differ from what was read before. */
export interface Revisions {
  readonly count: number;
  /** Start of the first period that changed. */
  readonly firstPeriod: string;
  /** The change of greatest size; a value that came or went counts with its own size. */
  readonly largest: {
    readonly period: string;
    readonly before: number | null;
    readonly after: number | null;
  };
}

/**
 * Compares what an earlier run read with what stands there now, over the periods the earlier one knew. New periods at
 * the end are news, not revisions. `null` when nothing changed, or when the step or the start of weeks did.
 */
export function compareReadings(earlier: EarlierReading, series: Series): Revisions | null {
  const { period, start, values } = earlier;
  if (period !== series.period || values.length === 0) return null;
  const offset = periodIndex(series.start, period, start);
  // Weeks that begin on another day are other periods: nothing can be compared.
  if (periodStart(series.start, period, offset) !== start) return null;
  let count = 0;
  let first = -1;
  let largest = { index: -1, size: -1, before: null as number | null, after: null as number | null };
  for (let index = 0; index < values.length; index++) {
    // A row that left the front of a rolling export is not a value that went.
    if (index + offset < 0) continue;
    const before = values[index];
    const now = series.values[index + offset] ?? Number.NaN;
    const after = Number.isNaN(now) ? null : now;
    if (before === after) continue;
    count++;
    if (first < 0) first = index;
    const size = Math.abs((after ?? 0) - (before ?? 0));
    if (size > largest.size) largest = { index, size, before, after };
  }
  if (count === 0) return null;
  return {
    count,
    firstPeriod: periodStart(start, period, first),
    largest: {
      period: periodStart(start, period, largest.index),
      before: largest.before,
      after: largest.after,
    },
  };
}
