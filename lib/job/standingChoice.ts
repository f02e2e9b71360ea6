import { createHash } from "node:crypto";
import type { Forecast } from "../forecast/forecast.ts";
import type { ForecastChoice } from "../forecast/forecastChoice.ts";
import { isoInstant } from "../series/periods.ts";
import type { KnownEvent } from "../series/readEvents.ts";
import type { TableSettings } from "../series/tableSettings.ts";
import { zoneOffset } from "../series/zone.ts";
import type { Finding } from "../words/facts.ts";
import type { SimulatedFading } from "./simulateFading.ts";

/** What a forecast decided about a series, and on which past: the next runs go by it until a new horizon has passed. */
export interface StandingChoice {
  /** The newest period it was made on. */
  readonly lastPeriod: string;
  /** The first period after the last lasting change then known. */
  readonly changedAt: string | null;
  /** Names the settings and past events by which values were read and adjusted. */
  readonly basis: string;
  readonly choice: ForecastChoice;
  /** What was simulated for the account of the describing model. */
  readonly simulated: SimulatedFading;
}

/** What decides whether an earlier choice still stands. */
export interface ChoiceQuestion {
  readonly horizon: number;
  /** Place of the newest value, and of a period by its name. */
  readonly newest: number;
  readonly indexOf: (period: string) => number;
  readonly changedAt: string | null;
  /** The basis as it is now, of what was known of periods up to the one named. */
  readonly basisUntil: (lastPeriod: string) => string;
  readonly dataFindings: readonly Finding[];
}

/**
 * The earlier choice, while it stands: fewer values came since than the horizon is long, none of the recent past was
 * revised, no change was noticed since, and what shapes the past (events, how values are read) is the same.
 */
export function choiceThatStands(
  before: StandingChoice | null | undefined,
  { horizon, newest, indexOf, changedAt, basisUntil, dataFindings }: ChoiceQuestion,
): StandingChoice | undefined {
  if (!before || before.changedAt !== changedAt) return undefined;
  if (dataFindings.some(({ code }) => code === "revised")) return undefined;
  const came = newest - indexOf(before.lastPeriod);
  if (came < 0 || came >= horizon) return undefined;
  return before.basis === basisUntil(before.lastPeriod) ? before : undefined;
}

/** Whether a forecast went by what stood; one that could not has decided anew. */
export const wentBy = (stood: StandingChoice, forecast: Forecast): boolean =>
  forecast.choice === stood.choice;

/** What the next run is to go by: the choice that was kept, or the one just made; `null` after a simple rule. */
export function keepChoice(
  kept: StandingChoice | undefined,
  { choice }: Forecast,
  simulated: SimulatedFading,
  made: () => Pick<StandingChoice, "lastPeriod" | "changedAt" | "basis">,
): StandingChoice | null {
  if (kept) return { ...kept, simulated };
  return choice && { ...made(), choice, simulated };
}

/**
 * Names what shapes the values of the periods from `start` up to the one that `next` begins: the events that touch any
 * of them, and how cells become values.
 */
export function basisOf(
  { every, combine, emptyMeans, timeZone }: TableSettings,
  events: readonly KnownEvent[],
  start: string,
  next: string,
): string {
  // Events are days of the table's own calendar; hours are instants.
  const local = (text: string): string => {
    if (!text.includes("T")) return text;
    const instant = Date.parse(text);
    return isoInstant(instant + zoneOffset(instant, timeZone ?? "UTC"));
  };
  const [first, end] = [local(start).slice(0, 10), local(next)];
  const past = events.filter(({ from, until }) => from < end && until >= first);
  const named = JSON.stringify({ every, combine, emptyMeans, timeZone, past });
  return createHash("sha256").update(named).digest("hex").slice(0, 16);
}
