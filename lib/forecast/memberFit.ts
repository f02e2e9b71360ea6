import type { DriftKind, Preparation } from "./candidates.ts";
import { localDrift } from "./localDrift.ts";
import { type AveragedAutoregression, type OrderWorkspace, orderAverage } from "./orderAverage.ts";
import { levelProfile, meanProfile } from "./seasonalProfile.ts";

/** A preparation fitted to the first `count` values of a series on its working scale. */
export interface MemberFit {
  readonly preparation: Preparation;
  readonly count: number;
  /**
   * The whole series (profile and line taken off) and each stage of differencing; the last is what the autoregression
   * sees, and only its values up to `count` were fitted. Later ones let the same fit forecast from later on.
   */
  readonly stages: readonly Float64Array[];
  readonly levelProfile: Float64Array | undefined;
  readonly meanProfile: Float64Array | undefined;
  readonly model: AveragedAutoregression;
  /** Mean of the last stage, and of the recent stretch of it that foretells best. */
  readonly wholeMean: number;
  readonly localMean: number;
  /** Slope of the line that was taken off, through period 0. */
  readonly slope: number;
}

/** Differences `values` at `lag`. */
function difference(values: Float64Array, lag: number): Float64Array {
  const out = new Float64Array(values.length - lag);
  for (let t = 0; t < out.length; t++) out[t] = values[t + lag] - values[t];
  return out;
}

/** Least-squares slope a period of the first `count` values. */
function lineSlope(values: Float64Array, count: number): number {
  const middle = (count - 1) / 2;
  let across = 0;
  let along = 0;
  for (let t = 0; t < count; t++) {
    across += (t - middle) * values[t];
    along += (t - middle) ** 2;
  }
  return across / along;
}

/** Fits one preparation; `undefined` when too few values are left after differencing to say anything. */
export function fitMember(
  values: Float64Array,
  count: number,
  preparation: Preparation,
  maxOrder: number,
  workspace: OrderWorkspace,
): MemberFit | undefined {
  const { differences, season, profile } = preparation;
  let lost = 0;
  for (const lag of differences) lost += lag;
  const length = count - lost;
  if (
    length < 4 ||
    (profile === "level" && count < 2 * season) ||
    (profile === "mean" && length < 2 * season)
  ) {
    return undefined;
  }
  let series: Float64Array = values.slice();
  const onLevels = profile === "level" ? levelProfile(values, season, count) : undefined;
  if (onLevels !== undefined) for (let t = 0; t < series.length; t++) series[t] -= onLevels[t % season];
  const slope = preparation.line ? lineSlope(series, count) : 0;
  if (slope !== 0) for (let t = 0; t < series.length; t++) series[t] -= slope * t;
  const stages = [series];
  for (const lag of differences) {
    series = difference(series, lag);
    stages.push(series);
  }
  const fitted = series.subarray(0, length);
  const onMeans = profile === "mean" ? meanProfile(fitted, season, length, lost) : undefined;
  let wholeMean = 0;
  for (let t = 0; t < length; t++) wholeMean += fitted[t] / length;
  const centred = new Float64Array(length);
  for (let t = 0; t < length; t++) {
    centred[t] = fitted[t] - wholeMean - (onMeans === undefined ? 0 : onMeans[(t + lost) % season]);
  }
  const model = orderAverage(centred, Math.min(maxOrder, Math.floor(length / 3)), 1, workspace);
  return {
    preparation,
    count,
    stages,
    levelProfile: onLevels,
    meanProfile: onMeans,
    model,
    wholeMean,
    localMean: preparation.drifts.includes("local") ? localDrift(fitted) : wholeMean,
    slope,
  };
}

/** The centre a drift kind stands for. Levels always return to their mean. */
function centreOf(fit: MemberFit, drift: DriftKind): number {
  if (drift === "none") return 0;
  return drift === "whole" ? fit.wholeMean : fit.localMean;
}

