import { periodStart } from "../series/periods.ts";
import { chanceWriter, percentWriter } from "./chances.ts";
import type { SeriesFacts, Voice } from "./facts.ts";
import {
  allWhole,
  numberWriter,
  roundingStep,
  roundTo,
  significantStep,
  type WriteNumber,
} from "./numbers.ts";
import { type PeriodNames, periodNames } from "./periods.ts";
import { plainName } from "./plainText.ts";
import { span } from "./spans.ts";
import { unitAfter } from "./units.ts";

/** How to speak of one series: its names, its numbers and its dates, settled once. */
export interface Speech {
  readonly facts: SeriesFacts;
  readonly series: string;
  readonly unit: string | null;
  readonly now: string;
  readonly periods: PeriodNames;
  readonly write: WriteNumber;
  readonly chance: (chance: number) => string;
  readonly percent: (percent: number) => string;
  /** Step that the width of the forecast's range supports. */
  readonly forecastStep: number;
  /** A number rounded to `step` with the unit: "157 loans". */
  readonly amount: (value: number, step: number) => string;
  /** An estimated amount to two significant digits, with the unit. */
  readonly roughly: (value: number) => string;
  /** The same without the unit. */
  readonly roughNumber: (value: number) => string;
  /** "about 6 weeks". */
  readonly span: (periods: number) => string;
}

/** The range that words and front page speak of: the one nearest to 80 %. */
export function spokenInterval<T extends { readonly level: number }>(intervals: readonly T[]): T {
  return intervals.reduce((best, one) => (Math.abs(one.level - 80) < Math.abs(best.level - 80) ? one : best));
}

/** Settles how to speak of a series; `now` is the run's instant, by default the period after the last value. */
export function speechFor(facts: SeriesFacts, voice: Voice, asOf?: string): Speech {
  const now = asOf ?? periodStart(facts.lastPeriod, facts.period, 1);
  const write = numberWriter(voice.locale);
  const whole = allWhole(facts.history.values);
  const unit = facts.unit === null ? null : plainName(facts.unit, 24);
  const interval = spokenInterval(facts.forecast.intervals);
  const amount = (value: number, step: number) =>
    `${write(value, step)} ${unitAfter(unit, roundTo(value, step))}`.trimEnd();
  const roughStep = (value: number) => significantStep(value, 2, whole);
  return {
    facts,
    series: plainName(facts.series, 40),
    unit,
    now,
    periods: periodNames(facts.period, voice.locale, voice.timeZone, now),
    write,
    chance: chanceWriter(voice.locale),
    percent: percentWriter(voice.locale),
    forecastStep: roundingStep(interval.high[0] - interval.low[0], whole),
    amount,
    roughly: (value) => amount(value, roughStep(value)),
    roughNumber: (value) => write(value, roughStep(value)),
    span: (periods) => span(periods, facts.period, write),
  };
}
