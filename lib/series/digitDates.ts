import { type DateCell, readClock } from "./dateCell.ts";
import { type DateFormat, put, two } from "./dateFormat.ts";

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

/** Dates of mere digits. */
export const digitDates: readonly DateFormat[] = [
  years,
  compactMonths,
  compactDates,
  epochSeconds,
  epochMilliseconds,
  serialNumbers,
];
