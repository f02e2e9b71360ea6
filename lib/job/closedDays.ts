import type { Series } from "../series/series.ts";

/** Fewer gaps may fall on one weekday by chance. */
const fewest = 4;
/** At most this many days of a week are closed days rather than missing data. */
const mostDays = 2;

/**
 * Weekdays (0 Sunday .. 6 Saturday) on which every gap of a daily series falls, if those days hardly ever have a value: a
 * shop that is shut then, rather than data that are missing. Empty otherwise.
 */
export function closedDays({ period, start, values, gaps }: Series): number[] {
  if (period !== "day" || gaps < fewest) return [];
  const first = new Date(`${start}T00:00:00Z`).getUTCDay();
  const empty = new Array<number>(7).fill(0);
  const all = new Array<number>(7).fill(0);
  values.forEach((value, index) => {
    const day = (first + index) % 7;
    all[day]++;
    if (Number.isNaN(value)) empty[day]++;
  });
  const days = empty.flatMap((count, day) => (count > 0 ? [day] : []));
  return days.length <= mostDays && days.every((day) => empty[day] >= 0.8 * all[day]) ? days : [];
}
