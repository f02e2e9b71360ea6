import { type BurgReflections, burgReflections, reflectionWorkspace } from "../autoregression/burg.ts";
import { stepUp } from "../autoregression/partials.ts";

/** Buffers of `orderAverage`, for series and orders up to what they were made for. */
export interface OrderWorkspace extends BurgReflections {
  readonly maxOrder: number;
  /** Space for φ of one order. */
  readonly coefficients: Float64Array;
}

/** Space for series of up to `capacity` values and orders up to `maxOrder`. */
export function orderWorkspace(capacity: number, maxOrder: number): OrderWorkspace {
  const coefficients = new Float64Array(maxOrder);
  return { ...reflectionWorkspace(capacity, maxOrder), maxOrder, coefficients };
}

/** An autoregression whose coefficients are an average over orders. */
export interface AveragedAutoregression {
  /** φ_1.., as many as the longest order that carries weight. */
  readonly coefficients: Float64Array;
  readonly innovationVariance: number;
  /** Σ weight · order. */
  readonly meanOrder: number;
}

/**
 * Burg fits of every order 0..maxOrder, averaged with weights exp(−AICc/2) (Burnham and Anderson 2002). An average
 * of coefficient vectors padded with zeros is itself an autoregression, so the forecast stays explainable.
 *
 * `values` already centred; `estimated` counts the terms fitted before (mean, profile). Order 0 always takes part.
 */
export function orderAverage(
  values: Float64Array,
  maxOrder: number,
  estimated: number,
  workspace: OrderWorkspace,
): AveragedAutoregression {
  const n = values.length;
  burgReflections(values, 0, maxOrder, workspace);
  const variances = workspace.innovationVariances;
  const weights = new Float64Array(maxOrder + 1);
  let best = Number.POSITIVE_INFINITY;
  for (let p = 0; p <= maxOrder; p++) {
    const parameters = p + estimated + 1;
    const freedom = n - parameters - 1;
    weights[p] =
      freedom > 0 && variances[p] > 0
        ? n * Math.log(variances[p]) + (2 * parameters * n) / freedom
        : p === 0
          ? Number.MAX_VALUE
          : Number.POSITIVE_INFINITY;
    if (weights[p] < best) best = weights[p];
  }
  let total = 0;
  let longest = 0;
  for (let p = 0; p <= maxOrder; p++) {
    weights[p] = Math.exp(-0.5 * (weights[p] - best));
    // Weights below a ten-thousandth change no printed digit and would cost the full recursion.
    if (weights[p] < 1e-4) weights[p] = 0;
    else longest = p;
    total += weights[p];
  }
  const coefficients = new Float64Array(longest);
  // φ of one order after the other, stepped up in place as far as an order carries weight.
  const current = workspace.coefficients.subarray(0, longest);
  let innovationVariance = 0;
  let meanOrder = 0;
  for (let p = 0; p <= longest; p++) {
    if (p > 0) stepUp(current, p, workspace.partials[p - 1]);
    const weight = weights[p] / total;
    if (weight === 0) continue;
    innovationVariance += weight * variances[p];
    meanOrder += weight * p;
    for (let j = 0; j < p; j++) coefficients[j] += weight * current[j];
  }
  return { coefficients, innovationVariance, meanOrder };
}
