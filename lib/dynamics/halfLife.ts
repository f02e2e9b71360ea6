import { requireValues } from "../autoregression/checks.ts";
import { stepDown } from "../autoregression/partials.ts";

/** Past this many periods the weights are followed by their dominant decay only. */
const LONGEST_WALK = 2_000_000;

/**
 * Half-life of a shock: the first lag, linearly interpolated, from which |ψ_j| stays at or below one half.
 * For AR(1) with φ in (0.5, 1) it lies within one period of ln 0.5 / ln φ. Infinite when shocks are permanent,
 * that is when the process is not stationary. The smallest answer is above 0: at lag 0 the weight is 1.
 *
 * Weights that cross one half more than once are followed to the last crossing: the walk stops only where
 * γ_0 · sᵀΓ⁻¹s ≤ 1/4 for the last p weights s, a bound on every later squared weight, because sᵀΓ⁻¹s never grows
 * along ψ when Γ is the autocovariance matrix (the Lyapunov equation Γ = AΓAᵀ + σ²ee ᵀ).
 *
 * @example halfLife([0.5]) // 1
 */
export function halfLife(coefficients: ArrayLike<number>): number {
  requireValues("halfLife", "coefficients", coefficients, "no-gaps");
  const p = coefficients.length;
  if (p === 0) return 0.5;
  const partials = stepDown(coefficients);
  if (partials === undefined) return Number.POSITIVE_INFINITY;
  const bound = new FutureBound(partials);
  const recent = new Float64Array(p); // the last p weights, newest first
  recent[0] = 1;
  let answer = 0;
  let nextCheck = 1;
  for (let lag = 1; lag <= LONGEST_WALK; lag++) {
    let weight = 0;
    for (let i = 0; i < p; i++) weight += coefficients[i] * recent[i];
    const before = Math.abs(recent[0]);
    const now = Math.abs(weight);
    if (before > 0.5 && now <= 0.5) answer = lag - 1 + (before - 0.5) / (before - now);
    recent.copyWithin(1, 0, p - 1);
    recent[0] = weight;
    if (now <= 0.5 && lag >= nextCheck) {
      if (bound.of(recent) <= 0.25) return answer;
      nextCheck = lag + Math.max(1, lag >> 3);
    }
  }
  return slowDecay(Math.max(...recent.map(Math.abs)), coefficients, recent);
}

/** Largest squared value any later weight can take, from the last p weights. */
class FutureBound {
  readonly #partials: Float64Array;
  readonly #orders: Float64Array[] = [];

  constructor(partials: Float64Array) {
    this.#partials = partials;
    let previous = new Float64Array(0);
    for (let k = 1; k < partials.length; k++) {
      const current = new Float64Array(k);
      for (let j = 1; j < k; j++) current[j - 1] = previous[j - 1] - partials[k - 1] * previous[k - 1 - j];
      current[k - 1] = partials[k - 1];
      this.#orders.push(current);
      previous = current;
    }
  }

  /** γ_0 sᵀΓ⁻¹s, summed as squared prediction errors of every order over their variances (γ_0 = 1). */
  of(recent: Float64Array): number {
    let sum = 0;
    let variance = 1;
    const p = recent.length;
    for (let k = 0; k < p; k++) {
      let error = recent[p - 1 - k];
      for (let j = 1; j <= k; j++) error -= this.#orders[k - 1][j - 1] * recent[p - 1 - k + j];
      sum += (error * error) / variance;
      variance *= (1 - this.#partials[k]) * (1 + this.#partials[k]);
    }
    return sum;
  }
}

/** Beyond the walk only the slowest root is left, and the weights shrink by one factor a period. */
function slowDecay(size: number, coefficients: ArrayLike<number>, recent: Float64Array): number {
  let next = 0;
  for (let i = 0; i < recent.length; i++) next += coefficients[i] * recent[i];
  const ratio = Math.abs(next / recent[0]);
  if (!(ratio < 1)) return Number.POSITIVE_INFINITY;
  return LONGEST_WALK + Math.max(0, Math.log(0.5 / size) / Math.log(ratio));
}
