/**
 * Moving-average weights ψ_0..ψ_{count−1} of φ: ψ_0 = 1, ψ_j = Σ φ_i ψ_{j−i} (Brockwell and Davis 1991, section 3.3):
 * the share of a shock that is left j periods later. For coefficients that stand in facts, where no fit is at hand.
 *
 * @example fadingWeights([0.5], 3) // [1, 0.5, 0.25]
 */
export function fadingWeights(coefficients: readonly number[], count: number): number[] {
  const weights = [1];
  for (let lag = 1; lag < count; lag++) {
    let sum = 0;
    for (let back = 1; back <= Math.min(lag, coefficients.length); back++) {
      sum += coefficients[back - 1] * weights[lag - back];
    }
    weights.push(sum);
  }
  return weights.slice(0, count);
}