/** Forecasts of the working scale 1..horizon steps after the first `count` values, to `out[at..at+horizon)`. */
export function forecastMember(
  fit: MemberFit,
  drift: DriftKind,
  count: number,
  horizon: number,
  out: Float64Array,
  at: number,
): void {
  const { stages, model, preparation, meanProfile: means, levelProfile: levels } = fit;
  const { coefficients } = model;
  const series = stages[stages.length - 1];
  const offset = stages[0].length - series.length;
  const length = count - offset;
  const season = preparation.season;
  const centre = centreOf(fit, drift);
  const order = Math.min(coefficients.length, length);
  const past = new Float64Array(order + horizon);
  for (let j = 0; j < order; j++) {
    const t = length - order + j;
    past[j] = series[t] - centre - (means === undefined ? 0 : means[(t + offset) % season]);
  }
  for (let h = 0; h < horizon; h++) {
    let sum = 0;
    for (let j = 0; j < order; j++) sum += coefficients[j] * past[order + h - 1 - j];
    past[order + h] = sum;
    out[at + h] = sum + centre + (means === undefined ? 0 : means[(count + h) % season]);
  }
  for (let stage = preparation.differences.length - 1; stage >= 0; stage--) {
    const base = stages[stage];
    const lag = preparation.differences[stage];
    const last = count - (stages[0].length - base.length) - lag;
    for (let h = 0; h < horizon; h++) out[at + h] += h < lag ? base[last + h] : out[at + h - lag];
  }
  for (let h = 0; h < horizon; h++) {
    out[at + h] += fit.slope * (count + h) + (levels === undefined ? 0 : levels[(count + h) % season]);
  }
}

/**
 * Effect of a unit shock on the working scale 0..count−1 periods later: the moving-average weights of the
 * autoregression passed through the differences.
 */
export function shockResponse(fit: MemberFit, count: number): Float64Array {
  const { coefficients } = fit.model;
  const response = new Float64Array(count);
  for (let h = 0; h < count; h++) {
    let sum = h === 0 ? 1 : 0;
    const reach = Math.min(coefficients.length, h);
    for (let j = 0; j < reach; j++) sum += coefficients[j] * response[h - 1 - j];
    response[h] = sum;
  }
  for (const lag of fit.preparation.differences) {
    for (let h = lag; h < count; h++) response[h] += response[h - lag];
  }
  return response;
}

/**
 * What not knowing the mean of the last stage does: the variance of that mean, σ²/(1 − Σφ)² (the long-run variance)
 * over the number of values, and how differences carry its error on to each step: growing for a drift, whole for a
 * level.
 */
export function meanError(
  fit: MemberFit,
  drift: DriftKind,
  count: number,
): { readonly variance: number; readonly effect: Float64Array } {
  const { coefficients, innovationVariance } = fit.model;
  const effect = new Float64Array(count);
  if (drift !== "none") effect.fill(1);
  for (const lag of fit.preparation.differences) {
    for (let h = lag; h < count; h++) effect[h] += effect[h - lag];
  }
  let rest = 1;
  for (let j = 0; j < coefficients.length; j++) rest -= coefficients[j];
  const used = fit.count - fit.preparation.differences.reduce((sum, lag) => sum + lag, 0);
  return { variance: innovationVariance / Math.max(rest * rest, 1 / used) / used, effect };
}

/**
 * Error variance on the working scale 1..count steps ahead: innovation variance times the summed squared shock
 * response, plus what not knowing the mean adds.
 */
export function errorVariances(fit: MemberFit, drift: DriftKind, count: number): Float64Array {
  const response = shockResponse(fit, count);
  const { variance, effect } = meanError(fit, drift, count);
  const variances = new Float64Array(count);
  let power = 0;
  for (let h = 0; h < count; h++) {
    power += response[h] * response[h];
    variances[h] = fit.model.innovationVariance * power + variance * effect[h] * effect[h];
  }
  return variances;
}
