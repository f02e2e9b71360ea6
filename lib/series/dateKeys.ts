import { dayNumber, isCivilDate } from "./civil.ts";
import { localDay } from "./currentPeriod.ts";
import { emptyDateCell } from "./dateCell.ts";
import type { DateFormat } from "./dateFormat.ts";
import { instantsOf, zoneOffset } from "./zone.ts";

export type DateOrder = "day-first" | "month-first";

/** Whether rows are kept by calendar day or by hour. */
export type Resolution = "day" | "hour";

const hourLength = 3_600_000;
const dayLength = 86_400_000;

/** How the date cells of one table become keys. */
export interface KeySettings {
  readonly format: DateFormat;
  readonly resolution: Resolution;
  /** Every instant is a midnight in UTC: days were meant. */
  readonly midnightsOnly: boolean;
  readonly timeZone: string;
}

/**
 * A key keeps what a date cell says as one whole number. `calendar` keys are counted: days since 1970-01-01, or local
 * clock hours since then. `instant` keys are UTC hours. `parts` keys hold year, first and second number of a date whose
 * order is settled only when the whole column has been seen.
 */
export type KeyKind = "calendar" | "instant" | "parts";

export interface KeyReader {
  /** `NaN` when the text is no date. */
  read(text: string): number;
  /** Of the last cell read. */
  kind(): KeyKind;
  /** Milliseconds that order the rows of one key. */
  moment(): number;
  /** First cells that can only be read with the day, or only with the month, in front. */
  evidence(): ReadonlyMap<DateOrder, { readonly line: number; readonly text: string }>;
  /** The last cell names a local clock hour that may come twice, on the night clocks go back. */
  mayRepeat(): boolean;
  /** Told before each cell, so that evidence has its line. */
  at(line: number): void;
  /** A cell had points between its numbers. */
  dotted(): boolean;
}

/** Slots a day in a key of parts: the hours from 0 to 24, as 24:00 ends a day whichever day it is. */
const slots = 25;

/** Reads date cells one after another; a text that repeats is not read again. */
export function createKeyReader({ format, resolution, midnightsOnly, timeZone }: KeySettings): KeyReader {
  const cell = emptyDateCell();
  const evidence = new Map<DateOrder, { line: number; text: string }>();
  const perDay = resolution === "hour" ? 24 : 1;
  let lastText: string | undefined;
  let lastKey = Number.NaN;
  let lastKind: KeyKind = "calendar";
  let moment = 0;
  let line = 0;
  let hasPoints = false;
  const keyOf = (text: string): number => {
    if (!format.read(text, cell)) return Number.NaN;
    const clock = Math.max(cell.clock, 0);
    if (Number.isNaN(cell.day)) {
      if (cell.first > 12 && !evidence.has("day-first")) evidence.set("day-first", { line, text });
      if (cell.second > 12 && !evidence.has("month-first")) evidence.set("month-first", { line, text });
      if (text.charCodeAt(1) === 46 || text.charCodeAt(2) === 46) hasPoints = true;
      lastKind = "parts";
      moment = clock;
      const slot = perDay === 24 || clock >= dayLength ? Math.floor(clock / hourLength) : 0;
      return ((cell.year * 32 + cell.first) * 32 + cell.second) * slots + slot;
    }
    const local = cell.day * dayLength + clock;
    if (Number.isNaN(cell.offset) || midnightsOnly) {
      lastKind = "calendar";
      moment = local;
      return Math.floor(local / (dayLength / perDay));
    }
    moment = local - cell.offset;
    if (resolution === "day") {
      lastKind = "calendar";
      return localDay(moment, timeZone);
    }
    lastKind = "instant";
    return Math.floor(moment / hourLength);
  };
  const mayRepeat = createRepeatTest(timeZone);
  return {
    read(text) {
      if (text !== lastText) {
        lastText = text;
        lastKey = keyOf(text);
      }
      return lastKey;
    },
    kind: () => lastKind,
    moment: () => moment,
    evidence: () => evidence,
    mayRepeat() {
      if (resolution === "day" || lastKind === "instant") return false;
      if (lastKind === "calendar") return mayRepeat(lastKey);
      return (["day-first", "month-first"] as const).some((order) =>
        mayRepeat(settleParts(lastKey, resolution, order)),
      );
    },
    at(now) {
      line = now;
    },
    dotted: () => hasPoints,
  };
}

/** The calendar key of a key of parts under an order, `NaN` when there is no such date. */
export function settleParts(key: number, resolution: Resolution, order: DateOrder): number {
  const slot = key % slots;
  const packed = Math.floor(key / slots);
  const second = packed % 32;
  const first = Math.floor(packed / 32) % 32;
  const year = Math.floor(packed / 1024);
  const [day, month] = order === "day-first" ? [first, second] : [second, first];
  if (!isCivilDate(year, month, day)) return Number.NaN;
  const days = dayNumber(year, month, day);
  return resolution === "hour" ? days * 24 + slot : days + Math.floor(slot / 24);
}

/** The instants, in milliseconds, that a local clock hour may be: two in the hour that is repeated in autumn. */
export const instantsOfHour = (localHour: number, timeZone: string) =>
  instantsOf(localHour * hourLength, timeZone);

/** Whether a local clock hour is one that the zone's clocks show twice; remembers the days without a change. */
function createRepeatTest(timeZone: string): (localHour: number) => boolean {
  const changes = new Map<number, boolean>();
  return (localHour) => {
    if (Number.isNaN(localHour)) return false;
    const day = Math.floor(localHour / 24);
    let goesBack = changes.get(day);
    if (goesBack === undefined) {
      const middle = day * dayLength + dayLength / 2;
      goesBack = zoneOffset(middle + dayLength, timeZone) < zoneOffset(middle - dayLength, timeZone);
      changes.set(day, goesBack);
    }
    return goesBack && instantsOfHour(localHour, timeZone).length > 1;
  };
}
