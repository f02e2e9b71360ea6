import { requireValues, requireWhole } from "../autoregression/checks.ts";

/**
 * Moving-average weights ψ_0..ψ_{count−1}: the effect of a unit shock j periods later.
 * ψ_0 = 1, ψ_j = Σ φ_i ψ_{j−i} (Box & Jenkins 1976, section 3.2; R's `ARMAtoMA`).
 *
 * @example movingAverageWeights([0.5], 4) // [1, 0.5, 0.25, 0.125]
 */
export function movingAverageWeights(coefficients: ArrayLike<number>, count: number): Float64Array {
  requireValues("movingAverageWeights", "coefficients", coefficients, "no-gaps");
  requireWhole("movingAverageWeights", "count", count, 0);
  const weights = new Float64Array(count);
  if (count > 0) weights[0] = 1;
  for (let j = 1; j < count; j++) {
    const reach = Math.min(j, coefficients.length);
    for (let i = 1; i <= reach; i++) weights[j] += coefficients[i - 1] * weights[j - i];
  }
  return weights;
}
