import { cumulativeStdNormalProbability, probit } from "simple-statistics";
import { boundsOfSum, chancesWithin, within } from "../forecast/bounds.ts";
import type { Bounds, Forecast, LimitChance, Ranges } from "../forecast/forecast.ts";
import { inWholeNumbers } from "../forecast/wholeNumbers.ts";
import type { ForecastFacts } from "../words/facts.ts";

interface Shift {
  /** What known events add to each step. */
  readonly coming: Float64Array;
  readonly bounds: Bounds;
  /** Whether the values as they were read are whole numbers. */
  readonly whole: boolean;
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
function shiftedChances(forecast: Forecast, coming: Float64Array): LimitChance[] {
  return forecast.chances.map(({ direction, limit, each, any }) => {
    const moved = each.map((chance, step) => {
      if (coming[step] === 0) return chance;
      const above = chanceAbove(forecast, limit, step, coming[step]);
      return direction === "above" ? above : 1 - above;
    });
    return { direction, limit, each: moved, any: Math.max(any, ...moved) };
  });
}

/**
 * A forecast in numbers that survive JSON; `periods` name its steps. What known events add is added to every number,
 * the bounds hold for the sum, and ranges of whole numbers end at whole numbers.
 */
export function forecastFacts(
  forecast: Forecast,
  periods: readonly string[],
  { coming, bounds, whole }: Shift,
): ForecastFacts {
  const moved = coming.some((amount) => amount !== 0) ? withEvents(forecast, coming, bounds) : forecast;
  const { point, median, intervals, total } = whole ? inWholeNumbers(moved, bounds) : moved;
  return {
    periods,
    point: Array.from(point),
    median: Array.from(median),
    intervals: intervals.map(({ level, low, high }) => ({
      level,
      low: Array.from(low),
      high: Array.from(high),
    })),
    total,
    chances: chancesWithin(shiftedChances(forecast, coming), bounds).map(({ each, ...chance }) => ({
      ...chance,
      each: Array.from(each),
    })),
    candidates: forecast.candidates,
  };
}

/** The same with what events add, within bounds; the total is that of the points. */
function withEvents(forecast: Ranges, coming: Float64Array, bounds: Bounds): Ranges {
  const shifted = (values: Float64Array) => values.map((value, step) => within(value + coming[step], bounds));
  const point = shifted(forecast.point);
  const sum = point.reduce((all, one) => all + one, 0);
  const added = sum - forecast.total.point;
  const sumBounds = boundsOfSum(bounds, point.length);
  return {
    point,
    median: shifted(forecast.median),
    intervals: forecast.intervals.map(({ level, low, high }) => ({
      level,
      low: shifted(low),
      high: shifted(high),
    })),
    total: {
      point: sum,
      intervals: forecast.total.intervals.map(({ level, low, high }) => ({
        level,
        low: Math.min(sum, within(low + added, sumBounds)),
        high: Math.max(sum, within(high + added, sumBounds)),
      })),
    },
  };
}
