import { boundsOfSum, within } from "./bounds.ts";
import type { Bounds, ForecastOptions, Ranges } from "./forecast.ts";

/** Whether all values are whole numbers, as counts are. */
export function areWhole(observed: Float64Array): boolean {
  return observed.every(Number.isSafeInteger);
}

/**
 * Ranges of whole numbers, ending at whole numbers: those that a value between them is nearest to, for the value that
 * comes is one of them and both ends belong to the range. The ends stay in `bounds` and around point and median, which
 * are kept.
 */
export function inWholeNumbers({ point, median, intervals, total }: Ranges, bounds: Bounds): Ranges {
  const sumBounds = boundsOfSum(bounds, point.length);
  return {
    point,
    median,
    intervals: intervals.map(({ level, low, high }) => ({
      level,
      low: low.map((end, h) => wholeLow(end, Math.min(point[h], median[h]), bounds)),
      high: high.map((end, h) => wholeHigh(end, Math.max(point[h], median[h]), bounds)),
    })),
    total: {
      point: total.point,
      intervals: total.intervals.map(({ level, low, high }) => ({
        level,
        low: wholeLow(low, total.point, sumBounds),
        high: wholeHigh(high, total.point, sumBounds),
      })),
    },
  };
}

/** Adding zero makes −0 a 0. */
const wholeLow = (end: number, middle: number, bounds: Bounds): number =>
  Math.min(middle, within(Math.min(Math.round(end), Math.floor(middle)), bounds)) + 0;
const wholeHigh = (end: number, middle: number, bounds: Bounds): number =>
  Math.max(middle, within(Math.max(Math.round(end), Math.ceil(middle)), bounds)) + 0;

/** Limits half-way to the nearest whole number that does not pass them: a count above 4 is one of 5 and more. */
export function betweenWholeNumbers(limits: ForecastOptions["limits"]): ForecastOptions["limits"] {
  if (limits === undefined) return undefined;
  const { above, below } = limits;
  return {
    above: above === undefined ? undefined : Math.floor(above) + 0.5,
    below: below === undefined ? undefined : Math.ceil(below) - 0.5,
  };
}
