import type { WorkingScale } from "./workingScale.ts";

/** How one working scale sees the uncertainty, by horizon step. */
export interface ScaleSpread {
  readonly scale: WorkingScale;
  /** Share of this scale in the average; shares sum to 1. */
  readonly share: number;
  /** Standard deviations on the working scale. */
  readonly deviations: Float64Array;
}

/**
 * A predictive distribution by horizon step. Its quantile function is the average over scales (Vincent 1912) of each
 * scale's normal quantile, all anchored at the same median: Q(z) = Σ share · apart(forward(median), z · deviation),
 * z being a standard normal quantile and `apart` the way back from a scale. Averaging quantiles keeps the shape of its parts, where averaging densities
 * would widen and split.
 */
export interface PredictiveSpread {
  readonly medians: Float64Array;
  readonly scales: readonly ScaleSpread[];
}

/** The quantile at step `h` that belongs to the standard normal quantile `z`. Increasing in `z`. */
export function spreadQuantile(spread: PredictiveSpread, h: number, z: number): number {
  const median = spread.medians[h];
  let sum = 0;
  for (const { scale, share, deviations } of spread.scales) {
    // A median outside the domain of a scale (below zero for the logarithm) leaves that scale with nothing to say:
    // its share moves by the raw deviation, which every spread carries first.
    const anchored = scale.forward(median);
    sum +=
      share *
      (Number.isFinite(anchored)
        ? scale.apart(anchored, z * deviations[h])
        : median + z * spread.scales[0].deviations[h]);
  }
  return sum;
}

/** Farther out no probability is told from nothing: φ(40) is below the least number there is. */
const FARTHEST_SCORE = 40;

/**
 * The standard normal quantile at which `value` stands at step `h`, within ±`FARTHEST_SCORE`; the inverse of the
 * quantile.
 */
export function spreadScore(spread: PredictiveSpread, h: number, value: number): number {
  let low = -FARTHEST_SCORE;
  let high = FARTHEST_SCORE;
  if (value <= spreadQuantile(spread, h, low)) return low;
  if (value >= spreadQuantile(spread, h, high)) return high;
  // Regula falsi with halving (Illinois): the function is smooth, increasing and nearly straight.
  let below = spreadQuantile(spread, h, low) - value;
  let above = spreadQuantile(spread, h, high) - value;
  let z = 0;
  let side = 0;
  for (let i = 0; i < 100 && high - low > 1e-10; i++) {
    z = i === 0 ? 0 : (low * above - high * below) / (above - below);
    if (!(z > low && z < high)) z = (low + high) / 2;
    const at = spreadQuantile(spread, h, z) - value;
    if (at === 0) return z;
    if (at < 0) {
      low = z;
      below = at;
      if (side < 0) above /= 2;
      side = -1;
    } else {
      high = z;
      above = at;
      if (side > 0) below /= 2;
      side = 1;
    }
    if (Math.abs(at) <= 1e-12 * (Math.abs(value) + Math.abs(spread.medians[h]))) return z;
  }
  return z;
}
