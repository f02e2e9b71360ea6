import type { ForecastOptions, LimitChance } from "./forecast.ts";
import { within } from "./simpleForecast.ts";

type Bounds = NonNullable<ForecastOptions["bounds"]>;

/** Exact zeros from which a series that never went below them is taken to end there. */
const ZEROS_OF_A_FLOOR = 5;

/**
 * Bounds that coming values keep: those stated, and zero from below where values were zero several times and never
 * less, as counts and amounts are.
 */
export function boundsOf(observed: Float64Array, stated: Bounds = {}): Bounds {
  if (stated.low !== undefined || (stated.high ?? 0) < 0) return stated;
  let zeros = 0;
  for (const value of observed) {
    if (value < 0) return stated;
    if (value === 0) zeros++;
  }
  return zeros >= ZEROS_OF_A_FLOOR ? { ...stated, low: 0 } : stated;
}

/** Whether all values are whole numbers, as counts are. */
export function areWhole(observed: Float64Array): boolean {
  return observed.every(Number.isSafeInteger);
}

/** The part of a forecast that says where values will lie. */
export interface Ranges {
  readonly point: Float64Array;
  readonly median: Float64Array;
  readonly intervals: readonly {
    readonly level: number;
    readonly low: Float64Array;
    readonly high: Float64Array;
  }[];
  readonly total: {
    readonly point: number;
    readonly intervals: readonly { readonly level: number; readonly low: number; readonly high: number }[];
  };
}

/**
 * Ranges of whole numbers, ending at whole numbers: those that a value between them is nearest to, for the value that
 * comes is one of them and both ends belong to the range. The ends stay in `bounds` and around point and median, which
 * are kept.
 */
export function inWholeNumbers({ point, median, intervals, total }: Ranges, bounds: Bounds): Ranges {
  const times = point.length;
  const sumBounds = {
    low: bounds.low === undefined ? undefined : bounds.low * times,
    high: bounds.high === undefined ? undefined : bounds.high * times,
  };
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

/** Chances of the limits that were asked for: none where a bound lies between. */
export function chancesWithin(
  chances: readonly LimitChance[],
  limits: ForecastOptions["limits"],
  bounds: Bounds,
): LimitChance[] {
  return chances.map((chance) => {
    const { direction, each } = chance;
    const limit = limits?.[direction] ?? chance.limit;
    const shut =
      direction === "above"
        ? limit >= (bounds.high ?? Number.POSITIVE_INFINITY)
        : limit <= (bounds.low ?? Number.NEGATIVE_INFINITY);
    return shut ? { direction, limit, each: each.map(() => 0), any: 0 } : { ...chance, limit };
  });
}
