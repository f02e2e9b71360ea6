import { requireValues, requireWhole } from "../autoregression/checks.ts";
import { normalProbability } from "./normal.ts";

/** A predictive distribution: normal, or a sample of equally likely outcomes. */
export type PredictiveDistribution =
  | { readonly mean: number; readonly standardDeviation: number }
  | { readonly sample: ArrayLike<number> };

/** What scaled measures are scaled by: the mean absolute (seasonal) difference of the fitted values. */
export interface Scaling {
  /** The values the forecast was made from; pairs with a gap are left out. */
  readonly training: ArrayLike<number>;
  /** Lag of the difference, 1 by default. */
  readonly season?: number;
}

/**
 * Mean absolute error over the mean absolute in-sample difference at lag `season` (Hyndman and Koehler 2006); below
 * one is better than the in-sample naive forecast. Periods with a gap in `actual` are left out. `NaN` when the
 * training values do not vary.
 *
 * @example meanAbsoluteScaledError([4, 6], [5, 5], { training: [1, 2, 3] }) // 1
 */
function meanAbsoluteScaledError(
  actual: ArrayLike<number>,
  forecast: ArrayLike<number>,
  scaling: Scaling,
): number {
  checkPair("meanAbsoluteScaledError", actual, forecast);
  const error = averageOver(actual, (value, h) => Math.abs(value - forecast[h]));
  return error / trainingScale("meanAbsoluteScaledError", scaling);
}

/**
 * Mean of 200·|actual − forecast| / (|actual| + |forecast|), from 0 to 200 (Makridakis, Spiliotis and Assimakopoulos
 * 2020); a period where both are zero counts as 0. Gaps in `actual` are left out.
 *
 * @example symmetricMeanAbsolutePercentageError([100], [50]) // 66.67
 */
function symmetricMeanAbsolutePercentageError(
  actual: ArrayLike<number>,
  forecast: ArrayLike<number>,
): number {
  checkPair("symmetricMeanAbsolutePercentageError", actual, forecast);
  return averageOver(actual, (value, h) => {
    const size = Math.abs(value) + Math.abs(forecast[h]);
    return size > 0 ? (200 * Math.abs(value - forecast[h])) / size : 0;
  });
}

/**
 * Mean interval score of a central range that should hold `level` percent, (high − low) + 2/α·(how far outside) with
 * α = 1 − level/100 (Gneiting and Raftery 2007), over the mean absolute in-sample difference; smaller is better.
 * Gaps in `actual` are left out.
 */
function meanScaledIntervalScore(
  actual: ArrayLike<number>,
  interval: { readonly level: number; readonly low: ArrayLike<number>; readonly high: ArrayLike<number> },
  scaling: Scaling,
): number {
  const { level, low, high } = interval;
  checkPair("meanScaledIntervalScore", actual, low);
  checkPair("meanScaledIntervalScore", actual, high);
  if (!(level > 0 && level < 100)) {
    throw new RangeError(`meanScaledIntervalScore needs a level between 0 and 100 percent, got ${level}`);
  }
  const penalty = 2 / (1 - level / 100);
  const score = averageOver(
    actual,
    (value, h) => high[h] - low[h] + penalty * (Math.max(0, low[h] - value) + Math.max(0, value - high[h])),
  );
  return score / trainingScale("meanScaledIntervalScore", scaling);
}

/**
 * Continuous ranked probability score of one outcome, in its units; smaller is better, and for a point it is the
 * absolute error. Normal: σ (z (2Φ(z) − 1) + 2φ(z) − 1/√π), z = (y − μ)/σ (Gneiting and Raftery 2007). Sample: mean
 * |x − y| − ½ mean |x − x′| over its empirical distribution.
 *
 * @example continuousRankedProbabilityScore(0, { mean: 0, standardDeviation: 1 }) // 0.2337
 */
function continuousRankedProbabilityScore(actual: number, distribution: PredictiveDistribution): number {
  if (!Number.isFinite(actual)) {
    throw new RangeError(`continuousRankedProbabilityScore needs a finite actual, got ${actual}`);
  }
  if ("sample" in distribution) return sampleScore(actual, distribution.sample);
  const { mean, standardDeviation } = distribution;
  if (!(standardDeviation >= 0) || !Number.isFinite(mean + standardDeviation)) {
    throw new RangeError(
      `continuousRankedProbabilityScore needs a finite mean and standardDeviation of at least 0, got ${mean} and ${standardDeviation}`,
    );
  }
  if (standardDeviation === 0) return Math.abs(actual - mean);
  const z = (actual - mean) / standardDeviation;
  const density = Math.exp(-0.5 * z * z) / Math.sqrt(2 * Math.PI);
  return standardDeviation * (z * (2 * normalProbability(z) - 1) + 2 * density - 1 / Math.sqrt(Math.PI));
}

function sampleScore(actual: number, sample: ArrayLike<number>): number {
  requireValues("continuousRankedProbabilityScore", "sample", sample, "no-gaps");
  const sorted = Float64Array.from(sample).sort();
  const count = sorted.length;
  if (count === 0)
    throw new RangeError("continuousRankedProbabilityScore needs a sample of at least 1, got 0");
  let away = 0;
  let apart = 0;
  for (let i = 0; i < count; i++) {
    away += Math.abs(sorted[i] - actual);
    // Σ_{i,j} |x_i − x_j| = 2 Σ (2i − n + 1) x_(i) of the sorted sample.
    apart += 2 * (2 * i - count + 1) * sorted[i];
  }
  return away / count - apart / (2 * count * count);
}

function averageOver(actual: ArrayLike<number>, measure: (value: number, h: number) => number): number {
  let sum = 0;
  let seen = 0;
  for (let h = 0; h < actual.length; h++) {
    if (Number.isNaN(actual[h])) continue;
    sum += measure(actual[h], h);
    seen++;
  }
  return sum / seen;
}

function trainingScale(operation: string, { training, season = 1 }: Scaling): number {
  requireValues(operation, "training", training, "gaps-allowed");
  requireWhole(operation, "season", season, 1);
  let sum = 0;
  let pairs = 0;
  for (let t = season; t < training.length; t++) {
    const step = Math.abs(training[t] - training[t - season]);
    if (Number.isNaN(step)) continue;
    sum += step;
    pairs++;
  }
  if (pairs === 0) {
    throw new RangeError(`${operation} needs training values ${season} apart, got ${training.length} values`);
  }
  return sum > 0 ? sum / pairs : Number.NaN;
}

function checkPair(operation: string, actual: ArrayLike<number>, forecast: ArrayLike<number>): void {
  requireValues(operation, "actual", actual, "gaps-allowed");
  requireValues(operation, "forecast", forecast, "no-gaps");
  if (actual.length !== forecast.length || actual.length === 0) {
    throw new RangeError(
      `${operation} needs as many forecasts as actual values, at least one, got ${forecast.length} for ${actual.length}`,
    );
  }
}

/** Measures of forecasts against outcomes. */
export const accuracy = {
  meanAbsoluteScaledError,
  symmetricMeanAbsolutePercentageError,
  meanScaledIntervalScore,
  continuousRankedProbabilityScore,
} as const;
