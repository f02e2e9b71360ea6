import { invertPositive } from "../numeric/cholesky.ts";
import { countObserved, observedMean } from "../numeric/sums.ts";
import { burgReflections, reflectionWorkspace } from "./burg.ts";
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
  const reflections = reflectionWorkspace(values.length, maxOrder);
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
  const persistence = coefficients.reduce((sum, value) => sum + value, 0);
  const level = Math.sqrt(innovationVariance / observations) / Math.abs(1 - persistence);
  return summarise({
    method,
    coefficients,
    standardErrors: momentErrors(values, centre, order, innovationVariance),
    mean: centre,
    meanStandardError: meanKnown ? 0 : level,
    innovationVariance,
    logLikelihood: momentLogLikelihood(innovationVariance, observations),
    parameters: order + (meanKnown ? 1 : 2),
    effectiveObservations: observations,
    observations,
    residuals: laggedResiduals(values, coefficients, centre),
  });
}

function momentErrors(
  values: ArrayLike<number>,
  centre: number,
  order: number,
  innovationVariance: number,
): Float64Array {
  const gamma = autocovariancesAbout(values, centre, Math.max(0, order - 1));
  const matrix = new Float64Array(order * order);
  for (let i = 0; i < order; i++) {
    for (let j = 0; j < order; j++) matrix[i * order + j] = gamma[Math.abs(i - j)];
  }
  const inverse = invertPositive(matrix, order);
  const scale = innovationVariance / countObserved(values);
  return Float64Array.from({ length: order }, (_, i) =>
    inverse ? Math.sqrt(scale * inverse[i * order + i]) : 0,
  );
}

/** x_t − c − Σ φ_j (x_{t−j} − c); `NaN` where the value or one of its lags is missing. */
export function laggedResiduals(
  values: ArrayLike<number>,
  coefficients: ArrayLike<number>,
  centre: number,
): Float64Array {
  const p = coefficients.length;
  const residuals = new Float64Array(values.length).fill(Number.NaN);
  for (let t = p; t < values.length; t++) {
    let error = values[t] - centre;
    for (let j = 1; j <= p; j++) error -= coefficients[j - 1] * (values[t - j] - centre);
    residuals[t] = error;
  }
  return residuals;
}
