/** How much of the calendar a cell names. */
export type Grain = "instant" | "day" | "week" | "month" | "quarter" | "year";

/**
 * What one cell said, filled in anew for each cell so that reading a row makes no garbage.
 * A numeric date whose order is not known yet leaves `day` at `NaN` and its parts in `first`, `second`, `year`.
 */
export interface DateCell {
  /** Days since 1970-01-01. */
  day: number;
  /** Milliseconds since midnight; -1 without a clock time. */
  clock: number;
  /** What the clock is ahead of UTC, in milliseconds; `NaN` for a local clock. */
  offset: number;
  first: number;
  second: number;
  year: number;
  grain: Grain;
}

export const emptyDateCell = (): DateCell => ({
  day: Number.NaN,
  clock: -1,
  offset: Number.NaN,
  first: 0,
  second: 0,
  year: 0,
  grain: "day",
});

const clockPattern =
  /^(?:[T ]|, ?| at )? *(\d{1,2})[:.](\d{2})(?:[:.](\d{2})(?:[.,](\d{1,9}))?)? ?([ap])?(?:\.?m\.?)? ?(Z|UTC|GMT|[+-]\d{2}(?::?\d{2})?)?$/i;

/**
 * Reads what follows a date: nothing, or a clock time with or without an offset.
 * `24:00` is the midnight that ends the day, as ISO 8601:2004 had it.
 */
export function readClock(text: string, cell: DateCell): boolean {
  cell.clock = -1;
  cell.offset = Number.NaN;
  if (text === "") {
    cell.grain = "day";
    return true;
  }
  const match = clockPattern.exec(text);
  if (!match) return false;
  let hour = Number(match[1]);
  const minute = Number(match[2]);
  const second = Number(match[3] ?? 0);
  const half = match[5]?.toLowerCase();
  if (half !== undefined) {
    if (hour < 1 || hour > 12) return false;
    hour = (hour % 12) + (half === "p" ? 12 : 0);
  }
  if (hour > 24 || minute > 59 || second > 60 || (hour === 24 && minute + second > 0)) return false;
  const fraction = match[4] === undefined ? 0 : Math.floor(Number(`0.${match[4]}`) * 1000);
  cell.clock = ((hour * 60 + minute) * 60 + second) * 1000 + fraction;
  cell.grain = "instant";
  const zone = match[6];
  if (zone !== undefined) {
    const sign = zone.startsWith("-") ? -1 : 1;
    const digits = /\d/.test(zone) ? zone.slice(1).replace(":", "") : "0000";
    cell.offset = sign * (Number(digits.slice(0, 2)) * 60 + Number(digits.slice(2) || 0)) * 60_000;
  }
  return true;
}

/** A two-digit year by the POSIX rule: 69 to 99 are 1969 to 1999, 00 to 68 are 2000 to 2068. */
export const fullYear = (digits: string) => {
  const year = Number(digits);
  return digits.length > 2 ? year : year + (year >= 69 ? 1900 : 2000);
};
