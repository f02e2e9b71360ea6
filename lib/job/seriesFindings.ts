import type { PastBreak } from "../drift/lastBreak.ts";
import { movingAverageWeights } from "../dynamics/movingAverageWeights.ts";
import type { ForecastNote } from "../forecast/forecast.ts";
import type { Series } from "../series/series.ts";
import type { Finding } from "../words/facts.ts";
import { changeFindings } from "./changeFindings.ts";
import type { Calendar, Refit, SeriesTask } from "./seriesTask.ts";

/** ψ weights needed for the outlook of a surprise. */
const outlookWeights = 13;

/** All that is to be said of a series: what the watch, the events, the forecast and the data bring. */
export function seriesFindings(series: Series, task: SeriesTask, refit: Refit): Finding[] {
  const { watched, forecast, calendar } = refit;
  const { periodOf } = calendar;
  const before = task.previous?.stored.facts;
  const earlier = before?.findings ?? [];
  const newest = series.values.length - 1;
  const firstNew = before ? calendar.indexOf(before.lastPeriod) + 1 : newest;
  const weights = movingAverageWeights(forecast.model.fit.coefficients, outlookWeights);
  return [
    ...changeFindings(watched.notices, earlier, { ...calendar, newest, firstNew, weights }),
    ...(watched.pastBreak ? [pastBreakFinding(watched.pastBreak, periodOf)] : []),
    ...refit.adjusted.findings,
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
