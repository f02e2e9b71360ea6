import { isoDay } from "./civil.ts";
import { localDay } from "./currentPeriod.ts";
import { periodStart } from "./periods.ts";
import type { KnownEvent } from "./readEvents.ts";
import type { Series } from "./series.ts";

/** One kind of event as a regression term: one entry a period of the series, then one a future period. */
export interface EventColumn {
  readonly name: string;
  readonly values: Float64Array;
  /** Observed periods that the event touched: what its effect is learnt from. */
  readonly seen: number;
}

export interface EventColumnOptions {
  readonly table: string;
  /** Future periods after the last value. */
  readonly horizon: number;
  readonly timeZone: string;
}

/**
 * Events as regression terms, one a name. An entry is the share of event days in its period, relative to the period
 * that has most of them: 1 in every period of a one-day feast, 0.5 in a week of which a closure took half. So the
 * effect of a term is what the event does to the period it touches most. Names never seen in an observed period are
 * left out: nothing can be learnt of them.
 */
export function eventColumns(
  events: readonly KnownEvent[],
  series: Series,
  { table, horizon, timeZone }: EventColumnOptions,
): EventColumn[] {
  const { period, start, values } = series;
  const length = values.length + horizon;
  const dayAt = (index: number) => {
    const text = periodStart(start, period, index);
    return period === "hour" ? localDay(Date.parse(text), timeZone) : isoDay(text);
  };
  const starts = Int32Array.from({ length: length + 1 }, (_, index) => dayAt(index));
  const columns = new Map<string, Float64Array>();
  for (const event of events) {
    if (event.tables !== null && !event.tables.includes(table)) continue;
    const from = isoDay(event.from);
    const until = isoDay(event.until);
    let column = columns.get(event.name);
    if (!column) {
      column = new Float64Array(length);
      columns.set(event.name, column);
    }
    for (let index = 0; index < length; index++) {
      // An hour belongs to the one day it begins on; longer periods hold the days up to the next one's start.
      const end = period === "hour" ? starts[index] + 1 : starts[index + 1];
      const days = Math.min(until + 1, end) - Math.max(from, starts[index]);
      if (days > 0) column[index] += days;
    }
  }
  const made: EventColumn[] = [];
  for (const [name, days] of columns) {
    const most = days.reduce((a, b) => Math.max(a, b), 0);
    const seen = values.reduce(
      (count, value, index) => count + (days[index] > 0 && !Number.isNaN(value) ? 1 : 0),
      0,
    );
    if (seen > 0) made.push({ name, values: days.map((count) => count / most), seen });
  }
  return made.sort((a, b) => (a.name < b.name ? -1 : 1));
}
