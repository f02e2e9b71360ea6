import { periodStart } from "../series/periods.ts";
import type { SeriesFacts } from "../words/facts.ts";
import { instantOf, type PeriodNames } from "../words/periods.ts";
import type { AxisLabel } from "./plot.ts";

/** The periods a picture of past and future shows, oldest first. */
export interface Timeline {
  readonly starts: readonly string[];
  readonly past: readonly (number | null)[];
  /** Index of the first coming period. */
  readonly now: number;
}

/**
 * The recent past, about six times as long as the forecast so that the forecast stays large enough to read, but
 * reaching back before every change that is spoken of where the history allows it; then the forecast's periods.
 */
export function timelineOf(facts: SeriesFacts): Timeline {
  const { history, forecast, period } = facts;
  const all = history.values.map((_, index) => periodStart(history.start, period, index));
  const [firstChange] = facts.findings
    .flatMap((one) => (one.code === "change" ? [one.change.low] : []))
    .sort();
  const changeAt = firstChange === undefined ? -1 : all.findIndex((start) => start >= firstChange);
  const sinceChange = changeAt === -1 ? 0 : all.length - changeAt + 8;
  const shown = Math.min(all.length, 156, Math.max(40, 6 * forecast.periods.length, sinceChange));
  const first = all.length - shown;
  return {
    starts: [...all.slice(first), ...forecast.periods],
    past: history.values.slice(first),
    now: shown,
  };
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

/**
 * Labels under a timeline: days while it spans less than most of a year, else months with their year. Every other
 * one is spared on a narrow screen.
 */
export function timelineLabels(starts: readonly string[], names: PeriodNames): AxisLabel[] {
  const days = (instantOf(starts[starts.length - 1]) - instantOf(starts[0])) / 86_400_000;
  const name = days > 300 ? names.coarse : names.short;
  const labels = spreadLabels(starts.length, (index) => name(starts[index]), 5);
  return labels.map((label, index) => ({ ...label, spare: index % 2 === 1 }));
}
