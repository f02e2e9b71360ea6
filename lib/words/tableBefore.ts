import { plainName } from "./plainText.ts";

/** The table to name before a series, at most `longest` characters; `null` where it has the series' own name. */
export function tableBefore(table: string, series: string, longest: number): string | null {
  return table === series ? null : plainName(table, longest);
}
