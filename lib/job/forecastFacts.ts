import { cumulativeStdNormalProbability, probit } from "simple-statistics";
import type { Forecast } from "../forecast/forecast.ts";
import type { ForecastFacts } from "../words/facts.ts";

interface Shift {
  /** What known events add to each step. */
  readonly coming: ArrayLike<number>;
  readonly bounds: { readonly low?: number; readonly high?: number };
}

/** Chance of a value above the limit, from the range at the widest level taken as normal (for shifted steps only). */
function chanceAbove(forecast: Forecast, limit: number, step: number, added: number): number {
  const { level, low, high } = forecast.intervals[forecast.intervals.length - 1];
  const deviation = (high[step] - low[step]) / (2 * probit(0.5 + level / 200));
  const middle = forecast.median[step] + added;
  if (!(deviation > 0)) return middle > limit ? 1 : 0;
  return 1 - cumulativeStdNormalProbability((limit - middle) / deviation);
}

/** The chances of passing limits with what events add: steps without an event keep theirs. */
function shiftedChances(forecast: Forecast, coming: ArrayLike<number>): ForecastFacts["chances"] {
  return forecast.chances.map(({ direction, limit, each, any }) => {
    const moved = Array.from(each, (chance, step) => {
      if (coming[step] === 0) return chance;
      const above = chanceAbove(forecast, limit, step, coming[step]);
      return direction === "above" ? above : 1 - above;
    });
    return { direction, limit, each: moved, any: Math.max(any, ...moved) };
  });
}

/**
 * A forecast in numbers that survive JSON; `periods` name its steps. What known events add is added to every number, and
 * the bounds hold for the sum.
 */
export function forecastFacts(
  forecast: Forecast,
  periods: readonly string[],
  { coming, bounds }: Shift,
): ForecastFacts {
  const { low: least = Number.NEGATIVE_INFINITY, high: most = Number.POSITIVE_INFINITY } = bounds;
  const within = (value: number, count = 1) => Math.min(count * most, Math.max(count * least, value));
  const shifted = (values: ArrayLike<number>) =>
    Array.from(values, (value, step) => (coming[step] === 0 ? value : within(value + coming[step])));
  const added = Array.from(coming).reduce((sum, value) => sum + value, 0);
  const moved = (value: number) => (added === 0 ? value : within(value + added, periods.length));
  const { total } = forecast;
  return {
    periods,
    point: shifted(forecast.point),
    median: shifted(forecast.median),
    intervals: forecast.intervals.map(({ level, low, high }) => ({
      level,
      low: shifted(low),
      high: shifted(high),
    })),
    total: {
      point: moved(total.point),
      intervals: total.intervals.map(({ level, low, high }) => ({
        level,
        low: moved(low),
        high: moved(high),
      })),
    },
    chances: shiftedChances(forecast, coming),
    candidates: forecast.candidates,
  };
}
