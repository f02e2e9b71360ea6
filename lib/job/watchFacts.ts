import { monitorPaths } from "../drift/monitorPaths.ts";
import { readWatch } from "../drift/storedWatch.ts";
import { type Watch, type WatchOptions, type WatchResult, watchSeries } from "../drift/watchSeries.ts";
import type { MonitorFacts } from "../words/facts.ts";

/** Looks over which the false-alarm rate holds: a year of weeks, and as many periods of any other step. */
const looks = 52;

export interface WatchTask {
  readonly values: Float64Array;
  readonly falseAlarmRate: number;
  readonly seed: number;
  /** Terms of the describing model: they become columns of the reference. */
  readonly trend: boolean;
  readonly season: number;
}

/**
 * Advances the watch of a series with the values that arrived. At first sight the last year is looked back upon as if
 * its values had arrived one by one, so that a new user hears of a change that came before the first run.
 */
export function advanceWatch(stored: unknown, task: WatchTask): WatchResult {
  const read = readWatch(stored);
  const previous = "watch" in read ? read.watch : undefined;
  const options: WatchOptions = {
    looks,
    falseAlarmRate: task.falseAlarmRate,
    seed: task.seed,
    // A reference keeps the terms it was made with; the describing model may choose others from run to run.
    trend: previous?.settings.trend ?? task.trend,
    season: previous?.settings.season ?? task.season,
  };
  if (previous) return watchSeries(previous, task.values, options);
  const before = task.values.subarray(0, Math.max(0, task.values.length - looks));
  const first = watchSeries(undefined, before, options);
  const result = watchSeries(first.watch, task.values, options);
  return first.pastBreak ? { ...result, pastBreak: first.pastBreak } : result;
}

/** The monitor's paths and state for pictures; `periodOf` names the period of a place in the series. */
export function monitorFacts(watch: Watch, periodOf: (index: number) => string): MonitorFacts | null {
  const { monitor } = watch;
  if (!monitor) return null;
  return {
    since: periodOf(watch.monitorStart + monitor.reference.length),
    looksUsed: monitor.looksUsed,
    looks: monitor.looks,
    falseAlarmRate: monitor.falseAlarmRate,
    paths: monitorPaths(monitor),
    state: watch.state,
  };
}
