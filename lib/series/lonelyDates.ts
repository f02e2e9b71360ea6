import type { DateFacts } from "./calendar.ts";
import { isoDate } from "./civil.ts";
import type { DateKeys } from "./collect.ts";
import type { Complain } from "./problems.ts";
import type { Problem } from "./series.ts";

const dayLength = 86_400_000;

/**
 * Takes out single dates that lie further from the rest than the rest spans, and more than two years: a mistyped year.
 * Their entries of `at` become `NaN`.
 */
export function dropLonelyDates(
  at: Float64Array,
  dates: DateKeys,
  facts: DateFacts,
  complain: Complain,
): Problem[] {
  const perDay = facts.resolution === "hour" ? dayLength : 1;
  const order = [...at.keys()].filter((index) => !Number.isNaN(at[index])).sort((a, b) => at[a] - at[b]);
  const problems: Problem[] = [];
  while (order.length >= 6) {
    const day = (place: number) => Math.floor(at[order.at(place) as number] / perDay);
    const early = day(1) - day(0) > Math.max(731, day(-1) - day(1));
    const late = day(-1) - day(-2) > Math.max(731, day(-2) - day(0));
    if (!early && !late) break;
    const index = (early ? order.shift() : order.pop()) as number;
    problems.push(
      complain(
        "lonely-date",
        false,
        `${isoDate(Math.floor(at[index] / perDay))} lies far from all other dates; the row is left out`,
        "correct the year",
        { line: dates.lines[index], column: facts.column },
      ),
    );
    at[index] = Number.NaN;
  }
  return problems;
}
