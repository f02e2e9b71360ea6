import { stepUp } from "./partials.ts";

/**
 * Theoretical autocovariances γ_0..γ_maxLag of a stationary process given by its coefficients and their partial
 * autocorrelations, unchecked: γ_0 = σ²/Π(1 − π_k²); lags up to p by the Levinson recursion run forwards,
 * γ_k = Σ_{j<k} φ^(k−1)_j γ_{k−j} + π_k v_{k−1}, later ones by γ_k = Σ φ_j γ_{k−j}
 * (Brockwell & Davis 1991, sections 3.3 and 5.2). No equations are solved, so near-unit roots lose nothing.
 */
export function processAutocovariances(
  coefficients: ArrayLike<number>,
  partials: ArrayLike<number>,
  innovationVariance: number,
  maxLag: number,
): Float64Array {
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
