import { readFileSync } from "node:fs";
import { performance } from "node:perf_hooks";
import { selectOrder } from "../../lib/autoregression/selectOrder.ts";
import { movingAverageWeights } from "../../lib/dynamics/movingAverageWeights.ts";
import { accuracy } from "../../lib/forecast/accuracy.ts";
import type { ForecastInterval, ForecastOptions } from "../../lib/forecast/forecast.ts";
import { forecastSeries } from "../../lib/forecast/forecastSeries.ts";
import { naive2 } from "../../lib/forecast/naive2.ts";
import type { BenchRow } from "./benchRow.ts";

type Period = NonNullable<ForecastOptions["period"]>;

interface HeldOut {
  readonly id: string;
  readonly period: Period;
  readonly values: readonly number[];
  readonly holdout: readonly number[];
}

/** Season of the scaled measures and of Naive2, as the M4 competition set it (week and year: none). */
const SEASON: Readonly<Record<Period, number>> = {
  hour: 24,
  day: 1,
  week: 1,
  month: 12,
  quarter: 4,
  year: 1,
};
const NAMES: Readonly<Record<string, Period>> = {
  hourly: "hour",
  daily: "day",
  weekly: "week",
  monthly: "month",
  quarterly: "quarter",
  yearly: "year",
};

/** Sums over the series of one period. */
interface Tally {
  series: number;
  errors: { percentage: number; scaled: number };
  ofMean: { percentage: number; scaled: number };
  naive: { percentage: number; scaled: number };
  plain: { percentage: number; scaled: number; interval: number };
  interval: number;
  /** Share of each series' values inside. */
  inside80: number[];
  inside95: number[];
  /** The same over its last ends, up to four, each a horizon earlier: the series of a set share their times. */
  fourEnds80: number[];
  fourEnds95: number[];
  milliseconds: number[];
}

/**
 * Accuracy of `forecastSeries` on held-out ends of series: JSON lines `{id, period, values, holdout}` at `path`. By
 * period: sMAPE, MASE and OWA (mean of both over Naive2's) of the median, which is what these measures reward, and
 * of the mean; mean scaled interval score and coverage at 80 and 95 (standard error by series), at this end and
 * over four, each a horizon earlier; median time a series. The plain rival is one
 * Burg autoregression of raw first differences by AICc with its Gaussian interval.
 */
export async function accuracyBench(path: string | undefined): Promise<BenchRow[]> {
  if (path === undefined) {
    console.log("  left out: give the series with --data FILE");
    return [];
  }
  const tallies = new Map<Period, Tally>();
  for (const line of readFileSync(path, "utf8").split("\n")) {
    if (line.trim() === "") continue;
    const one = JSON.parse(line) as HeldOut;
    const period = NAMES[one.period] ?? one.period;
    const tally = tallies.get(period) ?? emptyTally();
    tallies.set(period, tally);
    score(tally, one, period);
  }
  return [...tallies].flatMap(([period, tally]) => rowsOf(period, tally));
}

function emptyTally(): Tally {
  const none = { percentage: 0, scaled: 0 };
  return {
    series: 0,
    errors: { ...none },
    ofMean: { ...none },
    naive: { ...none },
    plain: { ...none, interval: 0 },
    interval: 0,
    inside80: [],
    inside95: [],
    fourEnds80: [],
    fourEnds95: [],
    milliseconds: [],
  };
}

function score(tally: Tally, { values, holdout }: HeldOut, period: Period): void {
  const season = SEASON[period];
  const horizon = holdout.length;
  const scaling = { training: values, season };
  const started = performance.now();
  const forecast = forecastSeries(values, { horizon, levels: [80, 95], period });
  tally.milliseconds.push(performance.now() - started);
  const plain = plainForecast(values, horizon);
  tally.series++;
  add(tally.errors, holdout, forecast.median, scaling);
  add(tally.ofMean, holdout, forecast.point, scaling);
  add(tally.naive, holdout, naive2(values, season, horizon), scaling);
  add(tally.plain, holdout, plain.point, scaling);
  const [narrow, wide] = forecast.intervals;
  tally.interval += accuracy.meanScaledIntervalScore(holdout, wide, scaling);
  tally.plain.interval += accuracy.meanScaledIntervalScore(holdout, plain.interval, scaling);
  tally.inside80.push(shareInside(narrow, holdout));
  tally.inside95.push(shareInside(wide, holdout));
  const ends = [[narrow, wide].map((interval) => shareInside(interval, holdout))];
  for (let back = 1; back <= EARLIER_ENDS; back++) {
    const end = values.length - back * horizon;
    if (end < LEAST_VALUES) break;
    const then = values.slice(end, end + horizon);
    const { intervals } = forecastSeries(values.slice(0, end), { horizon, levels: [80, 95], period });
    ends.push(intervals.map((interval) => shareInside(interval, then)));
  }
  tally.fourEnds80.push(mean(ends.map(([share]) => share)));
  tally.fourEnds95.push(mean(ends.map(([, share]) => share)));
}

