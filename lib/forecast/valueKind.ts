import type { Forecast, ForecastOptions } from "./forecast.ts";
import { within } from "./simpleForecast.ts";

/** Exact zeros from which a series that never went below them is taken to end there: chance stops one in 2^5 so. */
const ZEROS_OF_A_FLOOR = 5;

/**
 * Bounds that coming values keep: those stated, and zero from below where values were zero several times and never
 * less, as counts and amounts are.
 */
export function boundsOf(
  observed: Float64Array,
  stated: ForecastOptions["bounds"] = {},
): NonNullable<ForecastOptions["bounds"]> {
  if (stated.low !== undefined || (stated.high ?? 0) < 0) return stated;
  let zeros = 0;
  for (const value of observed) {
    if (value < 0) return stated;
    if (value === 0) zeros++;
  }
  return zeros >= ZEROS_OF_A_FLOOR ? { ...stated, low: 0 } : stated;
}

/**
 * A forecast of whole numbers with ranges that end at whole numbers: those a value between them is nearest to, for the
 * value that comes is one of them and both ends belong to the range. The ends stay in `bounds` and around point and
 * median, which are kept.
 */
export function inWholeNumbers(forecast: Forecast, bounds: ForecastOptions["bounds"]): Forecast {
  const { point, median, intervals, total } = forecast;
  const horizon = point.length;
  const ends = (low: number, high: number, least: number, most: number) => ({
    low: Math.min(Math.round(low), Math.floor(least)),
    high: Math.max(Math.round(high), Math.ceil(most)),
  });
  return {
    ...forecast,
    intervals: intervals.map(({ level, low, high }) => {
      const whole = Array.from(low, (_, h) =>
        ends(low[h], high[h], Math.min(point[h], median[h]), Math.max(point[h], median[h])),
      );
      return {
        level,
        low: Float64Array.from(whole, (range) => within(range.low, bounds)),
        high: Float64Array.from(whole, (range) => within(range.high, bounds)),
      };
    }),
    total: {
      point: total.point,
      intervals: total.intervals.map(({ level, low, high }) => {
        const range = ends(low, high, total.point, total.point);
        const keep = (value: number): number => horizon * within(value / horizon, bounds);
        return { level, low: keep(range.low), high: keep(range.high) };
      }),
    },
  };
}
