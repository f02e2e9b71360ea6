import type { AutoregressiveFit, AutoregressiveProcess } from "../autoregression/fit.ts";
import type { PastBreak } from "../drift/lastBreak.ts";
import type { WatchResult } from "../drift/watchSeries.ts";
import { movingAverageWeights } from "../dynamics/movingAverageWeights.ts";
import type { Forecast, ForecastNote } from "../forecast/forecast.ts";
import { forecastSeries } from "../forecast/forecastSeries.ts";
import { leadingZeros } from "../forecast/leadingZeros.ts";
import { naiveForecast } from "../forecast/naiveForecast.ts";
import { areWhole, boundsOf } from "../forecast/valueKind.ts";
import { periodIndex, periodStart } from "../series/periods.ts";
import type { KnownEvent } from "../series/readEvents.ts";
import type { Series } from "../series/series.ts";
import type { TableSettings } from "../series/tableSettings.ts";
import type { Finding, SeriesFacts } from "../words/facts.ts";
import { attributionFacts } from "./attribution.ts";
import { changeFindings } from "./changeFindings.ts";
import { comparisonFacts } from "./comparisonFacts.ts";
import { departures, describedLevel } from "./describedLevel.ts";
import { adjustForEvents, type EventAdjustment } from "./eventEffects.ts";
import { forecastFacts } from "./forecastFacts.ts";
import type { StoredSeries } from "./modelDocument.ts";
import { modelFacts } from "./modelFacts.ts";
import { orNull } from "./orNull.ts";
import { seedOf } from "./seed.ts";
import { seriesDigest } from "./seriesDigest.ts";
import type { Settings } from "./settings.ts";
import { type SimulatedFading, simulateFading } from "./simulateFading.ts";
import { basisOf, choiceThatStands, keepChoice, wentBy } from "./standingChoice.ts";
import { rememberForecasts, scoreForecasts, type TrackState, trackRecord } from "./trackRecord.ts";
import { advanceWatch, monitorFacts } from "./watchFacts.ts";

export interface SeriesTask {
  readonly asOf: string;
  readonly table: string;
  readonly settings: Settings;
  readonly tableSettings: TableSettings;
  readonly events: readonly KnownEvent[];
  /** The same series after the last run, and when that was. */
  readonly previous: { readonly asOf: string; readonly stored: StoredSeries } | undefined;
  /** Findings about the data themselves: revisions, lateness, an unfinished period. */
  readonly dataFindings: readonly Finding[];
}

/** How much of the past pictures and sentences are given, by period. */
const historyKept = { hour: 336, day: 182, week: 156, month: 120, quarter: 80, year: 120 } as const;
/** ψ weights needed for the outlook of a surprise. */
const outlookWeights = 13;

/** Names of the places of a series, and the places of names. */
interface Calendar {
  readonly periodOf: (index: number) => string;
  readonly indexOf: (period: string) => number;
}

/** Another step, or weeks that begin on another day: nothing of an earlier account can be gone on from. */
export function sameCalendar(series: Series, { facts, watchOrigin }: StoredSeries): boolean {
  if (facts.period !== series.period) return false;
  return (
    periodStart(watchOrigin, series.period, periodIndex(watchOrigin, series.period, series.start)) ===
    series.start
  );
}