/** Ends of a series that are scored for coverage besides its own, and the fewest values left before one. */
const EARLIER_ENDS = 3;
const LEAST_VALUES = 9;

function shareInside({ low, high }: ForecastInterval, values: readonly number[]): number {
  return values.filter((value, h) => value >= low[h] && value <= high[h]).length / values.length;
}

const mean = (all: readonly number[]): number => all.reduce((sum, one) => sum + one, 0) / all.length;

function add(
  sum: { percentage: number; scaled: number },
  actual: readonly number[],
  forecast: Float64Array,
  scaling: { training: readonly number[]; season: number },
): void {
  sum.percentage += accuracy.symmetricMeanAbsolutePercentageError(actual, forecast);
  sum.scaled += accuracy.meanAbsoluteScaledError(actual, forecast, scaling);
}

/** One Burg autoregression of first differences, summed up, with the Gaussian 95 % interval of its shocks alone. */
function plainForecast(
  values: readonly number[],
  horizon: number,
): { point: Float64Array; interval: ForecastInterval } {
  const steps = values.slice(1).map((value, t) => value - values[t]);
  const last = values[values.length - 1];
  const level = new Float64Array(horizon).fill(last);
  const flat = steps.every((step) => step === steps[0]);
  if (flat) return { point: level, interval: { level: 95, low: level, high: level } };
  const maxOrder = Math.min(60, Math.floor(steps.length / 3));
  const { fit } = selectOrder(steps, { maxOrder, criterion: "aicc", method: "burg" });
  const past = steps.map((step) => step - fit.mean);
  const weights = movingAverageWeights(fit.coefficients, horizon);
  const point = new Float64Array(horizon);
  const low = new Float64Array(horizon);
  const high = new Float64Array(horizon);
  let level95 = last;
  let response = 0;
  let power = 0;
  for (let h = 0; h < horizon; h++) {
    let step = 0;
    for (let j = 0; j < fit.order; j++) step += fit.coefficients[j] * (past[past.length - 1 - j] ?? 0);
    past.push(step);
    level95 += step + fit.mean;
    response += weights[h];
    power += response * response;
    const reach = 1.959963984540054 * Math.sqrt(fit.innovationVariance * power);
    point[h] = level95;
    low[h] = level95 - reach;
    high[h] = level95 + reach;
  }
  return { point, interval: { level: 95, low, high } };
}

function rowsOf(period: Period, tally: Tally): BenchRow[] {
  const { series, errors, ofMean, naive, plain } = tally;
  const overall = (sum: { percentage: number; scaled: number }): number =>
    (sum.percentage / naive.percentage + sum.scaled / naive.scaled) / 2;
  const times = tally.milliseconds.sort((a, b) => a - b);
  const row = (
    name: string,
    value: number,
    unit = "",
    against = "",
    ratio = Number.NaN,
    goal = "",
  ): BenchRow => ({
    name: `${period}, ${series} series: ${name}`,
    value,
    unit,
    against,
    ratio,
    goal,
  });
  const plainScore = tally.plain.interval / series;
  const intervalScore = tally.interval / series;
  return [
    row("OWA", overall(errors), "", "plain Burg on differences", overall(errors) / overall(plain)),
    row("OWA of the mean", overall(ofMean)),
    row("sMAPE", errors.percentage / series, "%"),
    row("MASE", errors.scaled / series),
    row("MSIS at 95", intervalScore, "", "plain Gaussian interval", intervalScore / plainScore, "below 1"),
    row("coverage of 80", ...coverage(tally.inside80), "", Number.NaN, "78.5 to 81.5"),
    row("coverage of 95", ...coverage(tally.inside95), "", Number.NaN, "93.5 to 96.5"),
    row("coverage of 80, four ends", ...coverage(tally.fourEnds80), "", Number.NaN, "78.5 to 81.5"),
    row("coverage of 95, four ends", ...coverage(tally.fourEnds95), "", Number.NaN, "93.5 to 96.5"),
    row("median time a series", times[times.length >> 1], "ms"),
    row("longest time a series", times[times.length - 1], "ms"),
  ];
}

/** Mean share in percent, with its standard error: values of one series hit and miss together, series apart. */
function coverage(shares: readonly number[]): [number, string] {
  const middle = mean(shares);
  const power = shares.reduce((sum, share) => sum + (share - middle) ** 2, 0);
  return [100 * middle, `% ± ${((100 * Math.sqrt(power)) / shares.length).toFixed(1)}`];
}
