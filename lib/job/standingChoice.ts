import type { Forecast } from "../forecast/forecast.ts";
import type { ForecastChoice } from "../forecast/forecastChoice.ts";
import type { Finding } from "../words/facts.ts";

/** What a forecast decided about a series, and on which past: the next runs go by it until a new horizon has passed. */
export interface StandingChoice {
  /** The newest period it was made on. */
  readonly lastPeriod: string;
  /** The first period after the last lasting change then known. */
  readonly changedAt: string | null;
  readonly choice: ForecastChoice;
}

/** What decides whether an earlier choice still stands. */
export interface ChoiceQuestion {
  readonly horizon: number;
  /** Place of the newest value, and of a period by its name. */
  readonly newest: number;
  readonly indexOf: (period: string) => number;
  readonly changedAt: string | null;
  readonly dataFindings: readonly Finding[];
}

/**
 * The earlier choice, while it stands: fewer values came since than the horizon is long, none of the past was revised,
 * and no change was noticed since.
 */
export function choiceThatStands(
  before: StandingChoice | null | undefined,
  { horizon, newest, indexOf, changedAt, dataFindings }: ChoiceQuestion,
): StandingChoice | undefined {
  if (!before || before.changedAt !== changedAt) return undefined;
  if (dataFindings.some(({ code }) => code === "revised")) return undefined;
  const came = newest - indexOf(before.lastPeriod);
  return came >= 0 && came < horizon ? before : undefined;
}

/** What the next run is to go by: the choice that stood, or the one just made. */
export function choiceToKeep(
  stood: StandingChoice | undefined,
  forecast: Forecast,
  lastPeriod: string,
  changedAt: string | null,
): StandingChoice | null {
  if (forecast.choice === null) return null;
  // A forecast that could not go by what stood has decided anew.
  if (stood !== undefined && forecast.choice === stood.choice) return stood;
  return { lastPeriod, changedAt, choice: forecast.choice };
}
