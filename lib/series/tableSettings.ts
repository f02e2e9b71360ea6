import * as z from "zod/mini";
import { periods, weekdays } from "./periods.ts";

const say = (text: string) => z.describe(text);
const text = (meaning: string) => z.string().check(z.minLength(1), say(meaning));
const number = (meaning: string) => z.number().check(say(meaning));

function isTimeZone(name: string): boolean {
  try {
    return new Intl.DateTimeFormat("en", { timeZone: name }) !== undefined;
  } catch {
    return false;
  }
}

/** The name of a time zone, as the IANA database has it. */
export const timeZoneSchema = z
  .string()
  .check(z.refine(isTimeZone, { error: "must be a time zone by its IANA name, such as Europe/Lisbon" }));

/** What a user may say about one table in `settings.json`; what is left out is found in the table itself. */
const tableShape = z.strictObject({
  every: z.optional(
    z.enum(periods).check(say("The step of the series. Found from the dates when left out.")),
  ),
  weekStartsOn: z.optional(
    z.enum(weekdays).check(say("The day a week begins on. Found from the dates, else monday.")),
  ),
  combine: z.optional(
    z
      .enum(["sum", "mean", "last", "count", "max"])
      .check(say("How several rows of one period become one value.")),
  ),
  date: z.optional(text("The name of the column that holds the dates.")),
  dateOrder: z.optional(
    z
      .enum(["day-first", "month-first"])
      .check(say("How 03/04/2026 is meant: day-first is 3 April, month-first is 4 March.")),
  ),
  period: z.optional(
    text("The name of a column that names each row's period in a calendar of your own, such as 2026-P03."),
  ),
  values: z.optional(
    z
      .union([z.string(), z.array(z.string()).check(z.minLength(1))])
      .check(say("The names of the columns to forecast. All columns of numbers when left out.")),
  ),
  seriesName: z.optional(
    z
      .nullable(z.string())
      .check(say("The name of the column that says which series a row belongs to; null when there is none.")),
  ),
  decimal: z.optional(z.enum([".", ","]).check(say("The decimal mark."))),
  delimiter: z.optional(z.enum([",", ";", "\t", "|"]).check(say("What stands between two cells of a row."))),
  encoding: z.optional(
    z
      .enum(["utf-8", "utf-16le", "utf-16be", "windows-1252"])
      .check(say("How the file's letters are written as bytes.")),
  ),
  headerLine: z.optional(
    z.int().check(z.minimum(1), say("The line, counted from 1, that names the columns.")),
  ),
  timeZone: z.optional(
    timeZoneSchema.check(say("The time zone of clock times without an offset, if not that of the store.")),
  ),
  emptyMeans: z.optional(
    z
      .enum(["gap", "zero"])
      .check(say("What a period without any row is: not known (gap, the default) or nothing sold (zero).")),
  ),
  unit: z.optional(text("What the numbers count, as it should stand behind them: loans, €, kWh.")),
  horizon: z.optional(
    z.int().check(z.minimum(1), z.maximum(1000), say("How many periods ahead to forecast.")),
  ),
  atLeast: z.optional(number("No value can lie below this, such as 0 for counts.")),
  atMost: z.optional(number("No value can lie above this, such as the number of seats.")),
  limits: z.optional(
    z
      .strictObject({
        above: z.optional(number("Tell the chance that a value passes above this.")),
        below: z.optional(number("Tell the chance that a value falls below this.")),
      })
      .check(say("Values that matter to you.")),
  ),
  staleAfter: z.optional(
    z
      .int()
      .check(
        z.minimum(1),
        say("After how many missing periods the table is called late, if not the store's."),
      ),
  ),
});

/** `TableSettings` as the settings may hold them. */
export const tableSettingsSchema = tableShape.check(
  z.refine(({ atLeast, atMost }) => atLeast === undefined || atMost === undefined || atLeast < atMost, {
    error: "must have atLeast below atMost",
  }),
);

export type TableSettings = z.infer<typeof tableSettingsSchema>;
