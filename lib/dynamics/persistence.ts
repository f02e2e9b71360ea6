import { requireValues } from "../autoregression/checks.ts";
import { compensatedSum } from "../numeric/sums.ts";

/**
 * Persistence Σ φ_i: below one, shocks fade; their summed effect over all time is 1/(1 − Σ φ_i)
 * (Andrews & Chen 1994).
 *
 * @example persistence([0.5, 0.3]) // 0.8
 */
export function persistence(coefficients: ArrayLike<number>): number {
  requireValues("persistence", "coefficients", coefficients, "no-gaps");
  return compensatedSum(coefficients);
}

/**
 * Cumulative response 1/(1 − Σ φ_i): what a unit shock adds up to over all later periods; infinite when shocks
 * do not fade.
 *
 * @example cumulativeResponse([0.5]) // 2
 */
export function cumulativeResponse(coefficients: ArrayLike<number>): number {
  const sum = persistence(coefficients);
  return sum < 1 ? 1 / (1 - sum) : Number.POSITIVE_INFINITY;
}
