import type { SeriesFacts, TrackRecord } from "../words/facts.ts";

/** A forecast waiting for the value it speaks of. */
export interface PendingForecast {
  readonly period: string;
  readonly step: number;
  readonly point: number;
  readonly low: number;
  readonly high: number;
  readonly naive: number;
}

interface StepScore {
  readonly forecasts: number;
  readonly inside: number;
  readonly absoluteError: number;
  readonly naiveAbsoluteError: number;
}

/** What is carried from run to run to score forecasts: sums by horizon step, and what is still open. */
export interface TrackState {
  readonly level: number;
  readonly steps: readonly StepScore[];
  readonly pending: readonly PendingForecast[];
}

/** Steps ahead that are scored: what is open grows with their square. */
const stepsScored = 26;

const nothing: StepScore = { forecasts: 0, inside: 0, absoluteError: 0, naiveAbsoluteError: 0 };

/** Scores every pending forecast whose value has come. `valueAt` gives `NaN` for a gap, `undefined` for the future. */
export function scoreForecasts(
  state: TrackState,
  valueAt: (period: string) => number | undefined,
): TrackState {
  const steps = [...state.steps];
  const pending: PendingForecast[] = [];
  for (const forecast of state.pending) {
    const value = valueAt(forecast.period);
    if (value === undefined) pending.push(forecast);
    else if (!Number.isNaN(value)) {
      const sum = steps[forecast.step - 1] ?? nothing;
      steps[forecast.step - 1] = {
        forecasts: sum.forecasts + 1,
        inside: sum.inside + (value >= forecast.low && value <= forecast.high ? 1 : 0),
        absoluteError: sum.absoluteError + Math.abs(value - forecast.point),
        naiveAbsoluteError: sum.naiveAbsoluteError + Math.abs(value - forecast.naive),
      };
    }
  }
  return { level: state.level, steps: Array.from(steps, (step) => step ?? nothing), pending };
}

/** Adds the forecasts just made; `naive[h]` repeats the last value or the last season. */
export function rememberForecasts(
  state: TrackState | undefined,
  forecast: SeriesFacts["forecast"],
  naive: readonly number[],
): TrackState {
  const interval = forecast.intervals[0];
  const kept =
    state && state.level === interval.level ? state : { level: interval.level, steps: [], pending: [] };
  const open = new Set(kept.pending.map(({ period, step }) => `${step} ${period}`));
  const made = forecast.periods.slice(0, stepsScored).map((period, index) => ({
    period,
    step: index + 1,
    point: forecast.point[index],
    low: interval.low[index],
    high: interval.high[index],
    naive: naive[index],
  }));
  // A refit without new values makes the same forecast again: it counts once.
  const fresh = made.filter(({ period, step }) => !open.has(`${step} ${period}`));
  return { ...kept, pending: [...kept.pending, ...fresh] };
}

/** The record in words' terms, or `null` while nothing has been scored. */
export function trackRecord(state: TrackState): TrackRecord | null {
  const total = state.steps.reduce(
    (sum, step) => ({
      forecasts: sum.forecasts + step.forecasts,
      inside: sum.inside + step.inside,
      absoluteError: sum.absoluteError + step.absoluteError,
      naiveAbsoluteError: sum.naiveAbsoluteError + step.naiveAbsoluteError,
    }),
    nothing,
  );
  if (total.forecasts === 0) return null;
  const mean = (step: StepScore) => ({
    forecasts: step.forecasts,
    insideRange: step.inside,
    meanAbsoluteError: step.absoluteError / step.forecasts,
    naiveMeanAbsoluteError: step.naiveAbsoluteError / step.forecasts,
  });
  return {
    level: state.level,
    ...mean(total),
    byHorizon: state.steps.flatMap((step, index) =>
      step.forecasts ? [{ step: index + 1, ...mean(step) }] : [],
    ),
  };
}
