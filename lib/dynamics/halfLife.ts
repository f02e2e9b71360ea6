import { requireValues } from "../autoregression/checks.ts";
import { stepDown } from "../autoregression/partials.ts";
import { characteristicRoots } from "./characteristicRoots.ts";

/** Past this many periods the weights are followed by the decay of their slowest root only. */
const LONGEST_WALK = 20_000;

/**
 * Half-life of a shock: the first lag, linearly interpolated, from which |ψ_j| stays at or below one half.
 * For AR(1) with φ in (0.5, 1) it lies within one period of ln 0.5 / ln φ. Infinite when shocks are permanent,
 * that is when the process is not stationary. The smallest answer is above 0: at lag 0 the weight is 1.
 *
 * Weights that cross one half more than once are followed to the last crossing: the walk stops only where
 * γ_0 · sᵀΓ⁻¹s ≤ 1/4 for the last p weights s, a bound on every later squared weight, because sᵀΓ⁻¹s never grows
 * along ψ when Γ is the autocovariance matrix (the Lyapunov equation Γ = AΓAᵀ + σ²eeᵀ). After 20,000 periods the rest
 * follows from the slowest root, to within one of its cycles.
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
  // Only the slowest root is left; the bound is the envelope of its swings, and shrinks by its modulus a period.
  const envelope = Math.sqrt(bound.of(recent));
  const [slowest] = characteristicRoots(coefficients);
  if (envelope <= 0.5) return answer;
  // On the very edge rounding may put the root outside.
  if (!(slowest.modulus < 1 && Number.isFinite(envelope))) return Number.POSITIVE_INFINITY;
  return LONGEST_WALK + Math.log(0.5 / envelope) / Math.log(slowest.modulus);
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