/** Refits one series and gathers all that is known of it now. Depends on nothing but its arguments. */
export function refitSeries(series: Series, task: SeriesTask): StoredSeries {
  const { previous, table, settings, tableSettings } = task;
  const horizon = tableSettings.horizon ?? settings.horizon;
  const calendar: Calendar = {
    periodOf: (index) => periodStart(series.start, series.period, index),
    indexOf: (period) => periodIndex(series.start, series.period, period),
  };
  const began = leadingZeros(series.values);
  const open = series.values.map((value, index) => (index < began ? Number.NaN : value));
  const adjusted = adjustForEvents({ ...series, values: open }, task.events, {
    table,
    horizon,
    timeZone: tableSettings.timeZone ?? settings.timeZone,
    periodOf: (ahead) => calendar.periodOf(series.values.length + ahead),
  });
  const watchOrigin = previous?.stored.watchOrigin ?? series.start;
  const firstIndex = periodIndex(watchOrigin, series.period, series.start);
  const watched = advanceWatch(previous?.stored.watch, {
    firstIndex,
    values: adjusted.values.map((value, index) => (index < began ? series.values[index] : value)),
    period: series.period,
    falseAlarmRate: settings.falseAlarmRate,
    seed: seedOf(table, series.name),
  });
  const newest = series.values.length - 1;
  const changedAt = watched.changedAt === undefined ? null : calendar.periodOf(watched.changedAt);
  const { dataFindings } = task;
  const timeZone = tableSettings.timeZone ?? settings.timeZone;
  const basisUntil = (lastPeriod: string) =>
    basisOf({ ...tableSettings, timeZone }, task.events, series.start, lastPeriod);
  const stood = choiceThatStands(previous?.stored.choice, {
    ...{ horizon, newest, changedAt, dataFindings, basisUntil },
    indexOf: calendar.indexOf,
  });
  // By the values as they are: events taken off leave some that are no whole numbers or below zero.
  const observed = open.filter((value) => !Number.isNaN(value));
  const bounds = boundsOf(observed, { low: tableSettings.atLeast, high: tableSettings.atMost });
  const eventsAhead = adjusted.coming.some((amount) => amount !== 0);
  const forecast = forecastSeries(adjusted.values, {
    horizon,
    levels: [...settings.levels].sort((a, b) => a - b),
    period: series.period,
    seed: seedOf(table, series.name, task.asOf),
    // With events to come, bounds hold for what they make of the forecast and not for the forecast without them.
    bounds: eventsAhead ? unbounded : bounds,
    limits: tableSettings.limits,
    changedAt: watched.changedAt,
    choice: stood?.choice,
  });
  const periods = Array.from({ length: horizon }, (_, step) =>
    calendar.periodOf(series.values.length + step),
  );
  const forecasts = forecastFacts(forecast, periods, {
    ...{ coming: adjusted.coming, bounds },
    whole: areWhole(observed),
  });
  const track = nextTrack(series, previous?.stored.track, forecasts, forecast.model.season, calendar);
  const kept = stood && wentBy(stood, forecast) ? stood : undefined;
  const departing = departures(forecast.model, adjusted.values);
  const simulated = simulateFading(forecast.model, departing, kept?.simulated);
  return {
    facts: seriesFacts(series, task, {
      ...{ began, adjusted, watched, firstIndex, forecast, forecasts, track, calendar, departing, simulated },
    }),
    digest: seriesDigest(series, task),
    watchOrigin,
    watch: watched.watch,
    track,
    choice: keepChoice(kept, forecast, simulated, () => {
      const lastPeriod = calendar.periodOf(newest);
      return { lastPeriod, changedAt, basis: basisUntil(lastPeriod) };
    }),
  };
}

function nextTrack(
  series: Series,
  before: TrackState | undefined,
  forecasts: SeriesFacts["forecast"],
  season: number,
  calendar: Calendar,
): TrackState {
  const valueAt = (period: string) => {
    const index = calendar.indexOf(period);
    // A series whose start moved past the period will never show it: as good as a gap.
    return index < 0 ? Number.NaN : (series.values[index] as number | undefined);
  };
  const scored = before && scoreForecasts(before, valueAt);
  return rememberForecasts(
    scored,
    forecasts,
    Array.from(naiveForecast(series.values, series.values.length, season, forecasts.periods.length)),
  );
}

const unbounded = { low: Number.NEGATIVE_INFINITY, high: Number.POSITIVE_INFINITY };

interface Results {
  /** Index of the first value after zeros from before the series began, 0 without such. */
  readonly began: number;
  readonly adjusted: EventAdjustment;
  readonly watched: WatchResult;
  readonly firstIndex: number;
  readonly forecast: Forecast;
  readonly forecasts: SeriesFacts["forecast"];
  readonly track: TrackState;
  readonly calendar: Calendar;
  /** Departures of the values from the model's terms. */
  readonly departing: Float64Array;
  readonly simulated: SimulatedFading;
}

