import { backwardSolve, factorInPlace, forwardSolve } from "../../lib/drift/smallMatrix.ts";

/**
 * Linear regression of the `probability` quantile of `response` on `rows` (Koenker and Bassett 1978), by Newton
 * steps on the check function smoothed with a logistic kernel whose width shrinks to `width`.
 */
export function quantileRegression(
  rows: readonly (readonly number[])[],
  response: ArrayLike<number>,
  probability: number,
  width = 0.08,
): Float64Array {
  const size = rows[0].length;
  const beta = new Float64Array(size);
  const sorted = Float64Array.from(response).sort();
  beta[0] = sorted[Math.floor(probability * sorted.length)];
  for (const band of [1, 0.5, 0.25, 0.15, width, width, width]) {
    for (let step = 0; step < 25; step++) {
      const gradient = new Float64Array(size);
      const curvature = new Float64Array(size * size);
      for (let n = 0; n < rows.length; n++) {
        const row = rows[n];
        let rest = response[n];
        for (let i = 0; i < size; i++) rest -= beta[i] * row[i];
        const above = 1 / (1 + Math.exp(-rest / band));
        const slope = above - (1 - probability);
        const bend = (above * (1 - above)) / band;
        for (let i = 0; i < size; i++) {
          gradient[i] += slope * row[i];
          if (bend > 1e-9) for (let j = 0; j <= i; j++) curvature[i * size + j] += bend * row[i] * row[j];
        }
      }
      for (let i = 0; i < size; i++) curvature[i * size + i] += 1e-3;
      factorInPlace(curvature, size);
      forwardSolve(curvature, size, gradient);
      backwardSolve(curvature, size, gradient);
      let largest = 0;
      for (let i = 0; i < size; i++) {
        const move = Math.max(-0.5, Math.min(0.5, gradient[i]));
        beta[i] += move;
        largest = Math.max(largest, Math.abs(move));
      }
      if (largest < 1e-4) break;
    }
  }
  return beta;
}
