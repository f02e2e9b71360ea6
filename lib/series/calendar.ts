import type { Resolution } from "./dateKeys.ts";
import { periodOfDays, weekStartOfDays } from "./findPeriod.ts";
import { type Weekday, weekdays } from "./periods.ts";
import { type Complain, quoted } from "./problems.ts";
import type { Reading } from "./reading.ts";
import type { Period } from "./series.ts";
import { TableFault } from "./tableFault.ts";
import type { TableSettings } from "./tableSettings.ts";
import { zoneOffset } from "./zone.ts";

/** The calendar of a table: its step, where its periods begin, and how that was found. */
export interface Calendar {
  readonly every: Period;
  /** 0 for Monday. */
  readonly weekStart: number;
  /** Milliseconds after the full UTC hour at which local hours begin: half an hour in Kolkata. */
  readonly phase: number;
  readonly how: Reading["period"]["how"];
}

export interface DateFacts {
  readonly resolution: Resolution;
  /** The period that the way of writing names. */
  readonly stated: Period | undefined;
  readonly hasTimes: boolean;
  /** Dates are the last days of their periods. */
  readonly datesAreEnds: boolean;
  readonly column: string;
}

/**
 * The step of a table: as set, as its way of writing dates states it, or from the usual distance between them. Events
 * that come when they come are counted by day, said so.
 *
 * @param distinct days (or instants, for hours), ascending
 * @throws TableFault when the step cannot be told
 */
export function findCalendar(
  distinct: readonly number[],
  facts: DateFacts,
  settings: TableSettings,
  timeZone: string,
  complain: Complain,
): Calendar {
  const { resolution, stated, column } = facts;
  const hourLength = 3_600_000;
  const phaseFor = (every: Period) =>
    every === "hour" && distinct.length > 0
      ? ((-zoneOffset(distinct[0], timeZone) % hourLength) + hourLength) % hourLength
      : 0;
  const calendar = (every: Period, how: Calendar["how"]): Calendar => ({
    every,
    weekStart: every === "week" ? weekStart(distinct, facts, settings.weekStartsOn) : 0,
    phase: phaseFor(every),
    how,
  });
  if (settings.every) return calendar(settings.every, "set");
  if (stated) return calendar(stated, "format");
  if (resolution === "hour") return calendar("hour", "dates");
  const every = periodOfDays(distinct);
  if (every) return calendar(every, "dates");
  throw new TableFault(
    complain(
      "no-period",
      true,
      distinct.length < 2
        ? `${quoted(column)} holds one date only, so the step from period to period cannot be told`
        : `the dates in ${quoted(column)} are spaced like no period`,
      'say "every" for this table in the settings: hour, day, week, month, quarter or year',
      { column },
    ),
  );
}

function weekStart(days: readonly number[], facts: DateFacts, set: Weekday | undefined): number {
  if (set) return weekdays.indexOf(set);
  // ISO weeks begin on Monday; so do weeks that days are gathered into.
  if (facts.stated === "week" || facts.resolution === "hour" || periodOfDays(days) !== "week") return 0;
  const common = weekStartOfDays(days);
  return facts.datesAreEnds ? (common + 1) % 7 : common;
}
