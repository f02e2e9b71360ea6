import type { ForecastOptions } from "./forecast.ts";

const BY_PERIOD: Readonly<Record<NonNullable<ForecastOptions["period"]>, readonly number[]>> = {
  hour: [24, 168],
  day: [7],
  week: [52],
  month: [12],
  quarter: [4],
  year: [],
};

/**
 * Season lengths to consider, ascending: those asked for, else those of the calendar step (day and week of hours,
 * week of days, year of weeks, months and quarters). A length counts from two and a half seasons on: two to compare,
 * and half of one to see whether the comparison foretold anything. Throws `RangeError` for a length that is no whole
 * number.
 */
export function seasonLengths(count: number, options: Pick<ForecastOptions, "period" | "seasons">): number[] {
  for (const length of options.seasons ?? []) {
    if (!Number.isInteger(length) || length < 1) {
      throw new RangeError(`seasons need to be whole numbers of periods, got ${length}`);
    }
  }
  const wanted = options.seasons ?? (options.period === undefined ? [] : BY_PERIOD[options.period]);
  return [...new Set(wanted)].filter((length) => length > 1 && count >= 2.5 * length).sort((a, b) => a - b);
}
