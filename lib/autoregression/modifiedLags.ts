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
  const end = detrended.length;
  const changes = new Float64Array(end);
  for (let time = 1; time < end; time++) changes[time] = detrended[time] - detrended[time - 1];
  const columnOf = (lag: number) => (lag === 0 ? size - 1 : lag);
  for (let lag = 0; lag <= longest; lag++) {
    let withLevel = 0;
    for (let time = first; time < end; time++) withLevel += changes[time - lag] * detrended[time - 1];
    products[columnOf(lag) * size] = withLevel;
  }
  for (let time = first; time < end; time++) products[0] += detrended[time - 1] ** 2;
  for (let apart = 0; apart <= longest; apart++) {
    let sum = 0;
    for (let time = first; time < end; time++) sum += changes[time] * changes[time - apart];
    // One lag on, both changes come from one time earlier: a product enters at the start and one leaves at the end.
    for (let lag = 0; lag + apart <= longest; lag++) {
      const [row, column] = lag === 0 ? [size - 1, columnOf(apart)] : [lag + apart, lag];
      products[row * size + column] = sum;
      const before = first - 1 - lag;
      const last = end - 1 - lag;
      if (before - apart > 0)
        sum += changes[before] * changes[before - apart] - changes[last] * changes[last - apart];
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
