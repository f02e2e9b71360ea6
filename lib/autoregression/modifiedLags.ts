import { factorCholesky } from "../numeric/cholesky.ts";

/**
 * Lagged changes for a Dickey–Fuller regression by the modified AIC of Ng & Perron (2001): the least
 * log σ̂² + 2(τ + k)/rows, τ = (ρ̂ − 1)² Σ x_{t−1}²/σ̂², for k = 0..`longest`, all on one sample.
 *
 * The regressions are nested, so one matrix of products is factored once (Cholesky): its leading blocks are those of the
 * smaller regressions. Only the choice is made on it; the test itself is computed by orthogonal factors.
 *
 * `detrended` holds no gaps and more than `longest` + 2 values.
 */
export function modifiedLags(detrended: Float64Array, longest: number): number {
  const first = longest + 1;
  const rows = detrended.length - first;
  // Columns: the level before, the changes 1..longest before, and last the change itself.
  const size = longest + 2;
  const products = new Float64Array(size * size);
  const at = (column: number, time: number) => {
    if (column === 0) return detrended[time - 1];
    const lag = column === size - 1 ? 0 : column;
    return detrended[time - lag] - detrended[time - lag - 1];
  };
  for (let row = 0; row < size; row++) {
    for (let column = 0; column <= row; column++) {
      let sum = 0;
      for (let time = first; time < detrended.length; time++) sum += at(row, time) * at(column, time);
      products[row * size + column] = sum;
    }
  }
  const power = products[0];
  const total = products[size * size - 1];
  // Columns that follow from each other, or leave nothing over, mean an exact rule: no lags are needed to see it.
  if (!factorCholesky(products, size)) return 0;
  const last = (size - 1) * size;
  let explained = 0;
  let best = 0;
  let least = Number.POSITIVE_INFINITY;
  for (let lags = 0; lags <= longest; lags++) {
    explained += products[last + lags] ** 2;
    const variance = (total - explained) / rows;
    if (!(variance > 0)) break;
    const change = levelCoefficient(products, size, lags + 1);
    const score = Math.log(variance) + (2 * ((change ** 2 * power) / variance + lags)) / rows;
    if (score < least) {
      least = score;
      best = lags;
    }
  }
  return best;
}

/** First coefficient of the regression on the leading `count` columns: Lᵀ b = the last row of the factor, solved upwards. */
function levelCoefficient(factor: Float64Array, size: number, count: number): number {
  const last = (size - 1) * size;
  const solution = new Float64Array(count);
  for (let i = count - 1; i >= 0; i--) {
    let sum = factor[last + i];
    for (let k = i + 1; k < count; k++) sum -= factor[k * size + i] * solution[k];
    solution[i] = sum / factor[i * size + i];
  }
  return solution[0];
}
