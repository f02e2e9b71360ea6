import { stepUp } from "./partials.ts";
import { processAutocovariances } from "./processAutocovariances.ts";

/**
 * What is known of the last p deviations after some values were seen: their means, newest first, and the
 * covariance of their errors. A value that was observed has a row of zeros; while all have, nothing is `open`.
 */
export interface FilterState {
  readonly means: Float64Array;
  /** By row, p². */
  readonly covariance: Float64Array;
  /** Observed values in a row up to now, counted to p. */
  run: number;
}

/** State in which the last p deviations are known exactly; `newest` indexes the last of them. */
export function knownState(deviations: ArrayLike<number>, newest: number, order: number): FilterState {
  const means = new Float64Array(order);
  for (let j = 0; j < order; j++) means[j] = deviations[newest - j];
  return { means, covariance: new Float64Array(order * order), run: order };
}

/** State before any value: the stationary distribution of the process with these coefficients and partials. */
export function stationaryState(
  coefficients: ArrayLike<number>,
  partials: Float64Array,
  innovationVariance: number,
): FilterState {
  const p = coefficients.length;
  const covariance = new Float64Array(p * p);
  if (p > 0) {
    const gamma = processAutocovariances(coefficients, partials, innovationVariance, p - 1);
    for (let i = 0; i < p; i++) for (let j = 0; j < p; j++) covariance[i * p + j] = gamma[Math.abs(i - j)];
  }
  return { means: new Float64Array(p), covariance, run: 0 };
}

/**
 * Runs the filter over deviations `from`..end (Kalman 1960, for the state of the last p values; Jones 1980 for
 * gaps), writing one-step errors and their variances; a gap gives `NaN` in both. O(p) a value while no gap is
 * open, O(p²) from a gap until p values in a row were observed.
 */
export function runFilter(
  coefficients: ArrayLike<number>,
  innovationVariance: number,
  deviations: ArrayLike<number>,
  from: number,
  state: FilterState,
  innovations: Float64Array,
  variances: Float64Array,
): void {
  const { means, covariance } = state;
  const p = means.length;
  const cross = new Float64Array(p);
  for (let t = from; t < deviations.length; t++) {
    let predicted = 0;
    for (let i = 0; i < p; i++) predicted += coefficients[i] * means[i];
    let variance = innovationVariance;
    const open = state.run < p;
    if (open) {
      for (let i = 0; i < p; i++) {
        let sum = 0;
        for (let j = 0; j < p; j++) sum += covariance[i * p + j] * coefficients[j];
        cross[i] = sum;
        variance += sum * coefficients[i];
      }
    }
    const value = deviations[t];
    const missing = Number.isNaN(value);
    innovations[t] = missing ? Number.NaN : value - predicted;
    variances[t] = missing ? Number.NaN : variance;
    if (open && !missing) learn(state, cross, innovations[t], variance);
    shift(state, missing ? predicted : value, missing ? variance : 0, cross, missing);
  }
}

/** Conditions the last p values on a new one that covaries with them by `cross`. */
function learn(state: FilterState, cross: Float64Array, innovation: number, variance: number): void {
  const { means, covariance } = state;
  const p = means.length;
  for (let i = 0; i < p; i++) {
    const gain = cross[i] / variance;
    means[i] += gain * innovation;
    for (let j = 0; j < p; j++) covariance[i * p + j] -= gain * cross[j];
  }
}

/** Takes the newest value into the state and drops the oldest. */
function shift(
  state: FilterState,
  value: number,
  variance: number,
  cross: Float64Array,
  missing: boolean,
): void {
  const { means, covariance } = state;
  const p = means.length;
  if (p === 0) return;
  const wasKnown = state.run >= p;
  means.copyWithin(1, 0, p - 1);
  means[0] = value;
  state.run = missing ? 0 : Math.min(p, state.run + 1);
  if (wasKnown && !missing) return;
  if (state.run >= p) {
    covariance.fill(0);
    return;
  }
  for (let i = p - 1; i > 0; i--) {
    for (let j = p - 1; j > 0; j--) covariance[i * p + j] = covariance[(i - 1) * p + j - 1];
  }
  for (let j = 1; j < p; j++) {
    const shared = missing && !wasKnown ? cross[j - 1] : 0;
    covariance[j] = shared;
    covariance[j * p] = shared;
  }
  covariance[0] = variance;
}

/**
 * First p errors and variances of a series without a gap among them, from the best predictor of each shorter
 * past: exact where the filter would have to cancel a large variance near a unit root.
 */
export function exactStart(
  partials: Float64Array,
  innovationVariance: number,
  deviations: ArrayLike<number>,
  innovations: Float64Array,
  variances: Float64Array,
): void {
  const p = partials.length;
  let variance = innovationVariance;
  for (let k = 0; k < p; k++) variance /= (1 - partials[k]) * (1 + partials[k]);
  const predictor = new Float64Array(p);
  for (let t = 0; t < p; t++) {
    let error = deviations[t];
    for (let j = 1; j <= t; j++) error -= predictor[j - 1] * deviations[t - j];
    innovations[t] = error;
    variances[t] = variance;
    stepUp(predictor, t + 1, partials[t]);
    variance *= (1 - partials[t]) * (1 + partials[t]);
  }
}
