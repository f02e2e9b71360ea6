import { requirePositive, requireValues, requireWhole } from "./checks.ts";
import { coefficientsToPartials, stepUp } from "./partials.ts";

/**
 * Theoretical autocovariances γ_0..γ_maxLag of a stationary AR process of any order.
 * γ_0 = σ²/Π(1 − π_k²); lags up to p by the Levinson recursion run forwards from the partial autocorrelations,
 * γ_k = Σ_{j<k} φ^(k−1)_j γ_{k−j} + π_k v_{k−1}, later ones by γ_k = Σ φ_j γ_{k−j}
 * (Brockwell & Davis 1991, sections 3.3 and 5.2). No equations are solved, so near-unit roots lose nothing.
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
  const p = partials.length;
  let variance = innovationVariance;
  for (let k = 0; k < p; k++) variance /= (1 - partials[k]) * (1 + partials[k]);
  const out = new Float64Array(maxLag + 1);
  out[0] = variance;
  const predictor = new Float64Array(p);
  for (let k = 1; k <= Math.min(p, maxLag); k++) {
    let sum = partials[k - 1] * variance;
    for (let j = 1; j < k; j++) sum += predictor[j - 1] * out[k - j];
    out[k] = sum;
    stepUp(predictor, k, partials[k - 1]);
    variance *= (1 - partials[k - 1]) * (1 + partials[k - 1]);
  }
  for (let k = p + 1; k <= maxLag; k++) {
    for (let j = 1; j <= p; j++) out[k] += coefficients[j - 1] * out[k - j];
  }
  return out;
}
