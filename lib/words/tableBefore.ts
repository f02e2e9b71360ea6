import { plainName } from "./plainText.ts";

/** The table to name before a series, at most `longest` characters; `null` where it has the series' own name. */
export function tableBefore(table: string, series: string, longest: number): string | null {
  return table === series ? null : plainName(table, longest);
}

/** A series as it is told (`told`), after its table unless both have one name. */
export function nameInTable(table: string, series: string, told: string, longest: number): string {
  const before = tableBefore(table, series, longest);
  return before === null ? told : `${before}, ${told}`;
}
