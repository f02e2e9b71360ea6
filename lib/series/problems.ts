import type { Problem } from "./series.ts";

/** Where a problem was found. */
interface Place {
  readonly line?: number;
  readonly column?: string;
}

/** Makes problems of one table. */
export type Complain = (
  code: string,
  fatal: boolean,
  message: string,
  remedy: string,
  place?: Place,
) => Problem;

export function complainer(table: string): Complain {
  return (code, fatal, message, remedy, place = {}) => ({ table, ...place, code, message, remedy, fatal });
}

/** A cell as it may stand in a sentence: short, on one line, in quotes. */
export function quoted(text: string): string {
  const flat = text.replace(/[\p{Cc}\p{Cf}\s]+/gu, " ").trim();
  return `"${flat.length > 40 ? `${flat.slice(0, 39)}…` : flat}"`;
}
