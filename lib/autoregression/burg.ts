/** Buffers and results of `burgReflections`. */
export interface BurgReflections {
  /** Reflection coefficients, which are the partial autocorrelations of lags 1..maxOrder. */
  readonly partials: Float64Array;
  /** Innovation variance of orders 0..maxOrder. */
  readonly innovationVariances: Float64Array;
  readonly forward: Float64Array;
  readonly backward: Float64Array;
}

/** Buffers and results of `burgAllOrders`; make one with `burgWorkspace` and use it again and again. */
export interface BurgWorkspace extends BurgReflections {
  readonly capacity: number;
  readonly maxOrder: number;
  /** Row k−1 (stride `maxOrder`) holds φ_1..φ_k of order k. */
  readonly coefficients: Float64Array;
}

/** Space for the reflection coefficients alone. */
export function reflectionWorkspace(capacity: number, maxOrder: number): BurgReflections {
  return {
    partials: new Float64Array(maxOrder),
    innovationVariances: new Float64Array(maxOrder + 1),
    forward: new Float64Array(capacity),
    backward: new Float64Array(capacity),
  };
}

let shared = reflectionWorkspace(0, 0);

/**
 * A workspace that lives on between calls, for callers that are done with the results before anyone else can ask: making
 * buffers costs as much as the recursion itself.
 */
export function sharedReflections(capacity: number, maxOrder: number): BurgReflections {
  if (shared.forward.length < capacity || shared.partials.length < maxOrder) {
    const length = Math.max(capacity, shared.forward.length);
    shared = reflectionWorkspace(length, Math.max(maxOrder, shared.partials.length));
  }
  return shared;
}

/** Space for series of up to `capacity` values and orders up to `maxOrder`. */
export function burgWorkspace(capacity: number, maxOrder: number): BurgWorkspace {
  return {
    ...reflectionWorkspace(capacity, maxOrder),
    capacity,
    maxOrder,
    coefficients: new Float64Array(maxOrder * maxOrder),
  };
}

/**
 * Burg's (1967) estimate for every order 0..maxOrder in one pass of O(n·maxOrder), without allocation: the reflection
 * coefficients of `burgReflections`, and from them the coefficients of every order. Results are left in `workspace`.
 * Unchecked, for inner loops: `values` without gaps, `maxOrder` below the number of values.
 */
export function burgAllOrders(
  values: ArrayLike<number>,
  centre: number,
  maxOrder: number,
  workspace: BurgWorkspace,
): void {
  burgReflections(values, centre, maxOrder, workspace);
  const { coefficients, partials, maxOrder: stride } = workspace;
  for (let k = 1; k <= maxOrder; k++) {
    const partial = partials[k - 1];
    const row = (k - 1) * stride;
    const before = row - stride;
    for (let j = 0; j < k - 1; j++) {
      coefficients[row + j] = coefficients[before + j] - partial * coefficients[before + k - 2 - j];
    }
    coefficients[row + k - 1] = partial;
  }
}

/** Reflection coefficients stop short of one, so that a perfectly predictable series still has a stationary fit. */
const LARGEST = 1 - 1e-10;

/**
 * Burg's reflection coefficients π_k = 2 Σ f_t b_{t−1} / Σ (f_t² + b_{t−1}²), which never pass ±1, so every fit is
 * stationary, and innovation variances v_0 = Σ z²/n, v_k = v_{k−1}(1 − π_k²). `centre` is taken off the values. Once a
 * series is perfectly predicted the higher coefficients are zero.
 */
export function burgReflections(
  values: ArrayLike<number>,
  centre: number,
  maxOrder: number,
  workspace: BurgReflections,
): void {
  const { forward, backward, partials, innovationVariances } = workspace;
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
    // What is left of a series that was predicted perfectly is rounding.
    const partial = energy > power * 1e-18 ? Math.max(-LARGEST, Math.min(LARGEST, (2 * cross) / energy)) : 0;
    partials[k - 1] = partial;
    innovationVariances[k] = innovationVariances[k - 1] * (1 - partial) * (1 + partial);
    if (k === maxOrder) break;
    const first = forward[k] - partial * backward[0];
    cross = advance(forward, backward, k, n, partial);
    const last = backward[n - 1 - k];
    energy = energy * (1 - partial) * (1 + partial) - first * first - last * last;
    // Where nearly everything was predicted, the recursion has lost its digits.
    if (!(energy > power * 1e-9)) energy = remainingEnergy(forward, backward, k + 1, n);
  }
}

/**
 * Takes both errors from order k−1 to k, in place, and returns Σ f_t b_{t−1} of order k. `backward[s]` holds b_{s+k−1}
 * before and b_{s+k} after. Two values a turn, with two sums, so that additions need not wait for each other.
 */
function advance(
  forward: Float64Array,
  backward: Float64Array,
  k: number,
  n: number,
  partial: number,
): number {
  let even = 0;
  let odd = 0;
  let previous = 0;
  let t = k;
  let s = 0;
  for (; t + 1 < n; t += 2, s += 2) {
    const f0 = forward[t];
    const b0 = backward[s];
    const f1 = forward[t + 1];
    const b1 = backward[s + 1];
    const nextF0 = f0 - partial * b0;
    const nextB0 = b0 - partial * f0;
    const nextF1 = f1 - partial * b1;
    const nextB1 = b1 - partial * f1;
    forward[t] = nextF0;
    backward[s] = nextB0;
    forward[t + 1] = nextF1;
    backward[s + 1] = nextB1;
    even += nextF0 * previous;
    odd += nextF1 * nextB0;
    previous = nextB1;
  }
  if (t < n) {
    const f = forward[t];
    const b = backward[s];
    forward[t] = f - partial * b;
    backward[s] = b - partial * f;
    even += forward[t] * previous;
  }
  return even + odd;
}

/** Σ f_t² + b_{t−1}² over t ≥ from. */
function remainingEnergy(forward: Float64Array, backward: Float64Array, from: number, n: number): number {
  let sum = 0;
  for (let t = from; t < n; t++) sum += forward[t] * forward[t] + backward[t - from] * backward[t - from];
  return sum;
}