/** Rows of one period are combined by these when a value is a level rather than an amount: no total is told of it. */
const levelRules = new Set<SeriesTask["tableSettings"]["combine"]>(["mean", "last", "max"]);

function seriesFacts(series: Series, task: SeriesTask, results: Results): SeriesFacts {
  const { previous } = task;
  const { values } = series;
  const { forecast, calendar } = results;
  const { model, backTest } = forecast;
  const { periodOf } = calendar;
  const level = describedLevel(model);
  const { departing } = results;
  const described = modelFacts(model, level, results.simulated);
  const kept = Math.min(values.length, historyKept[series.period]);
  const findings = seriesFindings(series, task, results);
  return {
    series: series.name,
    unit: task.tableSettings.unit ?? null,
    ...(levelRules.has(task.tableSettings.combine) ? { adds: false } : {}),
    period: series.period,
    history: {
      start: periodOf(values.length - kept),
      values: Array.from(values.subarray(values.length - kept), orNull),
    },
    lastPeriod: periodOf(values.length - 1),
    observed: series.observed,
    gaps: series.gaps,
    forecast: results.forecasts,
    model: described,
    comparison: previous ? comparisonFacts(previous.asOf, previous.stored.facts.model, described) : null,
    attribution: attributionFacts(
      sinceChange(model.fit, findings),
      departing,
      forecast.point.length,
      level.value,
      periodOf,
    ),
    monitor: monitorFacts(results.watched.watch, results.firstIndex, periodOf),
    findings,
    trackRecord: trackRecord(results.track),
    backTest: {
      origins: backTest.origins,
      relativeError: orNull(backTest.relativeError),
      coverage80: orNull(backTest.coverage80),
    },
  };
}

/**
 * The process by whose weights past shocks are followed: that of the describing model, or, while it is still a mixture
 * of what was before and after a change of persistence, that of the behaviour since.
 */
function sinceChange(fit: AutoregressiveFit, findings: readonly Finding[]): AutoregressiveProcess {
  const change = findings.find((one) => one.code === "change" && one.fresh && one.kind === "persistence");
  return change?.code === "change" ? { ...fit, coefficients: change.after.coefficients } : fit;
}

function seriesFindings(series: Series, task: SeriesTask, results: Results): Finding[] {
  const { watched, forecast, calendar } = results;
  const { periodOf } = calendar;
  const earlier = task.previous?.stored.facts.findings ?? [];
  const weights = movingAverageWeights(forecast.model.fit.coefficients, outlookWeights);
  return [
    ...changeFindings(watched.notices, earlier, { ...calendar, newest: series.values.length - 1, weights }),
    ...(watched.pastBreak ? [pastBreakFinding(watched.pastBreak, periodOf)] : []),
    ...results.adjusted.findings,
    ...(results.began > 0 ? [noteFinding({ code: "zeros-first", index: results.began })] : []),
    ...forecast.notes.map(noteFinding),
    ...gapsFinding(series.values, periodOf),
    ...task.dataFindings,
  ];
}

const noteFinding = (note: ForecastNote): Finding => ({ code: "forecast-note", note });

function pastBreakFinding(pastBreak: PastBreak, periodOf: Calendar["periodOf"]): Finding {
  const { index, low, high, levelBefore, levelAfter, pValue } = pastBreak;
  const change = { period: periodOf(index), low: periodOf(low), high: periodOf(high) };
  return { code: "past-break", change, levelBefore, levelAfter, pValue };
}

function gapsFinding(values: Float64Array, periodOf: Calendar["periodOf"]): Finding[] {
  const latest = values.findLastIndex((value) => Number.isNaN(value));
  if (latest < 0) return [];
  const count = values.reduce((sum, value) => sum + (Number.isNaN(value) ? 1 : 0), 0);
  return [{ code: "gaps", count, latest: periodOf(latest) }];
}
