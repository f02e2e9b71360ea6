import type { Series } from "../series/series.ts";

/** Fewer gaps may fall on one weekday by chance. */
const fewest = 4;
/** At most this many days of a week are closed days rather than missing data. */
const mostDays = 2;
/** A day of the week that is shut has hardly ever a value; one that is open seldom lacks it. */
const shut = 0.8;
const open = 0.2;

/**
 * Weekdays (0 Sunday .. 6 Saturday) on which a daily series hardly ever has a value while the others seldom lack one: a
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
  const days = empty.flatMap((count, day) => (count >= fewest && count >= shut * all[day] ? [day] : []));
  const others = empty.every((count, day) => days.includes(day) || count <= open * all[day]);
  return days.length <= mostDays && others ? days : [];
}
