/** The three criteria; smaller is better. */
export type Criterion = "aic" | "aicc" | "bic";

/**
 * Information criteria from a maximised log-likelihood (Akaike 1974; Hurvich & Tsai 1989; Schwarz 1978).
 * `parameters` counts everything estimated, the innovation variance and the mean included; `observations`
 * counts observed values. AICc, whose penalty is
 * 2kn/(n − k − 1), is infinite when too few values are left to correct with (n ≤ k + 1).
 *
 * @example informationCriteria(-29.3792, 3, 48).aic // 64.7584
 */
export function informationCriteria(
  logLikelihood: number,
  parameters: number,
  observations: number,
): Record<Criterion, number> {
  return {
    aic: -2 * logLikelihood + criterionPenalty("aic", parameters, observations),
    aicc: -2 * logLikelihood + criterionPenalty("aicc", parameters, observations),
    bic: -2 * logLikelihood + criterionPenalty("bic", parameters, observations),
  };
}

/** What a criterion adds to −2 log-likelihood. */
export function criterionPenalty(criterion: Criterion, parameters: number, observations: number): number {
  if (criterion === "bic") return parameters * Math.log(observations);
  if (criterion === "aic") return 2 * parameters;
  const spare = observations - parameters - 1;
  return spare > 0 ? (2 * parameters * observations) / spare : Number.POSITIVE_INFINITY;
}

/**
 * Weights exp(−Δ/2) of candidate models, summing to one (Akaike weights: Burnham & Anderson 2002, section 2.9;
 * with BIC values, approximate posterior probabilities). Infinite values get weight zero.
 *
 * @example criterionWeights([10, 10]) // [0.5, 0.5]
 */
export function criterionWeights(values: ArrayLike<number>): Float64Array {
  let best = Number.POSITIVE_INFINITY;
  for (let i = 0; i < values.length; i++) best = Math.min(best, values[i]);
  const weights = new Float64Array(values.length);
  let sum = 0;
  for (let i = 0; i < values.length; i++) {
    weights[i] = Number.isFinite(best) ? Math.exp((best - values[i]) / 2) : 1;
    sum += weights[i];
  }
  for (let i = 0; i < weights.length; i++) weights[i] /= sum;
  return weights;
}
