import { dayNumber, isCivilDate, isoWeekStart } from "./civil.ts";
import { type DateCell, fullYear, readClock } from "./dateCell.ts";
import { monthNames } from "./monthNames.ts";

/** One way of writing dates. `read` fills the cell in and says whether the text is written so. */
export interface DateFormat {
  readonly name: string;
  /** As people would write it down. */
  readonly pattern: string;
  /** Mere digits, which could be an amount as well: taken for dates only where something else says so. */
  readonly digitsOnly: boolean;
  read(text: string, cell: DateCell): boolean;
}

function put(cell: DateCell, grain: DateCell["grain"], year: number, month: number, day: number): boolean {
  if (!isCivilDate(year, month, day)) return false;
  cell.day = dayNumber(year, month, day);
  cell.clock = -1;
  cell.offset = Number.NaN;
  cell.grain = grain;
  return true;
}

const digit = (text: string, at: number) => {
  const code = text.charCodeAt(at) - 48;
  return code >= 0 && code <= 9 ? code : Number.NaN;
};
const two = (text: string, at: number) => digit(text, at) * 10 + digit(text, at + 1);

const isoDates: DateFormat = {
  name: "iso-date",
  pattern: "YYYY-MM-DD",
  digitsOnly: false,
  read(text, cell) {
    // The usual ten characters without a pattern match: this is the busiest line of the room.
    if (text.length === 10 && text.charCodeAt(4) === 45 && text.charCodeAt(7) === 45) {
      const year = two(text, 0) * 100 + two(text, 2);
      return put(cell, "day", year, two(text, 5), two(text, 8));
    }
    const match = /^(\d{4})([-/.])(\d{1,2})\2(\d{1,2})(?!\d)/.exec(text);
    if (!match || !put(cell, "day", Number(match[1]), Number(match[3]), Number(match[4]))) return false;
    return readClock(text.slice(match[0].length), cell);
  },
};

const isoWeeks: DateFormat = {
  name: "iso-week",
  pattern: "YYYY-Www",
  digitsOnly: false,
  read(text, cell) {
    const match =
      /^(?<y>\d{4})[-/ ]?(?:W|KW ?)(?<w>\d{1,2})(?:-?(?<d>[1-7]))?$|^(?:W|KW|Week) ?(?<w2>\d{1,2})[-/, ]+(?<y2>\d{4})$/i.exec(
        text,
      )?.groups;
    if (!match) return false;
    const monday = isoWeekStart(Number(match.y ?? match.y2), Number(match.w ?? match.w2));
    if (monday === undefined) return false;
    cell.day = monday + (match.d ? Number(match.d) - 1 : 0);
    cell.clock = -1;
    cell.offset = Number.NaN;
    cell.grain = match.d ? "day" : "week";
    return true;
  },
};

const months: DateFormat = {
  name: "month",
  pattern: "YYYY-MM",
  digitsOnly: false,
  read(text, cell) {
    const match = /^(\d{4})(?:[-/]|[-/ ]?M)(\d{1,2})$|^(\d{1,2})[-/](\d{4})$/i.exec(text);
    return (
      match !== null && put(cell, "month", Number(match[1] ?? match[4]), Number(match[2] ?? match[3]), 1)
    );
  },
};

const quarters: DateFormat = {
  name: "quarter",
  pattern: "YYYY-Qn",
  digitsOnly: false,
  read(text, cell) {
    const match = /^(\d{4})[-/ ]?Q([1-4])$|^Q([1-4])[-/ ]*(\d{4})$|^([1-4])Q[-/ ]?(\d{4})$/i.exec(text);
    if (!match) return false;
    const quarter = Number(match[2] ?? match[3] ?? match[5]);
    return put(cell, "quarter", Number(match[1] ?? match[4] ?? match[6]), quarter * 3 - 2, 1);
  },
};

const numericDates: DateFormat = {
  name: "day-and-month",
  pattern: "dd/mm/yyyy or mm/dd/yyyy",
  digitsOnly: false,
  read(text, cell) {
    const match = /^(?:\p{L}{2,12}\.?,? +)?(\d{1,2})([-/.])(\d{1,2})\2(\d{4}|\d{2})(?!\d)\.?/u.exec(text);
    if (!match || !readClock(text.slice(match[0].length), cell)) return false;
    cell.day = Number.NaN;
    cell.first = Number(match[1]);
    cell.second = Number(match[3]);
    cell.year = fullYear(match[4]);
    return isCivilDate(cell.year, cell.second, cell.first) || isCivilDate(cell.year, cell.first, cell.second);
  },
};

const years: DateFormat = {
  name: "year",
  pattern: "YYYY",
  digitsOnly: true,
  read: (text, cell) => /^[12]\d{3}$/.test(text) && put(cell, "year", Number(text), 1, 1),
};

