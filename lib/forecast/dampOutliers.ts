import { median } from "./median.ts";
import { type OrderWorkspace, orderAverage } from "./orderAverage.ts";
import { levelProfile } from "./seasonalProfile.ts";

export interface DampedSeries {
  readonly values: Float64Array;
  /** Indexes of one-off values that were replaced. */
  readonly outliers: readonly number[];
  /** Indexes at which the level stepped and stayed. */
  readonly steps: readonly number[];
}

/** Robust standard deviations past which a one-step error is no ordinary shock (5 is 1 in 1.7 million). */
const FAR = 5;
/** With more far errors than this share the shocks are heavy-tailed or of changing size, and none is an outlier. */
const MOST_FAR = 0.02;
/** Always allowed: a one-off makes two far errors, coming and going. */
const FEW_FAR = 4;

/**
 * Damps one-off values before fitting. One-step errors of a robustly fitted autoregression of differences (steps
 * clipped at three robust standard deviations) are searched for errors past `FAR`; if the next value is nearer to
 * where the series would have been, the value was a one-off and is replaced by what lies between; if it is nearer
 * to the new value, the level stepped and stays. Of the last value nobody knows yet: the forecast starts from the
 * mean of both readings, weighted by how often this series' far errors stayed before (one of each added, so half
 * without any).
 *
 * `values` without gaps. At most 2 %, or four, may be far, else nothing is touched.
 */
export function dampOutliers(values: Float64Array, season: number, workspace: OrderWorkspace): DampedSeries {
  const count = values.length;
  const untouched: DampedSeries = { values, outliers: [], steps: [] };
  if (count < 12) return untouched;
  const profile = season > 1 && count >= 3 * season ? levelProfile(values, season, count) : undefined;
  const level = values.slice();
  if (profile !== undefined) for (let t = 0; t < count; t++) level[t] -= profile[t % season];
  const steps = new Float64Array(count - 1);
  for (let t = 1; t < count; t++) steps[t - 1] = level[t] - level[t - 1];
  const middle = median(steps);
  const size = 1.4826 * median(steps.map((step) => Math.abs(step - middle)));
  if (!(size > 0)) return untouched;
  const clip = (step: number): number => Math.max(-3 * size, Math.min(3 * size, step - middle));
  const clipped = steps.map(clip);
  const longest = Math.min(20, Math.floor(clipped.length / 4), workspace.maxOrder);
  const { coefficients } = orderAverage(clipped, longest, 1, workspace);
  const order = coefficients.length;
  const predictStep = (t: number): number => {
    let sum = middle;
    for (let j = 0; j < order && t - 2 - j >= 0; j++) {
      sum += coefficients[j] * clip(level[t - 1 - j] - level[t - 2 - j]);
    }
    return sum;
  };
  const errors = new Float64Array(count);
  for (let t = 1; t < count; t++) errors[t] = Math.abs(level[t] - level[t - 1] - predictStep(t));
  const errorSize = 1.4826 * median(errors.subarray(Math.min(count - 2, order + 1)));
  if (!(errorSize > 0)) return untouched;
  const limit = FAR * errorSize;
  let far = 0;
  for (let t = 1; t < count; t++) if (errors[t] > limit) far++;
  if (far === 0 || far > Math.max(FEW_FAR, MOST_FAR * count)) return untouched;

  const outliers: number[] = [];
  const stays: number[] = [];
  for (let t = 2; t < count; t++) {
    const expected = level[t - 1] + predictStep(t);
    const error = level[t] - expected;
    if (Math.abs(error) <= limit) continue;
    if (t === count - 1) {
      level[t] = expected + (error * (1 + stays.length)) / (2 + stays.length + outliers.length);
      outliers.push(t);
      continue;
    }
    const seen = level[t];
    level[t] = expected;
    const back = Math.abs(level[t + 1] - expected - predictStep(t + 1));
    if (back < Math.abs(level[t + 1] - seen - middle)) {
      level[t] = (expected + level[t + 1] - middle) / 2;
      outliers.push(t);
    } else {
      level[t] = seen;
      stays.push(t);
    }
  }
  if (profile !== undefined) for (let t = 0; t < count; t++) level[t] += profile[t % season];
  return { values: level, outliers, steps: stays };
}
