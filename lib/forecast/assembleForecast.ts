import type { AverageForecast } from "./averageForecast.ts";
import { aroundSum, within } from "./bounds.ts";
import { calibratedReach } from "./calibration.ts";
import { candidateName } from "./candidates.ts";
import type { SeriesDescription } from "./describingModel.ts";
import type {
  BackTest,
  DescribingModel,
  Forecast,
  ForecastInterval,
  ForecastNote,
  ForecastPlan,
} from "./forecast.ts";
import type { ForecastChoice } from "./forecastChoice.ts";
import { limitChances } from "./limitChances.ts";
import { normalQuantile } from "./normal.ts";
import { spreadQuantile } from "./predictiveSpread.ts";
import { spreadMean } from "./spreadMean.ts";
import { totalQuantile } from "./totals.ts";
import { trivialDescription } from "./trivialDescription.ts";

/** A series that often steps or strays is not helped by a list: the newest few are told. */
const NEWEST_TOLD = 5;

/**
 * Makes the forecast that users see from the average: points, ranges, total, chances, notes and record, in bounds and
 * in order. `late` steps are past and unobserved, and dropped; `start` is the index in the user's series of the first
 * value of `known`.
 */
export function assembleForecast(
  average: AverageForecast,
  choice: ForecastChoice,
  description: SeriesDescription | undefined,
  known: Float64Array,
  options: ForecastPlan,
  late: number,
  start: number,
): Forecast {
  const { horizon, levels, bounds, coming } = options;
  const steps = Array.from({ length: horizon }, (_, h) => h);
  const reach = (level: number): number =>
    calibratedReach(average.calibration, normalQuantile(0.5 + level / 200));
  const median = Float64Array.from(steps, (h) =>
    within(average.spread.medians[late + h] + coming[h], bounds),
  );
  const intervals = orderedIntervals(levels, median, (level, h, side) =>
    within(spreadQuantile(average.spread, late + h, side * reach(level)) + coming[h], bounds),
  );
  const point = Float64Array.from(steps, (h) => {
    let mean = within(spreadMean(average.spread, late + h, average.calibration.narrow) + coming[h], bounds);
    // A skewed mean may leave a narrow central range; what is shown must stay inside it.
    for (const { low, high } of intervals) mean = Math.min(high[h], Math.max(low[h], mean));
    return mean;
  });
  const quantile = totalQuantile(average, late);
  const added = coming.reduce((all, one) => all + one, 0);
  const sum = point.reduce((all, one) => all + one, 0);
  const total = {
    point: sum,
    intervals: intervals.map((each) => {
      const { level } = each;
      const ends = { low: added + quantile(-reach(level)), high: added + quantile(reach(level)) };
      return { level, ...aroundSum(sum, ends, each, bounds) };
    }),
  };
  const notes: ForecastNote[] = [];
  if (average.naive) notes.push({ code: "naive-used", relativeError: average.backTest.relativeError });
  for (const step of average.steps.slice(-NEWEST_TOLD))
    notes.push({ code: "level-step", index: start + step });
  if (average.outliers.length > 0) {
    notes.push({
      code: "outliers-damped",
      indexes: average.outliers.slice(-NEWEST_TOLD).map((index) => start + index),
    });
  }
  return {
    point,
    median,
    intervals,
    total,
    model: modelOf(average, description, known),
    candidates: namedShares(average),
    notes,
    chances:
      options.limits === undefined
        ? []
        : limitChances(average, options.limits, coming, options.seed ?? 0, late),
    backTest: shownSteps(average.backTest, late, horizon),
    choice,
  };
}

/**
 * Ranges of all levels around the medians, in the order asked for. Built from the narrowest outward, so that rounding
 * can never put a wider range inside a narrower one or leave the median out.
 */
function orderedIntervals(
  levels: readonly number[],
  median: Float64Array,
  quantile: (level: number, h: number, side: -1 | 1) => number,
): ForecastInterval[] {
  const intervals = new Map<number, ForecastInterval>();
  let inner: Pick<ForecastInterval, "low" | "high"> = { low: median, high: median };
  for (const level of [...levels].sort((a, b) => a - b)) {
    const { low, high } = inner;
    inner = {
      low: low.map((bound, h) => Math.min(bound, quantile(level, h, -1))),
      high: high.map((bound, h) => Math.max(bound, quantile(level, h, 1))),
    };
    intervals.set(level, { level, ...inner });
  }
  return levels.flatMap((level) => intervals.get(level) ?? []);
}

/** The record of the steps that are shown. */
function shownSteps(backTest: BackTest, late: number, horizon: number): BackTest {
  return {
    ...backTest,
    meanAbsoluteError: backTest.meanAbsoluteError.slice(late, late + horizon),
    naiveMeanAbsoluteError: backTest.naiveMeanAbsoluteError.slice(late, late + horizon),
  };
}

function modelOf(
  average: AverageForecast,
  description: SeriesDescription | undefined,
  known: Float64Array,
): DescribingModel {
  if (description === undefined) return trivialDescription(known);
  const { scale, trend, season, fit } = description;
  const place = average.candidates.findIndex((candidate) => candidate.description !== undefined);
  return { scale, trend, season, fit, weight: place < 0 ? 0 : average.shares[place] };
}

function namedShares(average: AverageForecast): { name: string; weight: number }[] {
  return average.candidates
    .map(({ scale, preparation, drift, description }, i) => ({
      name:
        description === undefined
          ? average.naive
            ? "naive forecast"
            : candidateName(average.scales[scale].scale.name, preparation, drift)
          : `${description.scale}, describing model`,
      weight: average.shares[i],
    }))
    .filter(({ weight }) => weight > 0)
    .sort((a, b) => b.weight - a.weight);
}
