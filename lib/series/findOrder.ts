import { civilDate } from "./civil.ts";
import { type DateOrder, type KeyReader, type Resolution, settleParts } from "./dateKeys.ts";
import { type Complain, quoted } from "./problems.ts";
import { TableFault } from "./tableFault.ts";

export interface FoundOrder {
  readonly order: DateOrder;
  /** What told it, as a phrase. */
  readonly how: string;
}

/** Dates that tell nothing one by one must be this many before their even spacing does. */
const fewestForSpacing = 13;

/** Days, ascending, step evenly: by the same number of days, or from one day of the month to the same of a later one. */
function isEven(days: readonly number[]): boolean {
  const steps = new Set(days.slice(1).map((day, at) => day - days[at]));
  if (steps.size === 1) return true;
  const dates = days.map(civilDate);
  if (dates.some(({ day }) => day !== dates[0].day)) return false;
  const months = dates.map(({ year, month }) => year * 12 + month);
  return new Set(months.slice(1).map((month, at) => month - months[at])).size === 1;
}

function bySpacing(keys: readonly number[], resolution: Resolution): FoundOrder | undefined {
  const perDay = resolution === "hour" ? 24 : 1;
  const even = (["day-first", "month-first"] as const).filter((order) => {
    const days = new Set(keys.map((key) => Math.floor(settleParts(key, resolution, order) / perDay)));
    return days.size >= fewestForSpacing && isEven([...days].sort((a, b) => a - b));
  });
  return even.length === 1 ? { order: even[0], how: "only so are the dates evenly spaced" } : undefined;
}

/**
 * Whether a column of numeric dates has the day or the month in front, by everything that stands in it: a number above
 * twelve; points between the numbers, which go with the day in front everywhere; or, for a dozen dates and more, that
 * one order alone spaces them evenly.
 *
 * @param keys distinct keys of parts
 * @throws TableFault when the column contradicts itself, or leaves a doubt
 */
export function findOrder(
  keys: readonly number[],
  reader: KeyReader,
  resolution: Resolution,
  example: { readonly line: number; readonly text: string },
  column: string,
  complain: Complain,
): FoundOrder {
  const dayFirst = reader.evidence().get("day-first");
  const monthFirst = reader.evidence().get("month-first");
  if (dayFirst && monthFirst)
    throw new TableFault(
      complain(
        "mixed-date-orders",
        true,
        `${quoted(dayFirst.text)} in line ${dayFirst.line} has the day in front, ${quoted(monthFirst.text)} in line ${monthFirst.line} the month`,
        "write all dates one way, best as 2026-11-30",
        { line: Math.max(dayFirst.line, monthFirst.line), column },
      ),
    );
  if (dayFirst) return { order: "day-first", how: `${quoted(dayFirst.text)} in line ${dayFirst.line}` };
  if (monthFirst)
    return { order: "month-first", how: `${quoted(monthFirst.text)} in line ${monthFirst.line}` };
  if (reader.dotted()) return { order: "day-first", how: "dates with points have the day in front" };
  const spaced = bySpacing(keys, resolution);
  if (spaced) return spaced;
  throw new TableFault(
    complain(
      "date-order-unclear",
      true,
      `${quoted(example.text)} may have the day or the month in front, and no date in the column tells which`,
      'say "dateOrder": "day-first" or "dateOrder": "month-first" for this table in the settings',
      { line: example.line, column },
    ),
  );
}

/**
 * Refuses two-digit years where the year may well be in front: the last number changes most and could be a day.
 *
 * @throws TableFault
 */
export function refuseShortYearsInFront(
  cells: readonly { readonly line: number; readonly text: string }[],
  column: string,
  complain: Complain,
): void {
  const seen = [new Set<number>(), new Set<number>(), new Set<number>()];
  for (const { text } of cells) {
    const parts = /^(\d{1,2})[-/.](\d{1,2})[-/.](\d{2})(?!\d)/.exec(text);
    if (!parts) continue;
    for (const at of [0, 1, 2]) seen[at].add(Number(parts[at + 1]));
  }
  const [first, second, third] = seen;
  const isYear = [...third].some((number) => number === 0 || number > 31);
  if (third.size <= 1 || isYear || third.size <= first.size || third.size <= second.size) return;
  throw new TableFault(
    complain(
      "two-digit-years",
      true,
      `${quoted(cells[0].text)} may have its year in front or at the end`,
      "write years with four digits, best as 2026-11-30",
      { line: cells[0].line, column },
    ),
  );
}