const compactMonths: DateFormat = {
  name: "compact-month",
  pattern: "YYYYMM",
  digitsOnly: true,
  read: (text, cell) =>
    /^(?:1[5-9]|2[01])\d{4}$/.test(text) && put(cell, "month", Number(text.slice(0, 4)), two(text, 4), 1),
};

const compactDates: DateFormat = {
  name: "compact-date",
  pattern: "YYYYMMDD",
  digitsOnly: true,
  read(text, cell) {
    const match = /^((?:1[5-9]|2[01])\d{2})(\d{2})(\d{2})(?:T?(\d{2}):?(\d{2}):?(\d{2})?(Z)?)?$/.exec(text);
    if (!match || !put(cell, "day", Number(match[1]), Number(match[2]), Number(match[3]))) return false;
    return (
      match[4] === undefined ||
      readClock(`${match[4]}:${match[5]}:${match[6] ?? "00"}${match[7] ?? ""}`, cell)
    );
  },
};

function putInstant(cell: DateCell, milliseconds: number): boolean {
  cell.day = Math.floor(milliseconds / 86_400_000);
  cell.clock = milliseconds - cell.day * 86_400_000;
  cell.offset = 0;
  cell.grain = "instant";
  return true;
}

const epochSeconds: DateFormat = {
  name: "epoch-seconds",
  pattern: "seconds since 1970",
  digitsOnly: true,
  read: (text, cell) =>
    /^\d{9,10}(?:\.\d+)?$/.test(text) && putInstant(cell, Math.floor(Number(text) * 1000)),
};

const epochMilliseconds: DateFormat = {
  name: "epoch-milliseconds",
  pattern: "milliseconds since 1970",
  digitsOnly: true,
  read: (text, cell) => /^\d{12,13}$/.test(text) && putInstant(cell, Number(text)),
};

const serialNumbers: DateFormat = {
  name: "spreadsheet-number",
  pattern: "days since 1899-12-30, as spreadsheets count",
  digitsOnly: true,
  read(text, cell) {
    // 20,000 to 80,000: the years 1954 to 2119.
    const match = /^([2-7]\d{4})([.,]\d+)?$/.exec(text);
    if (!match) return false;
    cell.day = Number(match[1]) - 25_569;
    cell.offset = Number.NaN;
    const seconds = match[2] ? Math.round(Number(`0.${match[2].slice(1)}`) * 86_400) : 0;
    cell.clock = match[2] ? Math.min(seconds, 86_399) * 1000 : -1;
    cell.grain = match[2] ? "instant" : "day";
    return true;
  },
};

function namedMonths(locale: string): DateFormat {
  const names = monthNames(locale);
  return {
    name: "month-name",
    pattern: "5 January 2026",
    digitsOnly: false,
    read(text, cell) {
      const time = / ?T?\b\d{1,2}:\d{2}.*$/.exec(text);
      const words = (time ? text.slice(0, time.index) : text)
        .split(/[\s,./'’-]+/)
        .filter((word) => word !== "");
      let month = 0;
      let monthAt = 0;
      const numbers: string[] = [];
      for (const word of words) {
        const number = /^(\d{1,4})(?:st|nd|rd|th|º|er)?$/i.exec(word);
        if (number) numbers.push(number[1]);
        else if (month === 0 && names.monthOf(word) > 0) {
          month = names.monthOf(word);
          monthAt = numbers.length;
        } else if (!names.isWeekday(word) && !/^(?:de|del|of|the|d)$/i.test(word)) return false;
      }
      if (month === 0 || numbers.length === 0 || numbers.length > 2) return false;
      const yearAt = numbers[0].length === 4 ? 0 : numbers.length - 1;
      if (numbers[yearAt].length !== 4 && numbers[yearAt].length !== 2) return false;
      const year = fullYear(numbers[yearAt]);
      if (numbers.length === 2) {
        if (!put(cell, "day", year, month, Number(numbers[1 - yearAt]))) return false;
        return time === null || readClock(time[0], cell);
      }
      // "Jan-24" and "Jan '24" name a year; "Jan 24" and "24 Jan" name a day without one.
      const isYear = numbers[0].length === 4 || (monthAt === 0 && /[-'’/]/.test(text));
      return isYear && time === null && put(cell, "month", year, month, 1);
    },
  };
}

/** Every way of writing dates that is known, those that cannot be mistaken first. */
export function dateFormats(locale: string): DateFormat[] {
  return [
    isoDates,
    isoWeeks,
    months,
    quarters,
    numericDates,
    namedMonths(locale),
    years,
    compactMonths,
    compactDates,
    epochSeconds,
    epochMilliseconds,
    serialNumbers,
  ];
}
