import type { Reading } from "./reading.ts";
import type { Problem, Series } from "./series.ts";

export interface ReadContext {
  /** Now: the period that holds it is not over and is left out, with all that comes after. */
  readonly asOf: Date | string;
  /** IANA zone of calendar days, and of clock times without an offset; UTC unless given. */
  readonly timeZone?: string;
  /** Language of month names, beside English; en-GB unless given. */
  readonly locale?: string;
  /** The table's name, for problems. */
  readonly table?: string;
}

export interface TableResult {
  readonly series: Series[];
  readonly problems: Problem[];
  /** What was taken for what; `null` when the table could not be read at all. */
  readonly reading: Reading | null;
}
