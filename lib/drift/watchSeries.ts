import { type Progress, takeValues } from "./advanceMonitor.ts";
import { findLastBreak, type PastBreak } from "./lastBreak.ts";
import type { Monitor, MonitorSettings } from "./monitor.ts";
import type { Notice } from "./notice.ts";
import { startMonitor } from "./startMonitor.ts";

export type WatchState = "watching" | "relearning" | "waiting-for-data";

/** A series under watch, at rest: plain data. Indexes count as the caller's `firstIndex` does. */
export interface Watch {
  readonly schema: "watch";
  readonly version: 1;
  readonly state: WatchState;
  readonly settings: MonitorSettings;
  /** First value of the present behaviour: the last lasting change, or the first value there is. */
  readonly regimeStart: number;
  readonly monitor: Monitor | null;
  /** Index of the first reference value of `monitor`. */
  readonly monitorStart: number;
  /** Index after the last value taken in. */
  readonly seenUntil: number;
  /** Start of the present behaviour if it began with a change, found at first sight or noticed since. */
  readonly changedAt: number | null;
}

export interface WatchOptions extends MonitorSettings {
  /** Index of `values[0]`, if earlier values were dropped since; default 0. */
  readonly firstIndex?: number;
}

export interface WatchResult {
  readonly watch: Watch;
  /** Indexes in them are places in the `values` given. */
  readonly notices: readonly Notice[];
  readonly state: WatchState;
  /** Place in `values` of the first value after the last lasting change, if one is known. */
  readonly changedAt?: number;
  /** At first sight only: the last break in the past, if the values show one. */
  readonly pastBreak?: PastBreak;
}

/** Values a reference is made on: as many as there are, within these; fewer are enough after a change. */
const longestReference = 156;
const shortestReference = 60;
const shortestAfterChange = 40;

/**
 * The life of a series' reference, one call a run: at first sight an old break is looked for and the reference
 * made on what came after it; every later value is looked at once; a notice is confirmed eight looks later while
 * the new behaviour is learnt, until 40 values from the change date make a fresh reference; used-up looks bring a
 * fresh one too. Values are taken in one by one, so a run of many gives the same as many runs of one. Values
 * already seen are not looked at again, revised or not: a reference stays what it was made on.
 *
 * @param previous the last run's watch; `undefined` at first sight
 * @param values the whole series, gaps `NaN`
 */
export function watchSeries(
  previous: Watch | undefined,
  values: ArrayLike<number>,
  options: WatchOptions,
): WatchResult {
  const { firstIndex = 0 } = options;
  const { looks, falseAlarmRate, seed, trend, season } = options;
  const settings: MonitorSettings = { looks, falseAlarmRate, seed, trend, season };
  const series = Float64Array.from(values);
  const pastBreak = previous === undefined ? findLastBreak(series, settings) : undefined;
  let watch = previous ?? firstSight(settings, firstIndex, series.length, pastBreak);
  if (!sameSettings(watch.settings, settings)) watch = { ...watch, settings, monitor: null };
  const between = (from: number, to: number) =>
    series.subarray(Math.max(0, from - firstIndex), Math.max(0, to - firstIndex));
  watch = renew(watch, between);
  const notices: Notice[] = [];
  for (let index = Math.max(watch.seenUntil, firstIndex); index < firstIndex + series.length; ) {
    if (watch.monitor === null) index++;
    else {
      const step = takeValues(watch.monitor, series.subarray(index - firstIndex), successorDue);
      index += step.taken;
      const offset = watch.monitorStart - firstIndex;
      notices.push(...step.notices.map((notice) => shiftNotice(notice, offset)));
      watch = { ...watch, monitor: step.monitor };
      const change = step.monitor.change;
      if (change !== null) {
        const changedAt = watch.monitorStart + change.change.index;
        watch = { ...watch, state: "relearning", regimeStart: changedAt, changedAt };
      }
    }
    watch = renew({ ...watch, seenUntil: index }, between);
  }
  const place = watch.changedAt === null ? -1 : watch.changedAt - firstIndex;
  return {
    watch,
    notices,
    state: watch.state,
    ...(place >= 0 ? { changedAt: place } : {}),
    ...(pastBreak === undefined ? {} : { pastBreak }),
  };
}

function firstSight(
  settings: MonitorSettings,
  firstIndex: number,
  length: number,
  pastBreak: PastBreak | undefined,
): Watch {
  const changedAt = pastBreak === undefined ? null : firstIndex + pastBreak.index;
  return {
    schema: "watch",
    version: 1,
    state: "waiting-for-data",
    settings,
    regimeStart: changedAt ?? firstIndex,
    monitor: null,
    monitorStart: firstIndex,
    seenUntil: firstIndex + length,
    changedAt,
  };
}

/** Starts a fresh reference where one is due and there is enough to make it of. */
function renew(watch: Watch, between: (from: number, to: number) => Float64Array): Watch {
  const { monitor, seenUntil, settings } = watch;
  if (monitor !== null && !successorDue(monitor)) return watch;
  const regime = between(watch.regimeStart, seenUntil);
  const enough = watch.changedAt === null ? shortestReference : shortestAfterChange;
  const observed = regime.reduce((sum, value) => sum + (Number.isNaN(value) ? 0 : 1), 0);
  const reference = regime.subarray(Math.max(0, regime.length - longestReference));
  const fresh = observed >= enough ? tryStart(reference, settings) : null;
  if (fresh === null) return monitor === null ? { ...watch, state: waiting(watch) } : watch;
  return { ...watch, state: "watching", monitor: fresh, monitorStart: seenUntil - reference.length };
}

/** Whether all looks are used up without a change, or the change is confirmed. */
const successorDue = ({ change, looksUsed, looks }: Progress): boolean =>
  change === null ? looksUsed >= looks : change.status === "confirmed";

const waiting = (watch: Watch): WatchState => (watch.changedAt === null ? "waiting-for-data" : "relearning");

/** A monitor, or `null` when the values cannot carry one: too few for the season, or all the same. */
function tryStart(reference: Float64Array, settings: MonitorSettings): Monitor | null {
  try {
    return startMonitor(reference, settings);
  } catch (error) {
    if (error instanceof RangeError) return null;
    throw error;
  }
}

function sameSettings(a: MonitorSettings, b: MonitorSettings): boolean {
  return (
    a.looks === b.looks &&
    a.falseAlarmRate === b.falseAlarmRate &&
    a.trend === b.trend &&
    a.season === b.season
  );
}

function shiftNotice(notice: Notice, offset: number): Notice {
  if (notice.code === "surprise") return { ...notice, index: notice.index + offset };
  const { index, low, high } = notice.change;
  return {
    ...notice,
    noticedAt: notice.noticedAt + offset,
    change: { index: index + offset, low: low + offset, high: high + offset },
  };
}
