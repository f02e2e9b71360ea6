import { isoDay, weekday } from "../series/civil.ts";
import { currentPeriod } from "../series/currentPeriod.ts";
import { periodIndex, periodStart, weekdays } from "../series/periods.ts";
import type { Reading } from "../series/reading.ts";
import type { Series } from "../series/series.ts";
import type { TableSettings } from "../series/tableSettings.ts";
import type { Finding } from "../words/facts.ts";
import type { StoredSeries } from "./modelDocument.ts";
import type { Settings } from "./settings.ts";

interface DataContext {
  readonly asOf: string;
  readonly settings: Settings;
  readonly tableSettings: TableSettings;
  readonly reading: Reading | null;
}

/** Complete periods that should have a value by now and are not in the series; 0 when it is up to date. */
function periodsLate(series: Series, context: DataContext): number {
  const weekStartsOn = series.period === "week" ? weekdays[weekday(isoDay(series.start))] : undefined;
  const running = currentPeriod(context.asOf, series.period, context.settings.timeZone, weekStartsOn);
  return Math.max(0, periodIndex(series.start, series.period, running) - series.values.length);
}

function lateness(series: Series, previous: StoredSeries | undefined, context: DataContext): Finding[] {
  const late = periodsLate(series, context);
  if (late === 0) return [];
  const lastPeriod = periodStart(series.start, series.period, series.values.length - 1);
  if (late >= (context.tableSettings.staleAfter ?? context.settings.staleAfter))
    return [{ code: "stale", lastPeriod, periodsLate: late }];
  const told = previous?.facts.findings.some((finding) => finding.code === "no-new-values");
  return previous && !told && previous.facts.lastPeriod === lastPeriod
    ? [{ code: "no-new-values", since: lastPeriod }]
    : [];
}

/** Values of the stored past that read differently now. */
function revisions(series: Series, previous: StoredSeries | undefined): Finding[] {
  if (!previous || previous.facts.period !== series.period) return [];
  const { start, values } = previous.facts.history;
  const offset = periodIndex(series.start, series.period, start);
  let count = 0;
  let first = -1;
  let largest = { index: -1, size: -1 };
  for (const [index, before] of values.entries()) {
    const now = series.values[offset + index];
    const after = now === undefined || Number.isNaN(now) ? null : now;
    if (before === after) continue;
    count++;
    if (first < 0) first = index;
    const size = before === null || after === null ? Number.POSITIVE_INFINITY : Math.abs(after - before);
    if (size > largest.size) largest = { index, size };
  }
  if (count === 0) return [];
  const periodOf = (index: number) => periodStart(start, series.period, index);
  const after = series.values[offset + largest.index];
  return [
    {
      code: "revised",
      count,
      firstPeriod: periodOf(first),
      largest: {
        period: periodOf(largest.index),
        before: values[largest.index],
        after: after === undefined || Number.isNaN(after) ? null : after,
      },
    },
  ];
}

/** What is to be said of the data themselves: lateness, revisions, a period left out because it is not over. */
export function dataFindings(
  series: Series,
  previous: StoredSeries | undefined,
  context: DataContext,
): Finding[] {
  const unfinished = context.reading?.incompletePeriod ?? null;
  return [
    ...lateness(series, previous, context),
    ...revisions(series, previous),
    ...(unfinished === null ? [] : [{ code: "incomplete-period", period: unfinished } as const]),
  ];
}
