import { createHash } from "node:crypto";
import type { PastBreak } from "../drift/lastBreak.ts";
import { movingAverageWeights } from "../dynamics/movingAverageWeights.ts";
import type { Forecast } from "../forecast/forecast.ts";
import { forecastSeries } from "../forecast/forecastSeries.ts";
import { periodIndex, periodStart } from "../series/periods.ts";
import type { Series } from "../series/series.ts";
import type { TableSettings } from "../series/tableSettings.ts";
import type { Finding, SeriesFacts } from "../words/facts.ts";
import { attributionFacts } from "./attribution.ts";
import { changeFindings } from "./changeFindings.ts";
import { comparisonFacts } from "./comparisonFacts.ts";
import { departures, describedLevel } from "./describedLevel.ts";
import { forecastFacts } from "./forecastFacts.ts";
import type { StoredSeries } from "./modelDocument.ts";
import { modelFacts } from "./modelFacts.ts";
import { seedOf } from "./seed.ts";
import type { Settings } from "./settings.ts";
import { rememberForecasts, scoreForecasts, trackRecord } from "./trackRecord.ts";
import { advanceWatch, monitorFacts } from "./watchFacts.ts";

export interface SeriesTask {
  readonly asOf: string;
  readonly table: string;
  readonly settings: Settings;
  readonly tableSettings: TableSettings;
  /** The same series after the last run, and when that was. */
  readonly previous: { readonly asOf: string; readonly stored: StoredSeries } | undefined;
  /** Findings about the data themselves: revisions, lateness, an unfinished period. */
  readonly dataFindings: readonly Finding[];
}

/** How much of the past pictures and sentences are given, by period. */
const historyKept = { hour: 336, day: 182, week: 156, month: 120, quarter: 80, year: 120 } as const;

/**
 * Names what an account of a series rests on: every value (a revision anywhere in the past changes it) and the
 * settings that shape it.
 */
export function seriesDigest(series: Series, task: Pick<SeriesTask, "settings" | "tableSettings">): string {
  const { horizon, levels, falseAlarmRate } = task.settings;
  const shaping = {
    start: series.start,
    period: series.period,
    horizon,
    levels,
    falseAlarmRate,
    table: task.tableSettings,
  };
  const bytes = new Uint8Array(series.values.buffer, series.values.byteOffset, series.values.byteLength);
  return createHash("sha256").update(JSON.stringify(shaping)).update(bytes).digest("hex").slice(0, 32);
}

/** Repeats the last season, or the last value where there is none. Gaps are passed over. */
function naiveForecast(values: Float64Array, season: number, horizon: number): number[] {
  const step = season > 1 && values.length >= season ? season : 1;
  return Array.from({ length: horizon }, (_, ahead) => {
    let index = values.length - step + (ahead % step);
    while (index >= 0 && Number.isNaN(values[index])) index -= step;
    if (index >= 0) return values[index];
    return values.findLast((value) => !Number.isNaN(value)) ?? 0;
  });
}

function pastBreakFinding(pastBreak: PastBreak, periodOf: (index: number) => string): Finding {
  const { index, low, high, levelBefore, levelAfter, pValue } = pastBreak;
  const change = { period: periodOf(index), low: periodOf(low), high: periodOf(high) };
  return { code: "past-break", change, levelBefore, levelAfter, pValue };
}

function gapsFinding(values: Float64Array, periodOf: (index: number) => string): Finding[] {
  const latest = values.findLastIndex((value) => Number.isNaN(value));
  if (latest < 0) return [];
  const count = values.reduce((sum, value) => sum + (Number.isNaN(value) ? 1 : 0), 0);
  return [{ code: "gaps", count, latest: periodOf(latest) }];
}

function forecastOf(series: Series, task: SeriesTask, seed: number, changedAt: number | undefined): Forecast {
  const { settings, tableSettings } = task;
  return forecastSeries(series.values, {
    horizon: tableSettings.horizon ?? settings.horizon,
    levels: [...settings.levels].sort((a, b) => a - b),
    period: series.period,
    seed,
    bounds: { low: tableSettings.atLeast, high: tableSettings.atMost },
    limits: tableSettings.limits,
    changedAt,
  });
}

/** Refits one series and gathers all that is known of it now. Depends on nothing but its arguments. */
export function refitSeries(series: Series, task: SeriesTask): StoredSeries {
  const { previous } = task;
  const { values } = series;
  const periodOf = (index: number) => periodStart(series.start, series.period, index);
  const indexOf = (period: string) => periodIndex(series.start, series.period, period);
  const horizon = task.tableSettings.horizon ?? task.settings.horizon;

  const first = previous
    ? undefined
    : forecastOf(series, task, seedOf(task.table, series.name, task.asOf), undefined);
  const watched = advanceWatch(previous?.stored.watch, {
    values,
    falseAlarmRate: task.settings.falseAlarmRate,
    seed: seedOf(task.table, series.name),
    trend: first?.model.trend ?? false,
    season: first?.model.season ?? 0,
  });
  const forecast =
    first && watched.changedAt === undefined
      ? first
      : forecastOf(series, task, seedOf(task.table, series.name, task.asOf), watched.changedAt);

  const { model } = forecast;
  const level = describedLevel(model);
  const departing = departures(model, values);
  const described = modelFacts(model, level, departing);
  const weights = movingAverageWeights(model.fit.coefficients, 13);
  const findings: Finding[] = [
    ...changeFindings(watched.notices, previous?.stored.facts.findings ?? [], {
      periodOf,
      indexOf,
      newest: values.length - 1,
      weights,
    }),
    ...(watched.pastBreak ? [pastBreakFinding(watched.pastBreak, periodOf)] : []),
    ...forecast.notes.map((note): Finding => ({ code: "forecast-note", note })),
    ...gapsFinding(values, periodOf),
    ...task.dataFindings,
  ];
  const periods = Array.from({ length: horizon }, (_, step) => periodOf(values.length + step));
  const forecasts = forecastFacts(forecast, periods);
  const valueAt = (period: string) => values[indexOf(period)] as number | undefined;
  const scored = previous && scoreForecasts(previous.stored.track, valueAt);
  const track = rememberForecasts(scored, forecasts, naiveForecast(values, model.season, horizon));
  const kept = Math.min(values.length, historyKept[series.period]);
  const orNull = (value: number) => (Number.isFinite(value) ? value : null);
  const facts: SeriesFacts = {
    series: series.name,
    unit: task.tableSettings.unit ?? null,
    period: series.period,
    history: {
      start: periodOf(values.length - kept),
      values: Array.from(values.subarray(values.length - kept), orNull),
    },
    lastPeriod: periodOf(values.length - 1),
    observed: series.observed,
    gaps: series.gaps,
    forecast: forecasts,
    model: described,
    comparison: previous ? comparisonFacts(previous.asOf, previous.stored.facts.model, described) : null,
    attribution: attributionFacts(model, departing, horizon, level.value, periodOf),
    monitor: monitorFacts(watched.watch, periodOf),
    findings,
    trackRecord: trackRecord(track),
    backTest: {
      origins: forecast.backTest.origins,
      relativeError: orNull(forecast.backTest.relativeError),
      coverage80: orNull(forecast.backTest.coverage80),
    },
  };
  return { facts, digest: seriesDigest(series, task), watch: watched.watch, track };
}
