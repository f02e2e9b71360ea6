import { requirePositive, requireValues, requireWhole } from "../autoregression/checks.ts";
import { coefficientsToPartials } from "../autoregression/partials.ts";
import { processAutocovariances } from "../autoregression/processAutocovariances.ts";

/**
 * Theoretical autocovariances γ_0..γ_maxLag of a stationary AR process of any order (formula and source at
 * `processAutocovariances`); γ_0 is the variance of the process around its mean.
 *
 * Throws `RangeError` when the process is not stationary or the innovation variance not positive.
 *
 * @example autocovariances([0.5], 1, 2) // [1.3333, 0.6667, 0.3333]
 */
export function autocovariances(
  coefficients: ArrayLike<number>,
  innovationVariance: number,
  maxLag: number,
): Float64Array {
  requireValues("autocovariances", "coefficients", coefficients, "no-gaps");
  requirePositive("autocovariances", "innovationVariance", innovationVariance);
  requireWhole("autocovariances", "maxLag", maxLag, 0);
  const partials = coefficientsToPartials(coefficients);
  return processAutocovariances(coefficients, partials, innovationVariance, maxLag);
}
