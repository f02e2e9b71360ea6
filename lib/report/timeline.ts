import type { SeriesFacts } from "../words/facts.ts";
import { addPeriods } from "../words/periods.ts";
import type { AxisLabel } from "./plot.ts";

/** The periods a picture of past and future shows, oldest first. */
export interface Timeline {
  readonly starts: readonly string[];
  readonly past: readonly (number | null)[];
  /** Index of the first coming period. */
  readonly now: number;
}

/** The last `longest` periods of the history, and the forecast's periods after them. */
export function timelineOf(facts: SeriesFacts, longest = 156): Timeline {
  const { history, forecast, period } = facts;
  const past = history.values.slice(-longest);
  const first = history.values.length - past.length;
  const starts = past.map((_, index) => addPeriods(history.start, period, first + index));
  return { starts: [...starts, ...forecast.periods], past, now: past.length };
}

/** Up to four labels, evenly spread, so that they stay apart on a phone. */
export function spreadLabels(count: number, text: (index: number) => string, most = 4): AxisLabel[] {
  if (count === 1) return [{ at: 0.5, text: text(0) }];
  const labels = Math.min(most, count);
  return Array.from({ length: labels }, (_, label) => {
    const index = Math.round((label * (count - 1)) / (labels - 1));
    return { at: index / (count - 1), text: text(index) };
  });
}
