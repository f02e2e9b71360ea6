import { requireValues, requireWhole } from "../autoregression/checks.ts";
import { leastSquares } from "../numeric/leastSquares.ts";

/** What was estimated beside the coefficients: nothing, the mean, or a straight trend line. */
export type EstimatedLevel = "zero" | "estimate" | "trend";

const SLOW_TERMS: Record<EstimatedLevel, number> = { zero: 0, estimate: 1, trend: 2 };

/**
 * Bias E[φ̂_j] − φ_j of least-squares (and maximum-likelihood) estimates to order 1/n, after Shaman & Stine (1988).
 * With φ_0 = −1 and q slowly moving terms estimated (mean 1, mean and trend 2),
 *
 *   n·bias_j = −j φ_j + Σ_{i=j−2, j−4, …≥0} φ_i − Σ_{i=s, s+2, …≤p} φ_i + q Σ_{i<j} (φ_i − φ_{p−i}),
 *
 * s = p + 2 − j for even p and p + 1 − j for odd p. For p = 1: −2φ, −(1 + 3φ) (Kendall 1954; Marriott & Pope 1954)
 * and −(2 + 4φ). It is linear in φ, so `biasCorrected` solves it exactly.
 *
 * @example firstOrderBias([0.8], 50, "estimate") // [-0.068]
 */
export function firstOrderBias(
  coefficients: ArrayLike<number>,
  observations: number,
  level: EstimatedLevel,
): Float64Array {
  requireValues("firstOrderBias", "coefficients", coefficients, "no-gaps");
  requireWhole("firstOrderBias", "observations", observations, 1);
  return scaledBias(coefficients, SLOW_TERMS[level]).map((value) => value / observations);
}

function scaledBias(coefficients: ArrayLike<number>, slowTerms: number): Float64Array {
  const p = coefficients.length;
  const phi = (i: number) => (i === 0 ? -1 : coefficients[i - 1]);
  const out = new Float64Array(p);
  let ends = 0; // Σ_{i<j} (φ_i − φ_{p−i})
  for (let j = 1; j <= p; j++) {
    ends += phi(j - 1) - phi(p - j + 1);
    let sum = -j * phi(j) + slowTerms * ends;
    for (let i = j - 2; i >= 0; i -= 2) sum += phi(i);
    for (let i = p + 2 - j - (p % 2); i <= p; i += 2) sum -= phi(i);
    out[j - 1] = sum;
  }
  return out;
}

/**
 * Coefficients φ whose first-order biased expectation is the estimate: φ + bias(φ) = φ̂. For p = 1 with a mean,
 * (nφ̂ + 1)/(n − 3). The answer may lie outside the stationary region, which says that the data do not tell a fading
 * process from a permanent one.
 *
 * Throws `RangeError` when n is too small to solve for φ.
 *
 * @example biasCorrected([0.5859869716709591], 48, "estimate") // [0.647275]
 */
export function biasCorrected(
  coefficients: ArrayLike<number>,
  observations: number,
  level: EstimatedLevel,
): Float64Array {
  requireValues("biasCorrected", "coefficients", coefficients, "no-gaps");
  requireWhole("biasCorrected", "observations", observations, 1);
  const out = new Float64Array(coefficients.length);
  biasCorrector(coefficients.length, observations, level)(coefficients, out);
  return out;
}

/** The correction for one order and length, solved once; the function writes corrected coefficients to its second argument. */
export function biasCorrector(
  order: number,
  observations: number,
  level: EstimatedLevel,
): (coefficients: ArrayLike<number>, out: Float64Array) => void {
  const slowTerms = SLOW_TERMS[level];
  const constant = scaledBias(new Float64Array(order), slowTerms);
  const unit = (i: number) => Float64Array.from({ length: order }, (_, j) => (i === j ? 1 : 0));
  const columns = Array.from({ length: order }, (_, i) => {
    const slope = scaledBias(unit(i), slowTerms);
    return unit(i).map((value, j) => value + (slope[j] - constant[j]) / observations);
  });
  const inverse = columns.map((_, i) => leastSquares(columns, unit(i))?.coefficients);
  if (observations <= order + 3 || inverse.includes(undefined)) {
    throw new RangeError(
      `biasCorrected needs more than ${order + 3} observations for order ${order}, got ${observations}`,
    );
  }
  return (coefficients, out) => {
    out.fill(0);
    for (let i = 0; i < order; i++) {
      const target = coefficients[i] - constant[i] / observations;
      const column = inverse[i] as Float64Array;
      for (let j = 0; j < order; j++) out[j] += column[j] * target;
    }
  };
}
