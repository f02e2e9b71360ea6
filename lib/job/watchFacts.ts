import { monitorPaths } from "../drift/monitorPaths.ts";
import { readWatch } from "../drift/storedWatch.ts";
import { type Watch, type WatchOptions, type WatchResult, watchSeries } from "../drift/watchSeries.ts";
import { planDescription } from "../forecast/describingModel.ts";
import type { Period } from "../series/series.ts";
import type { MonitorFacts } from "../words/facts.ts";

/** Values a year brings, by period. */
export const valuesInYear = { hour: 8766, day: 365.25, week: 52, month: 12, quarter: 4, year: 1 } as const;

/** The longest stretch of looks boundaries are tabulated for, and the smallest rate. */
const mostLooks = 104;
const smallestRate = 0.01;

/**
 * Looks of one reference, and the false-alarm rate over them that comes to `yearly` in a year. Days take their share of
 * the year; hours would need a smaller rate than can be told from simulations, and take the smallest there is; weeks
 * and longer steps have the rate itself over 52 looks, however many years those last.
 */
function lookBudget(period: Period, yearly: number): { looks: number; falseAlarmRate: number } {
  if (valuesInYear[period] <= 52) return { looks: 52, falseAlarmRate: yearly };
  const share = (yearly * mostLooks) / valuesInYear[period];
  return { looks: mostLooks, falseAlarmRate: Math.min(yearly, Math.max(smallestRate, share)) };
}

/** Values before the first run that are looked at as if they had arrived one by one. */
const lookedBackOn = 26;

export interface WatchTask {
  readonly values: Float64Array;
  readonly falseAlarmRate: number;
  readonly period: Period;
  readonly seed: number;
  /** Place of the first value, counted from where the watch began to count: a rolling export moves it on. */
  readonly firstIndex: number;
}

/** Trend and season that the describing model finds: they become columns of the reference. */
function referenceTerms({ values, period }: WatchTask): { trend: boolean; season: number } {
  try {
    const { trend, season } = planDescription(values, { period });
    return { trend, season };
  } catch (error) {
    // Too few values, or all the same: there is nothing to take off.
    if (error instanceof RangeError) return { trend: false, season: 0 };
    throw error;
  }
}

/**
 * Advances the watch of a series with the values that arrived. At first sight the newest values are looked
 * at as if they had arrived one by one, so that a new user hears of a change that came shortly before the first run.
 */
export function advanceWatch(stored: unknown, task: WatchTask): WatchResult {
  const read = readWatch(stored);
  const previous = "watch" in read ? read.watch : undefined;
  // A reference keeps the terms it was made with; the describing model may choose others from run to run.
  const { trend, season } = previous?.settings ?? referenceTerms(task);
  const options: WatchOptions = {
    ...lookBudget(task.period, task.falseAlarmRate),
    seed: task.seed,
    trend,
    season,
    firstIndex: task.firstIndex,
  };
  if (previous) return watchSeries(previous, task.values, options);
  const before = task.values.subarray(0, Math.max(0, task.values.length - lookedBackOn));
  const first = watchSeries(undefined, before, options);
  const result = watchSeries(first.watch, task.values, options);
  return first.pastBreak ? { ...result, pastBreak: first.pastBreak } : result;
}

/** The monitor's paths and state for pictures; `periodOf` names the period of a place in the series. */
export function monitorFacts(
  watch: Watch,
  firstIndex: number,
  periodOf: (index: number) => string,
): MonitorFacts | null {
  const { monitor } = watch;
  if (!monitor) return null;
  return {
    since: periodOf(watch.monitorStart + monitor.reference.length - firstIndex),
    looksUsed: monitor.looksUsed,
    looks: monitor.looks,
    falseAlarmRate: monitor.falseAlarmRate,
    paths: monitorPaths(monitor),
    state: watch.state,
  };
}
