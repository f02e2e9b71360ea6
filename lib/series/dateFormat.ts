import { dayNumber, isCivilDate } from "./civil.ts";
import type { DateCell } from "./dateCell.ts";

/** One way of writing dates. `read` fills the cell in and says whether the text is written so. */
export interface DateFormat {
  readonly name: string;
  /** As people would write it down. */
  readonly pattern: string;
  /** Mere digits, which could be an amount as well: taken for dates only where something else says so. */
  readonly digitsOnly: boolean;
  read(text: string, cell: DateCell): boolean;
}

/** Fills the cell in with a date; false when there is no such date. */
export function put(
  cell: DateCell,
  grain: DateCell["grain"],
  year: number,
  month: number,
  day: number,
): boolean {
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
/** Two digits at a place, `NaN` where there are none. */
export const two = (text: string, at: number) => digit(text, at) * 10 + digit(text, at + 1);
