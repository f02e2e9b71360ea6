import { backwardSolve, factorInPlace, forwardSolve } from "./smallMatrix.ts";
import { type TermPlan, termColumns, writeTerms } from "./terms.ts";

/** Writes [terms, lags 1..order] of row `time` into `out`. */
export function writeRow(
  out: Float64Array,
  values: Float64Array,
  time: number,
  order: number,
  plan: TermPlan,
  origin: number,
): void {
  writeTerms(out, 0, plan, time, origin, origin);
  const terms = termColumns(plan);
  for (let lag = 1; lag <= order; lag++) out[terms + lag - 1] = values[time - lag];
}

export interface NestedFit {
  /** Residual sum of squares with 0..maxOrder lags, all on the same rows. */
  readonly sumsOfSquares: Float64Array;
  readonly rows: number;
}

/** Residual sums of squares of the regressions on terms and 0..maxOrder lags, from one Cholesky factor. */
export function nestedSumsOfSquares(
  values: Float64Array,
  isGap: Uint8Array,
  maxOrder: number,
  plan: TermPlan,
): NestedFit {
  const terms = termColumns(plan);
  const size = terms + maxOrder + 1;
  const matrix = new Float64Array(size * size);
  const row = new Float64Array(size);
  let rows = 0;
  for (let time = maxOrder; time < values.length; time++) {
    if (isGap[time]) continue;
    writeRow(row, values, time, maxOrder, plan, values.length);
    row[size - 1] = values[time];
    for (let i = 0; i < size; i++) for (let j = 0; j <= i; j++) matrix[i * size + j] += row[i] * row[j];
    rows++;
  }
  let rest = matrix[size * size - 1];
  factorInPlace(matrix, size);
  const sumsOfSquares = new Float64Array(maxOrder + 1);
  for (let column = 0; column < size - 1; column++) {
    rest -= matrix[(size - 1) * size + column] ** 2;
    if (column >= terms - 1) sumsOfSquares[column - terms + 1] = Math.max(rest, 0);
  }
  return { sumsOfSquares, rows };
}

export interface LeastSquares {
  /** Coefficients of the terms, then φ_1..φ_p. */
  readonly coefficients: Float64Array;
  /** One a value; 0 for the first `order` values. */
  readonly residuals: Float64Array;
  readonly rows: number;
  /** Of the residuals, divided by rows − columns. */
  readonly deviation: number;
}

/** Least squares of each value on terms and `order` lags; rows whose own value is a gap are left out. */
export function leastSquares(
  values: Float64Array,
  isGap: Uint8Array,
  order: number,
  plan: TermPlan,
): LeastSquares {
  const columns = termColumns(plan) + order;
  const matrix = new Float64Array(columns * columns);
  const coefficients = new Float64Array(columns);
  const row = new Float64Array(columns);
  let rows = 0;
  for (let time = order; time < values.length; time++) {
    if (isGap[time]) continue;
    writeRow(row, values, time, order, plan, values.length);
    for (let i = 0; i < columns; i++) {
      coefficients[i] += row[i] * values[time];
      for (let j = 0; j <= i; j++) matrix[i * columns + j] += row[i] * row[j];
    }
    rows++;
  }
  factorInPlace(matrix, columns);
  forwardSolve(matrix, columns, coefficients);
  backwardSolve(matrix, columns, coefficients);
  const residuals = new Float64Array(values.length);
  let sum = 0;
  for (let time = order; time < values.length; time++) {
    writeRow(row, values, time, order, plan, values.length);
    let residual = values[time];
    for (let i = 0; i < columns; i++) residual -= coefficients[i] * row[i];
    residuals[time] = residual;
    if (!isGap[time]) sum += residual * residual;
  }
  return { coefficients, residuals, rows, deviation: Math.sqrt(sum / Math.max(1, rows - columns)) };
}
