import type { Forecast } from "../forecast/forecast.ts";
import type { ForecastFacts } from "../words/facts.ts";

/** A forecast in numbers that survive JSON; `periods` name its steps. */
export function forecastFacts(forecast: Forecast, periods: readonly string[]): ForecastFacts {
  return {
    periods,
    point: Array.from(forecast.point),
    median: Array.from(forecast.median),
    intervals: forecast.intervals.map(({ level, low, high }) => ({
      level,
      low: Array.from(low),
      high: Array.from(high),
    })),
    total: { point: forecast.total.point, intervals: forecast.total.intervals },
    chances: forecast.chances.map(({ direction, limit, each, any }) => ({
      direction,
      limit,
      each: Array.from(each),
      any,
    })),
    candidates: forecast.candidates,
  };
}
