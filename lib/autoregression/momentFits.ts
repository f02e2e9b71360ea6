import { invertPositive } from "../numeric/cholesky.ts";
import { countObserved, observedMean } from "../numeric/sums.ts";
import { burgReflections, sharedReflections } from "./burg.ts";
import type { AutoregressiveFit } from "./fit.ts";
import { partialsToCoefficients } from "./partials.ts";
import { autocovariancesAbout } from "./sampleMoments.ts";
import { summarise } from "./summarise.ts";
import { yuleWalkerAllOrders } from "./yuleWalker.ts";

/** Coefficients and innovation variance of every order 0..maxOrder by Yule–Walker or Burg. */
export interface MomentOrders {
  readonly centre: number;
  coefficients(order: number): Float64Array;
  readonly innovationVariances: Float64Array;
}

/** All orders by one recursion. `meanKnown` takes the mean as zero. */
export function momentOrders(
  values: ArrayLike<number>,
  maxOrder: number,
  method: "yule-walker" | "burg",
  meanKnown: boolean,
): MomentOrders {
  const centre = meanKnown ? 0 : observedMean(values);
  if (method === "yule-walker") {
    const orders = yuleWalkerAllOrders(values, centre, maxOrder);
    return {
      centre,
      coefficients: (order) => (order === 0 ? new Float64Array(0) : orders.coefficients[order - 1]),
      innovationVariances: orders.innovationVariances,
    };
  }
  const reflections = sharedReflections(values.length, maxOrder);
  burgReflections(values, centre, maxOrder, reflections);
  return {
    centre,
    coefficients: (order) => partialsToCoefficients(reflections.partials.subarray(0, order)),
    innovationVariances: reflections.innovationVariances,
  };
}

/**
 * Log-likelihood that goes with a recursion's innovation variance v: −n/2 (log 2πv + 1). It differs from R's
 * `ar` criterion n log v + 2p by a constant, so orders rank the same.
 */
export function momentLogLikelihood(innovationVariance: number, observations: number): number {
  return -0.5 * observations * (Math.log(2 * Math.PI * innovationVariance) + 1);
}

/**
 * Fit of one order by Yule–Walker or Burg. Standard errors sqrt(diag(σ²/n · Γ̂_p⁻¹)) from sample autocovariances
 * with divisor n (Brockwell & Davis 1991, theorem 8.1.1); of the mean, sqrt(σ²/n)/|1 − Σφ|. The first p residuals
 * are `NaN`: they have no complete past.
 */
export function fitByMoments(
  values: ArrayLike<number>,
  order: number,
  method: "yule-walker" | "burg",
  meanKnown: boolean,
  orders: MomentOrders = momentOrders(values, order, method, meanKnown),
): AutoregressiveFit {
  const { centre } = orders;
  const coefficients = orders.coefficients(order);
  const innovationVariance = orders.innovationVariances[order];
  const observations = countObserved(values);
  let slack = 1;
  for (let j = 0; j < order; j++) slack -= coefficients[j];
  const scale = innovationVariance / observations;
  return summarise({
    method,
    coefficients,
    standardErrors: momentErrors(values, centre, order, scale),
    mean: centre,
    meanStandardError: meanKnown ? 0 : Math.sqrt(scale) / Math.abs(slack),
    innovationVariance,
    logLikelihood: momentLogLikelihood(innovationVariance, observations),
    parameters: order + (meanKnown ? 1 : 2),
    effectiveObservations: observations,
    observations,
    residuals: laggedResiduals(values, centre, coefficients),
  });
}

/** sqrt(diag(scale · Γ̂⁻¹)). */
function momentErrors(values: ArrayLike<number>, centre: number, order: number, scale: number): Float64Array {
  const errors = new Float64Array(order);
  if (order === 0) return errors;
  const gamma = autocovariancesAbout(values, centre, order - 1);
  const matrix = new Float64Array(order * order);
  for (let i = 0; i < order; i++) {
    for (let j = 0; j < order; j++) matrix[i * order + j] = gamma[Math.abs(i - j)];
  }
  const inverse = invertPositive(matrix, order);
  if (inverse !== undefined) {
    for (let i = 0; i < order; i++) errors[i] = Math.sqrt(scale * inverse[i * order + i]);
  }
  return errors;
}

/** z_t − Σ φ_j z_{t−j} of z = x − centre; `NaN` where the value or one of its lags is missing. */
function laggedResiduals(
  values: ArrayLike<number>,
  centre: number,
  coefficients: Float64Array,
): Float64Array {
  const p = coefficients.length;
  const departures = new Float64Array(values.length);
  for (let t = 0; t < departures.length; t++) departures[t] = values[t] - centre;
  const residuals = new Float64Array(departures.length).fill(Number.NaN, 0, Math.min(p, departures.length));
  for (let t = p; t < departures.length; t++) {
    let error = departures[t];
    for (let j = 0; j < p; j++) error -= coefficients[j] * departures[t - 1 - j];
    residuals[t] = error;
  }
  return residuals;
}
