import type { AutoregressiveFit, AutoregressiveProcess } from "../autoregression/fit.ts";
import { addsUp } from "../series/reading.ts";
import type { Series } from "../series/series.ts";
import type { Finding, SeriesFacts } from "../words/facts.ts";
import { attributionFacts } from "./attribution.ts";
import { comparisonFacts } from "./comparisonFacts.ts";
import { describedLevel } from "./describedLevel.ts";
import { modelFacts } from "./modelFacts.ts";
import { orNull } from "./orNull.ts";
import { seriesFindings } from "./seriesFindings.ts";
import type { Refit, SeriesTask } from "./seriesTask.ts";
import { trackRecord } from "./trackRecord.ts";
import { monitorFacts } from "./watchFacts.ts";

/** How much of the past pictures and sentences are given, by period. */
const historyKept = { hour: 336, day: 182, week: 156, month: 120, quarter: 80, year: 120 } as const;

/** The account of a series in numbers that survive JSON, from which every sentence and picture is made. */
export function seriesFacts(series: Series, task: SeriesTask, refit: Refit): SeriesFacts {
  const { previous } = task;
  const { values } = series;
  const { forecast, calendar, departing } = refit;
  const { model, backTest } = forecast;
  const { periodOf } = calendar;
  const level = describedLevel(model);
  const described = modelFacts(model, level, refit.simulated);
  const kept = Math.min(values.length, historyKept[series.period]);
  const findings = seriesFindings(series, task, refit);
  return {
    series: series.name,
    unit: task.tableSettings.unit ?? null,
    ...(addsUp(task.tableSettings.combine ?? "sum") ? {} : { adds: false }),
    period: series.period,
    history: {
      start: periodOf(values.length - kept),
      values: Array.from(values.subarray(values.length - kept), orNull),
    },
    lastPeriod: periodOf(values.length - 1),
    observed: series.observed,
    gaps: series.gaps,
    forecast: refit.forecasts,
    model: described,
    comparison: previous ? comparisonFacts(previous.asOf, previous.stored.facts.model, described) : null,
    attribution: attributionFacts(
      sinceChange(model.fit, findings),
      departing,
      forecast.point.length,
      level.value,
      periodOf,
    ),
    monitor: monitorFacts(refit.watched.watch, refit.firstIndex, periodOf),
    findings,
    trackRecord: trackRecord(refit.track),
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
