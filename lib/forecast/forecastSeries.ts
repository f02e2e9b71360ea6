import { requireValues, requireWhole } from "../autoregression/checks.ts";
import { type AverageForecast, averageForecast } from "./averageForecast.ts";
import { calibratedReach } from "./calibration.ts";
import { candidateName } from "./candidates.ts";
import { describeSeries, type SeriesDescription } from "./describingModel.ts";
import type {
  DescribingModel,
  Forecast,
  ForecastInterval,
  ForecastNote,
  ForecastOptions,
} from "./forecast.ts";
import { limitChances } from "./limitChances.ts";
import { normalQuantile } from "./normal.ts";
import { spreadQuantile } from "./predictiveSpread.ts";
import { seasonLengths } from "./seasonLengths.ts";
import { intermittentLevel, lastLevel, simpleForecast, steadyLevel, within } from "./simpleForecast.ts";
import { spreadMean } from "./spreadMean.ts";
import { totalQuantile } from "./totals.ts";
import { trivialDescription } from "./trivialDescription.ts";

/** Fewest observed values that a model is fitted to. */
const LEAST_OBSERVED = 8;
/** Share of zeros from which a series that is never negative counts as intermittent. */
const INTERMITTENT = 0.4;

/**
 * Forecasts a series by an average of autoregressions, with its distribution, its record and what was decided.
 *
 * Candidates: levels about a mean or line, first, second and seasonal differences, with seasonal profiles shrunk by
 * evidence and three kinds of drift, on the raw and a variance-stabilising scale, each an average over orders; and
 * the describing model. Weights are inverse to the squared rolling-origin error on this very series; the average is
 * the weighted middle half at each step. Ranges come from the shock responses, widened by how the average did in the
 * past. A series too short, constant, mostly gaps or mostly zeros is forecast by the simplest honest rule and says so.
 *
 * `values`: one a period, `NaN` for a gap; a trailing gap is a period that is past but was not observed, so the
 * first forecast is still for the period after the last entry. All outputs are finite and ordered: low ≤ median ≤
 * high, point within the widest range, wider levels outside narrower ones. Deterministic; `seed` only steers the
 * simulated chance of passing a limit in any period.
 *
 * Throws `TypeError`/`RangeError` naming the argument, and `RangeError` when nothing was observed.
 *
 * @example forecastSeries(values, { horizon: 8, levels: [80, 95], period: "week" }).point
 */
export function forecastSeries(values: ArrayLike<number>, options: ForecastOptions): Forecast {
  checkOptions(values, options);
  let first = 0;
  while (Number.isNaN(values[first])) first++;
  const series = Float64Array.from({ length: values.length - first }, (_, t) => values[first + t]);
  let end = series.length;
  while (Number.isNaN(series[end - 1])) end--;
  const known = series.subarray(0, end);
  const observed = known.filter((value) => !Number.isNaN(value));
  const simple = simpleTreatment(series, observed, options);
  if (simple !== undefined) return simple;
  // Periods that are past but unobserved are forecast over and dropped.
  const late = series.length - end;
  const seasons = seasonLengths(known.length, options);
  const description = tryDescribe(known, options);
  const average = averageForecast(known, seasons, options.horizon + late, description);
  return assemble(average, description, known, options, late, first);
}

function checkOptions(values: ArrayLike<number>, { horizon, levels }: ForecastOptions): void {
  requireValues("forecastSeries", "values", values, "gaps-allowed");
  requireWhole("forecastSeries", "horizon", horizon, 1);
  for (const level of levels) {
    if (!(level > 0 && level < 100)) {
      throw new RangeError(`forecastSeries needs levels between 0 and 100 percent, got ${level}`);
    }
  }
  for (let t = 0; t < values.length; t++) if (!Number.isNaN(values[t])) return;
  throw new RangeError(`forecastSeries needs at least one observed value, got ${values.length} gaps`);
}

