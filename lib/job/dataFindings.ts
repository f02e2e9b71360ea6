import { compareReadings, type EarlierReading } from "../series/compareReadings.ts";
import { periodStart } from "../series/periods.ts";
import { periodsLate } from "../series/periodsLate.ts";
import type { Reading } from "../series/reading.ts";
import type { Series } from "../series/series.ts";
import type { TableSettings } from "../series/tableSettings.ts";
import type { Finding } from "../words/facts.ts";
import type { StoredSeries } from "./modelDocument.ts";
import type { Settings } from "./settings.ts";

interface DataContext {
  readonly asOf: string;
  /** The table's own zone, or the store's. */
  readonly timeZone: string;
  readonly settings: Settings;
  readonly tableSettings: TableSettings;
  readonly reading: Reading | null;
}

function lateness(series: Series, previous: StoredSeries | undefined, context: DataContext): Finding[] {
  const { asOf, timeZone, settings, tableSettings } = context;
  const lastPeriod = periodStart(series.start, series.period, series.values.length - 1);
  const late = periodsLate(lastPeriod, series.period, asOf, timeZone);
  if (late === 0) return [];
  if (late >= (tableSettings.staleAfter ?? settings.staleAfter))
    return [{ code: "stale", lastPeriod, periodsLate: late }];
  const waited = previous !== undefined && previous.facts.lastPeriod === lastPeriod;
  return waited ? [{ code: "no-new-values", since: lastPeriod }] : [];
}

/** The past as it was read, under the present meaning of an empty period: a change of settings is no revision. */
function earlierReading({ facts }: StoredSeries, { emptyMeans }: TableSettings): EarlierReading {
  const { start, values } = facts.history;
  return {
    period: facts.period,
    start,
    values: emptyMeans === "zero" ? values.map((value) => value ?? 0) : values,
  };
}

/** What is to be said of the data themselves: lateness, revisions, a period left out because it is not over. */
export function dataFindings(
  series: Series,
  previous: StoredSeries | undefined,
  context: DataContext,
): Finding[] {
  const revisions = previous && compareReadings(earlierReading(previous, context.tableSettings), series);
  const unfinished = context.reading?.incompletePeriod ?? null;
  return [
    ...lateness(series, previous, context),
    ...(revisions ? [{ code: "revised", ...revisions } as const] : []),
    ...(unfinished === null ? [] : [{ code: "incomplete-period", period: unfinished } as const]),
  ];
}
