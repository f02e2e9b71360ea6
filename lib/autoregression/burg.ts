/** Buffers and results of `burgAllOrders`; make one with `burgWorkspace` and use it again and again. */
export interface BurgWorkspace {
  readonly capacity: number;
  readonly maxOrder: number;
  /** Row k−1 (stride `maxOrder`) holds φ_1..φ_k of order k. */
  readonly coefficients: Float64Array;
  /** Reflection coefficients, which are the partial autocorrelations of lags 1..maxOrder. */
  readonly partials: Float64Array;
  /** Innovation variance of orders 0..maxOrder. */
  readonly innovationVariances: Float64Array;
  readonly forward: Float64Array;
  readonly backward: Float64Array;
}

/** Space for series of up to `capacity` values and orders up to `maxOrder`. */
export function burgWorkspace(capacity: number, maxOrder: number): BurgWorkspace {
  return {
    capacity,
    maxOrder,
    coefficients: new Float64Array(maxOrder * maxOrder),
    partials: new Float64Array(maxOrder),
    innovationVariances: new Float64Array(maxOrder + 1),
    forward: new Float64Array(capacity),
    backward: new Float64Array(capacity),
  };
}

/**
 * Burg's (1967) estimate for every order 0..maxOrder in one pass of O(n·maxOrder), without allocation.
 * Reflection coefficient π_k = 2 Σ f_t b_{t−1} / Σ (f_t² + b_{t−1}²), which never passes ±1, so every fit is
 * stationary; v_0 = Σ z²/n and v_k = v_{k−1}(1 − π_k²). Results are left in `workspace`.
 *
 * `values` without gaps, `centre` is taken off them, `maxOrder` below the number of values. Unchecked: for inner
 * loops. When a series is perfectly predictable the higher reflection coefficients are zero.
 */
export function burgAllOrders(
  values: ArrayLike<number>,
  centre: number,
  maxOrder: number,
  workspace: BurgWorkspace,
): void {
  const { forward, backward, coefficients, partials, innovationVariances, maxOrder: stride } = workspace;
  const n = values.length;
  let power = 0;
  for (let t = 0; t < n; t++) {
    const value = values[t] - centre;
    forward[t] = value;
    backward[t] = value;
    power += value * value;
  }
  innovationVariances[0] = power / n;
  let cross = 0;
  for (let t = 1; t < n; t++) cross += forward[t] * forward[t - 1];
  let energy = 2 * power - forward[0] ** 2 - forward[n - 1] ** 2;
  for (let k = 1; k <= maxOrder; k++) {
    const partial = energy > 0 ? Math.max(-1, Math.min(1, (2 * cross) / energy)) : 0;
    partials[k - 1] = partial;
    innovationVariances[k] = innovationVariances[k - 1] * (1 - partial) * (1 + partial);
    const row = (k - 1) * stride;
    const before = row - stride;
    for (let j = 0; j < k - 1; j++) {
      coefficients[row + j] = coefficients[before + j] - partial * coefficients[before + k - 2 - j];
    }
    coefficients[row + k - 1] = partial;
    if (k === maxOrder) break;
    // backward[s] holds b_{s+k−1} of order k−1, so that both updates are in place, and the sums for the next
    // reflection coefficient fall out of the same pass.
    cross = 0;
    energy = 0;
    let lastBackward = 0;
    const start = forward[k] - partial * backward[0];
    for (let t = k, s = 0; t < n; t++, s++) {
      const f = forward[t];
      const b = backward[s];
      const nextForward = f - partial * b;
      const nextBackward = b - partial * f;
      forward[t] = nextForward;
      backward[s] = nextBackward;
      cross += nextForward * lastBackward;
      energy += nextForward * nextForward + nextBackward * nextBackward;
      lastBackward = nextBackward;
    }
    energy -= start * start + lastBackward * lastBackward;
  }
}
