import { parse } from "csv-parse/sync";

/**
 * What is wrong with a forecast file: a missing or non-finite number, a range that is not around its forecast, a wider
 * level inside a narrower one, or a series without all its periods. Empty when the file is complete.
 */
export function forecastFaults(text: string, series: readonly string[], horizon: number): string[] {
  const rows: Record<string, string>[] = parse(text, { columns: true });
  const faults: string[] = [];
  for (const name of series) {
    const own = rows.filter((row) => row.series === name);
    if (own.length !== horizon) faults.push(`${name}: ${own.length} of ${horizon} periods`);
  }
  for (const row of rows) {
    const [point, low80, high80, low95, high95] = ["forecast", "low80", "high80", "low95", "high95"].map(
      (column) => (row[column] === "" ? Number.NaN : Number(row[column])),
    );
    const ordered = low95 <= low80 && low80 <= point && point <= high80 && high80 <= high95;
    if (!ordered || ![low95, high95].every(Number.isFinite)) faults.push(JSON.stringify(row));
  }
  return faults;
}
