import type { DateFacts } from "./calendar.ts";
import { isoDate } from "./civil.ts";
import type { DateKeys } from "./collect.ts";
import type { Complain } from "./problems.ts";
import type { Problem } from "./series.ts";

const dayLength = 86_400_000;

/** Indexes of the dates that there are, earliest first. */
export function byDate(at: Float64Array): Int32Array {
  const order = new Int32Array(at.length);
  let count = 0;
  let isSorted = true;
  for (let index = 0; index < at.length; index++) {
    if (Number.isNaN(at[index])) continue;
    if (count > 0 && at[index] < at[order[count - 1]]) isSorted = false;
    order[count++] = index;
  }
  const found = order.subarray(0, count);
  // Most tables are in order already, or upside down.
  return isSorted ? found : found.sort((a, b) => at[a] - at[b] || a - b);
}

/**
 * Takes out single dates that lie further from the rest than the rest spans, and more than two years: a mistyped year.
 *
 * @param order indexes of `at` by date
 * @returns what is left of `order`
 */
export function withoutLonelyDates(
  order: Int32Array,
  at: Float64Array,
  dates: DateKeys,
  facts: DateFacts,
  complain: Complain,
): { readonly order: Int32Array; readonly problems: Problem[] } {
  const perDay = facts.resolution === "hour" ? dayLength : 1;
  const problems: Problem[] = [];
  let first = 0;
  let last = order.length - 1;
  const day = (place: number) => Math.floor(at[order[place]] / perDay);
  while (last - first >= 5) {
    const early = day(first + 1) - day(first) > Math.max(731, day(last) - day(first + 1));
    const late = day(last) - day(last - 1) > Math.max(731, day(last - 1) - day(first));
    if (!early && !late) break;
    const index = order[early ? first++ : last--];
    problems.push(
      complain(
        "lonely-date",
        false,
        `${isoDate(Math.floor(at[index] / perDay))} lies far from all other dates; the row is left out`,
        "correct the year",
        { line: dates.lines[index], column: facts.column },
      ),
    );
  }
  return { order: order.subarray(first, last + 1), problems };
}
