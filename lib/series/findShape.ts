import type { ColumnCounts, DateColumn, Row } from "./layout.ts";

/**
 * The column that names the series of a long table, or `null` for a wide one. Dates that repeat while date and name
 * together never do make a table long. A column of whole numbers is taken for names only when it makes a full panel:
 * nearly every name on nearly every date.
 */
export function findShape(
  rows: readonly Row[],
  dates: DateColumn,
  others: readonly number[],
  counts: ReadonlyMap<number, ColumnCounts>,
  values: readonly number[] | undefined,
): number | null {
  const at = (row: Row, column: number) => (row.cells[column] ?? "").trim();
  const data = rows.filter((row) => at(row, dates.column) !== "").slice(0, 50_000);
  const distinctDates = new Set(data.map((row) => at(row, dates.column))).size;
  if (distinctDates === data.length) return null;
  const free = others.filter((column) => !values?.includes(column));
  const isUnique = (column: number) =>
    new Set(data.map((row) => `${at(row, dates.column)}\u0000${at(row, column)}`)).size === data.length;
  const names = (column: number) => new Set(data.map((row) => at(row, column))).size;
  for (const column of free) {
    const count = counts.get(column);
    if (count && count.texts > count.numbers && count.texts > 0 && names(column) > 1 && isUnique(column))
      return column;
  }
  for (const column of free) {
    if (!data.every((row) => /^\d+$/.test(at(row, column)))) continue;
    const distinct = names(column);
    if (
      distinct > 1 &&
      distinctDates > 2 &&
      distinct * distinctDates <= 1.25 * data.length &&
      isUnique(column)
    )
      return column;
  }
  return null;
}
