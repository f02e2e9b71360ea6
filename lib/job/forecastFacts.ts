import type { Forecast } from "../forecast/forecast.ts";
import type { ForecastFacts } from "../words/facts.ts";

/**
 * A forecast in numbers that survive JSON; `periods` name its steps, `coming` is what known events add to each.
 */
export function forecastFacts(
  forecast: Forecast,
  periods: readonly string[],
  coming: ArrayLike<number>,
): ForecastFacts {
  const shifted = (values: ArrayLike<number>) => Array.from(values, (value, step) => value + coming[step]);
  const added = Array.from(coming).reduce((sum, value) => sum + value, 0);
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
      point: total.point + added,
      intervals: total.intervals.map(({ level, low, high }) => ({
        level,
        low: low + added,
        high: high + added,
      })),
    },
    chances: forecast.chances.map(({ direction, limit, each, any }) => ({
      direction,
      limit,
      each: Array.from(each),
      any,
    })),
    candidates: forecast.candidates,
  };
}
