/** Every order's answer of one Levinson–Durbin pass. */
export interface LevinsonOrders {
  /** Coefficients φ_1..φ_k of order k at index k−1. */
  readonly coefficients: readonly Float64Array[];
  /** Partial autocorrelations of lags 1..maxOrder. */
  readonly partials: Float64Array;
  /** One-step error variance of orders 0..maxOrder. */
  readonly innovationVariances: Float64Array;
}

/**
 * Levinson–Durbin recursion (Levinson 1947, Durbin 1960): from autocovariances γ_0..γ_m the best linear
 * predictors of every order up to `maxOrder`, O(m²). The variance falls as v_k = v_{k−1}(1 − π_k²).
 *
 * Throws `RangeError` when γ_0 is not positive, or when there are fewer than `maxOrder + 1` autocovariances.
 * Once a series is perfectly predictable (v_k = 0) the higher partials are set to zero.
 *
 * @example levinson([2, 1.2], 1).coefficients[0] // [0.6], error variance 1.28
 */
export function levinson(
  autocovariances: ArrayLike<number>,
  maxOrder = autocovariances.length - 1,
): LevinsonOrders {
  if (autocovariances.length < maxOrder + 1) {
    throw new RangeError(
      `levinson needs ${maxOrder + 1} autocovariances for order ${maxOrder}, got ${autocovariances.length}`,
    );
  }
  if (!(autocovariances[0] > 0)) {
    throw new RangeError(`levinson needs a positive variance at lag 0, got ${autocovariances[0]}`);
  }
  const partials = new Float64Array(maxOrder);
  const innovationVariances = new Float64Array(maxOrder + 1);
  const coefficients: Float64Array[] = [];
  innovationVariances[0] = autocovariances[0];
  let previous = new Float64Array(0);
  for (let k = 1; k <= maxOrder; k++) {
    const variance = innovationVariances[k - 1];
    let numerator = autocovariances[k];
    for (let j = 1; j < k; j++) numerator -= previous[j - 1] * autocovariances[k - j];
    const partial = variance > 0 ? numerator / variance : 0;
    const current = new Float64Array(k);
    for (let j = 1; j < k; j++) current[j - 1] = previous[j - 1] - partial * previous[k - 1 - j];
    current[k - 1] = partial;
    partials[k - 1] = partial;
    innovationVariances[k] = variance * (1 - partial) * (1 + partial);
    coefficients.push(current);
    previous = current;
  }
  return { coefficients, partials, innovationVariances };
}
