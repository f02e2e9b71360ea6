import type { Forecast } from "../forecast/forecast.ts";
import type { ForecastFacts } from "../words/facts.ts";

/** A forecast in numbers that survive JSON; `periods` name its steps. */
export function forecastFacts(forecast: Forecast, periods: readonly string[]): ForecastFacts {
  const { point, median, intervals, total, chances, candidates } = forecast;
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
    chances: chances.map((chance) => ({ ...chance, each: Array.from(chance.each) })),
    candidates,
  };
}
