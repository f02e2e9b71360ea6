import * as fc from "fast-check";
import type { Period } from "../../lib/series/series.ts";
import type { Dialect, Table } from "./writeTable.ts";

const day = 86_400_000;

/** ISO dates one period apart, by the rules of `Date` alone. */
function datesOf(period: Period, start: number, count: number): string[] {
  return Array.from({ length: count }, (_, at) => {
    const first = new Date(Date.UTC(2001, 0, 1) + start * day);
    const date =
      period === "day"
        ? new Date(first.getTime() + at * day)
        : period === "week"
          ? new Date(first.getTime() + at * 7 * day)
          : new Date(
              Date.UTC(first.getUTCFullYear(), first.getUTCMonth() + at * (period === "quarter" ? 3 : 1), 1),
            );
    return date.toISOString().slice(0, 10);
  });
}

const decimalText = fc
  .tuple(
    fc.integer({ min: -9_999_999, max: 9_999_999 }),
    fc.integer({ min: 0, max: 99 }),
    fc.integer({ min: 0, max: 2 }),
  )
  .map(([whole, hundredths, digits]) =>
    digits === 0 ? String(whole) : `${whole}.${String(hundredths).padStart(2, "0").slice(0, digits)}`,
  );

const name = fc
  .stringMatching(/^[A-Za-zÀ-ž]{1,6} ?[A-Za-zÀ-ž]{0,3}[a-zà-ž]$/)
  .filter((text) => !/^(?:date|year|quarter|month|week|day|hour|row|index)$/i.test(text));

/** Regular tables of 14 to 40 periods, with gaps but a value at both ends of each column. */
export const arbitraryTable: fc.Arbitrary<Table> = fc
  .record({
    period: fc.constantFrom<Period>("day", "week", "month", "quarter"),
    start: fc.integer({ min: 0, max: 6000 }),
    count: fc.integer({ min: 14, max: 40 }),
    names: fc.uniqueArray(name, { minLength: 1, maxLength: 4, selector: (text) => text.toLowerCase() }),
  })
  .chain(({ period, start, count, names }) =>
    fc
      .array(
        fc.tuple(
          fc.array(fc.option(decimalText, { freq: 6 }), { minLength: count - 2, maxLength: count - 2 }),
          decimalText,
          decimalText,
        ),
        { minLength: names.length, maxLength: names.length },
      )
      .map((columns) => ({
        period,
        dates: datesOf(period, start, count),
        names,
        columns: columns.map(([middle, first, last]) => [first, ...middle, last]),
      })),
  );

/** Every combination of habits in which the two marks differ. */
export const arbitraryDialect: fc.Arbitrary<Dialect> = fc
  .record<Dialect>({
    delimiter: fc.constantFrom(",", ";", "\t", "|"),
    decimal: fc.constantFrom(".", ","),
    thousands: fc.constantFrom("", ",", ".", " ", "'"),
    date: fc.constantFrom("iso", "iso-slash", "day-first", "month-first", "dotted", "named"),
    quoteAll: fc.boolean(),
    lineEnd: fc.constantFrom("\n", "\r\n", "\r"),
    currency: fc.constantFrom("", "€ ", " kr", "EUR "),
    negative: fc.constantFrom("minus", "parentheses", "behind"),
    missing: fc.constantFrom("", "NA", "-", "n/a"),
    titles: fc.integer({ min: 0, max: 3 }),
    blankLines: fc.boolean(),
    total: fc.boolean(),
    newestFirst: fc.boolean(),
    encoding: fc.constantFrom("utf-8", "utf-8-mark", "utf-16le", "utf-16be"),
  })
  .filter(({ decimal, thousands }) => decimal !== thousands);
