import { dayNumber, isCivilDate } from "./civil.ts";
import { localDay } from "./currentPeriod.ts";
import { type DateCell, emptyDateCell } from "./dateCell.ts";
import type { DateFormat } from "./dateFormats.ts";
import { stepOfInstants } from "./findPeriod.ts";
import { instantsOf } from "./zone.ts";

export type DateOrder = "day-first" | "month-first";

/** Whether rows are kept by calendar day or by hour. */
export type Resolution = "day" | "hour";

/** Turns date cells into whole numbers: days since 1970-01-01 or hours since 1970-01-01T00:00Z; `NaN` for no date. */
export interface DateKeys {
  readonly resolution: Resolution;
  read(text: string): number;
  /** The instant (or local reading) the last cell named, in milliseconds, to tell which of two is later. */
  lastMoment(): number;
}

const dayLength = 86_400_000;
const hourLength = 3_600_000;

/** Settles day and month of a numeric date by the order; false when the date does not exist then. */
export function settleOrder(cell: DateCell, order: DateOrder): boolean {
  const day = order === "day-first" ? cell.first : cell.second;
  const month = order === "day-first" ? cell.second : cell.first;
  if (!isCivilDate(cell.year, month, day)) return false;
  cell.day = dayNumber(cell.year, month, day);
  return true;
}

/** Milliseconds since 1970 of a cell: the instant where it has an offset, else its local clock read as UTC. */
const momentOf = (cell: DateCell) =>
  cell.day * dayLength + Math.max(cell.clock, 0) - (Number.isNaN(cell.offset) ? 0 : cell.offset);

/** Every instant is a midnight in UTC: the table means days, and wrote them as instants. */
export interface ClockUse {
  readonly resolution: Resolution | undefined;
  readonly midnightsOnly: boolean;
}

/** From sample cells: are there clock times, and do they step by the hour? */
export function findClockUse(
  texts: readonly string[],
  format: DateFormat,
  order: DateOrder | null,
): ClockUse {
  const cell = emptyDateCell();
  const moments = new Set<number>();
  let midnightsOnly = true;
  let withClock = 0;
  for (const text of texts) {
    if (!format.read(text, cell)) continue;
    if (
      Number.isNaN(cell.day) &&
      !settleOrder(cell, order ?? "day-first") &&
      !settleOrder(cell, "month-first")
    )
      continue;
    if (cell.clock >= 0) withClock++;
    if (cell.clock > 0) midnightsOnly = false;
    moments.add(momentOf(cell));
  }
  if (midnightsOnly || withClock === 0) return { resolution: "day", midnightsOnly };
  return { resolution: stepOfInstants([...moments].sort((a, b) => a - b)), midnightsOnly };
}

/** A reader of date cells, for the order of day and month that was settled. */
export function createDateKeys(
  format: DateFormat,
  order: DateOrder | null,
  resolution: Resolution,
  midnightsOnly: boolean,
  timeZone: string,
): DateKeys {
  const cell = emptyDateCell();
  let lastText: string | undefined;
  let lastKey = Number.NaN;
  let moment = Number.NaN;
  const keyOf = (text: string): number => {
    if (!format.read(text, cell)) return Number.NaN;
    if (Number.isNaN(cell.day) && !settleOrder(cell, order ?? "day-first")) return Number.NaN;
    moment = momentOf(cell);
    const isLocal = Number.isNaN(cell.offset) || midnightsOnly;
    if (resolution === "day")
      return isLocal
        ? cell.day + Math.floor(Math.max(cell.clock, 0) / dayLength)
        : localDay(moment, timeZone);
    if (!isLocal) return Math.floor(moment / hourLength);
    const instant = instantsOf(moment, timeZone)[0];
    return instant === undefined ? Number.NaN : Math.floor(instant / hourLength);
  };
  return {
    resolution,
    read(text) {
      if (text !== lastText) {
        lastText = text;
        lastKey = keyOf(text);
      }
      return lastKey;
    },
    lastMoment: () => moment,
  };
}
