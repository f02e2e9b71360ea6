import { type LeastSquares, leastSquares } from "../numeric/leastSquares.ts";
import { tabulate } from "../numeric/tabulate.ts";

/** A regression of x_t on its own past. */
export interface ConditionalLeastSquares {
  readonly regression: LeastSquares;
  /** Indexes t of the rows used. */
  readonly rows: Int32Array;
  /** φ_1..φ_p. */
  readonly coefficients: Float64Array;
  /** Constant of the regression; 0 without one. */
  readonly intercept: number;
}

/**
 * Conditional least squares: x_t = c + Σ φ_j x_{t−j} + e_t over rows t ≥ max(order, firstRow) whose value and
 * lags are all observed (a row that touches a gap is left out). By QR. The fit may be explosive: least squares
 * does not force stationarity.
 *
 * The values are centred before the regression, so an offset of 1e9 costs no digits. Returns `undefined` when
 * the rows cannot tell the coefficients apart.
 */
export function conditionalLeastSquares(
  values: ArrayLike<number>,
  order: number,
  centre: number,
  withIntercept: boolean,
  firstRow = order,
): ConditionalLeastSquares | undefined {
  const rows: number[] = [];
  for (let t = Math.max(order, firstRow); t < values.length; t++) {
    let complete = true;
    for (let j = 0; j <= order; j++) complete &&= !Number.isNaN(values[t - j]);
    if (complete) rows.push(t);
  }
  const shift = withIntercept ? centre : 0;
  const lagged = (lag: number) => tabulate(rows.length, (row) => values[rows[row] - lag] - shift);
  const columns: Float64Array[] = withIntercept ? [new Float64Array(rows.length).fill(1)] : [];
  for (let j = 1; j <= order; j++) columns.push(lagged(j));
  const regression = leastSquares(columns, lagged(0));
  if (regression === undefined) return undefined;
  const coefficients = regression.coefficients.slice(withIntercept ? 1 : 0);
  const persistence = coefficients.reduce((sum, value) => sum + value, 0);
  const intercept = withIntercept ? regression.coefficients[0] + shift * (1 - persistence) : 0;
  return { regression, rows: Int32Array.from(rows), coefficients, intercept };
}
