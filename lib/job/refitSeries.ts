import { forecastSeries } from "../forecast/forecastSeries.ts";
import { leadingZeros } from "../forecast/leadingZeros.ts";
import { naiveForecast } from "../forecast/naiveForecast.ts";
import { periodIndex, periodStart } from "../series/periods.ts";
import type { Series } from "../series/series.ts";
import type { SeriesFacts } from "../words/facts.ts";
import { departures } from "./describedLevel.ts";
import { adjustForEvents } from "./eventEffects.ts";
import { forecastFacts } from "./forecastFacts.ts";
import type { StoredSeries } from "./modelDocument.ts";
import { seedOf } from "./seed.ts";
import { seriesDigest } from "./seriesDigest.ts";
import { seriesFacts } from "./seriesFacts.ts";
import type { Calendar, SeriesTask } from "./seriesTask.ts";
import { simulateFading } from "./simulateFading.ts";
import { basisOf, choiceThatStands, keepChoice, wentBy } from "./standingChoice.ts";
import { rememberForecasts, scoreForecasts, type TrackState } from "./trackRecord.ts";
import { advanceWatch } from "./watchFacts.ts";

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
  const timeZone = tableSettings.timeZone ?? settings.timeZone;
  const calendar: Calendar = {
    periodOf: (index) => periodStart(series.start, series.period, index),
    indexOf: (period) => periodIndex(series.start, series.period, period),
  };
  const began = leadingZeros(series.values);
  const adjusted = adjustForEvents(series, began, task.events, {
    table,
    horizon,
    timeZone,
    periodOf: (ahead) => calendar.periodOf(series.values.length + ahead),
  });
  const watchOrigin = previous?.stored.watchOrigin ?? series.start;
  const firstIndex = periodIndex(watchOrigin, series.period, series.start);
  const watched = advanceWatch(previous?.stored.watch, {
    firstIndex,
    values: adjusted.values,
    period: series.period,
    falseAlarmRate: settings.falseAlarmRate,
    seed: seedOf(table, series.name),
  });
  const newest = series.values.length - 1;
  const changedAt = watched.changedAt === undefined ? null : calendar.periodOf(watched.changedAt);
  const { dataFindings } = task;
  const basisUntil = (lastPeriod: string) =>
    basisOf(
      { ...tableSettings, timeZone },
      task.events,
      series.start,
      calendar.periodOf(calendar.indexOf(lastPeriod) + 1),
    );
  const stood = choiceThatStands(previous?.stored.choice, {
    ...{ horizon, newest, changedAt, dataFindings, basisUntil },
    indexOf: calendar.indexOf,
  });
  const forecast = forecastSeries(series.values, {
    horizon,
    levels: [...settings.levels].sort((a, b) => a - b),
    period: series.period,
    seed: seedOf(table, series.name, task.asOf),
    bounds: { low: tableSettings.atLeast, high: tableSettings.atMost },
    limits: tableSettings.limits,
    effects: adjusted.effects,
    changedAt: watched.changedAt,
    choice: stood?.choice,
  });
  const periods = Array.from({ length: horizon }, (_, step) =>
    calendar.periodOf(series.values.length + step),
  );
  const forecasts = forecastFacts(forecast, periods);
  const track = nextTrack(series, previous?.stored.track, forecasts, forecast.model.season, calendar);
  const kept = stood && wentBy(stood, forecast) ? stood : undefined;
  const departing = departures(forecast.model, adjusted.values.slice().fill(Number.NaN, 0, began));
  const simulated = simulateFading(forecast.model, departing, kept?.simulated);
  return {
    facts: seriesFacts(series, task, {
      ...{ adjusted, watched, firstIndex, forecast, forecasts, track, calendar, departing, simulated },
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
