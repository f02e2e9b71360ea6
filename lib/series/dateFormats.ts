import { isCivilDate, isoWeekStart } from "./civil.ts";
import { fullYear, readClock } from "./dateCell.ts";
import { type DateFormat, put, two } from "./dateFormat.ts";
import { digitDates } from "./digitDates.ts";
import { monthNames } from "./monthNames.ts";

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
  return [isoDates, isoWeeks, months, quarters, numericDates, namedMonths(locale), ...digitDates];
}