/** The forecast of a series that no model should be fitted to, `undefined` for any other. */
function simpleTreatment(
  series: Float64Array,
  observed: Float64Array,
  options: ForecastOptions,
): Forecast | undefined {
  const count = observed.length;
  if (count > 1 && observed.every((value) => value === observed[0])) {
    return simpleForecast(series, options, steadyLevel(observed), [{ code: "constant", value: observed[0] }]);
  }
  if (count < LEAST_OBSERVED) {
    return simpleForecast(series, options, lastLevel(observed), [{ code: "too-short", observed: count }]);
  }
  if (count < 0.4 * series.length) {
    const note = { code: "mostly-gaps", observed: count, periods: series.length } as const;
    return simpleForecast(series, options, steadyLevel(observed), [note]);
  }
  const zeros = observed.filter((value) => value === 0).length / count;
  if (zeros >= INTERMITTENT && observed.every((value) => value >= 0)) {
    const note = { code: "intermittent", shareOfZeros: zeros } as const;
    return simpleForecast(series, options, intermittentLevel(observed), [note]);
  }
  return undefined;
}

/** A series may be forecast that no likelihood describes (a perfect line): then it has no describing model. */
function tryDescribe(known: Float64Array, options: ForecastOptions): SeriesDescription | undefined {
  try {
    return describeSeries(known, options);
  } catch (error) {
    if (error instanceof RangeError) return undefined;
    throw error;
  }
}

function assemble(
  average: AverageForecast,
  description: SeriesDescription | undefined,
  known: Float64Array,
  options: ForecastOptions,
  late: number,
  first: number,
): Forecast {
  const { horizon, levels, bounds } = options;
  const steps = Array.from({ length: horizon }, (_, h) => h);
  const reach = (level: number): number =>
    calibratedReach(average.calibration, normalQuantile(0.5 + level / 200));
  const median = Float64Array.from(steps, (h) => within(average.spread.medians[late + h], bounds));
  const intervals = orderedIntervals(levels, median, (level, h, side) =>
    within(spreadQuantile(average.spread, late + h, side * reach(level)), bounds),
  );
  const point = Float64Array.from(steps, (h) => {
    let mean = within(spreadMean(average.spread, late + h, average.calibration.narrow), bounds);
    // A skewed mean may leave a narrow central range; what is shown must stay inside it.
    for (const { low, high } of intervals) mean = Math.min(high[h], Math.max(low[h], mean));
    return mean;
  });
  const quantile = totalQuantile(average, late);
  const sumBounds = {
    low: bounds?.low === undefined ? undefined : bounds.low * horizon,
    high: bounds?.high === undefined ? undefined : bounds.high * horizon,
  };
  const sum = point.reduce((all, one) => all + one, 0);
  const total = {
    point: sum,
    intervals: levels.map((level) => ({
      level,
      low: Math.min(sum, within(quantile(-reach(level)), sumBounds)),
      high: Math.max(sum, within(quantile(reach(level)), sumBounds)),
    })),
  };
  const notes: ForecastNote[] = [];
  for (const step of average.steps) notes.push({ code: "level-step", index: first + step });
  if (average.outliers.length > 0) {
    notes.push({ code: "outliers-damped", indexes: average.outliers.map((index) => first + index) });
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
      options.limits === undefined ? [] : limitChances(average, options.limits, options.seed ?? 0, late),
    backTest: average.backTest,
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

function modelOf(
  average: AverageForecast,
  description: SeriesDescription | undefined,
  known: Float64Array,
): DescribingModel {
  if (description === undefined) return trivialDescription(known);
  const { scale, trend, season, fit } = description;
  const place = average.candidates.findIndex((candidate) => candidate.description !== undefined);
  return { scale, trend, season, fit, relation: "member", weight: place < 0 ? 0 : average.shares[place] };
}

function namedShares(average: AverageForecast): { name: string; weight: number }[] {
  return average.candidates
    .map(({ scale, preparation, drift, description }, i) => ({
      name:
        description === undefined
          ? candidateName(average.scales[scale].scale.name, preparation, drift)
          : `${description.scale}, describing model`,
      weight: average.shares[i],
    }))
    .filter(({ weight }) => weight > 0)
    .sort((a, b) => b.weight - a.weight);
}
