import { civilDate, dayNumber, isoWeekStart, weekday } from "./civil.ts";
import { emptyDateCell } from "./dateCell.ts";
import type { DateColumn, Row } from "./layout.ts";

const partNames =
  /^(?:year|quarter|month|week|day|hour|weekday|day of week|jahr|quartal|monat|woche|kw|tag|wochentag|stunde|a[nñ]o|mes|semana|d[ií]a|hora|ann[eé]e|mois|semaine|jour|heure)$/i;

/** Rows looked at. */
const mostRows = 500;

/** What a column beside a date may say of it again; weekdays are counted from Monday or Sunday, from 0 or 1. */
function partsOf(days: number, clock: number): number[] {
  const { year, month, day } = civilDate(days);
  const monday = days - weekday(days);
  const isoYear = civilDate(monday + 3).year;
  const week = (monday - (isoWeekStart(isoYear, 1) ?? dayNumber(isoYear, 1, 4))) / 7 + 1;
  const ofWeek = weekday(days);
  const hour = Math.floor(Math.max(clock, 0) / 3_600_000);
  return [
    year,
    month,
    day,
    Math.ceil(month / 3),
    week,
    hour,
    ofWeek,
    ofWeek + 1,
    (ofWeek + 1) % 7,
    ((ofWeek + 1) % 7) + 1,
  ];
}

/**
 * A column is named like a part of a date, and in every row holds that very part of the row's date: the year, the
 * month, the week, the weekday or the hour spelled out again. Such a column is no series.
 */
export function spellsPartOfDate(
  rows: readonly Row[],
  column: number,
  name: string,
  dates: DateColumn,
): boolean {
  if (!partNames.test(name.replaceAll("_", " "))) return false;
  const cell = emptyDateCell();
  let possible: Set<number> | undefined;
  for (const { cells } of rows.slice(0, mostRows)) {
    const text = (cells[column] ?? "").trim();
    if (text === "" || !dates.format.read((cells[dates.column] ?? "").trim(), cell) || Number.isNaN(cell.day))
      continue;
    const holds = partsOf(cell.day, cell.clock).map((part) => part === Number(text));
    possible = new Set([...(possible ?? holds.keys())].filter((at) => holds[at]));
  }
  return possible !== undefined && possible.size > 0;
}
