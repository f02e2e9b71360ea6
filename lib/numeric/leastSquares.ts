/** What a least-squares fit of one response on a few columns gives. */
export interface LeastSquares {
  readonly coefficients: Float64Array;
  readonly residuals: Float64Array;
  readonly residualSumOfSquares: number;
  /** (XᵀX)⁻¹ by row, size columns². */
  readonly unscaledCovariance: Float64Array;
}

/**
 * Ordinary least squares by Householder QR (Golub & Van Loan 2013, section 5.2): full double accuracy where
 * normal equations would lose half the digits. Each column is scaled to unit length first, so columns of very
 * different size (a trend beside a constant) do no harm.
 *
 * `columns` holds one array of n values a column; no gaps. Returns `undefined` when the columns are linearly
 * dependent to working precision or outnumber the rows.
 */
export function leastSquares(
  columns: readonly ArrayLike<number>[],
  response: ArrayLike<number>,
): LeastSquares | undefined {
  const n = response.length;
  const k = columns.length;
  if (k > n) return undefined;
  const scales = new Float64Array(k);
  const work = columns.map((column, j) => {
    const copy = Float64Array.from(column);
    scales[j] = lengthOf(copy);
    for (let i = 0; i < n; i++) copy[i] /= scales[j];
    return copy;
  });
  const y = Float64Array.from(response);
  const reflectors: { vector: Float64Array; twoOverNorm: number }[] = [];
  for (let j = 0; j < k; j++) {
    if (!(scales[j] > 0)) return undefined;
    const column = work[j];
    let norm = 0;
    for (let i = j; i < n; i++) norm += column[i] * column[i];
    norm = Math.sqrt(norm);
    if (!(norm > 1e-13)) return undefined;
    const alpha = column[j] > 0 ? -norm : norm;
    const vector = new Float64Array(n);
    for (let i = j; i < n; i++) vector[i] = column[i];
    vector[j] -= alpha;
    const twoOverNorm = 1 / (norm * (norm + Math.abs(column[j])));
    for (let c = j; c < k; c++) reflect(work[c], vector, twoOverNorm, j);
    reflect(y, vector, twoOverNorm, j);
    reflectors.push({ vector, twoOverNorm });
  }
  const coefficients = new Float64Array(k);
  for (let j = k - 1; j >= 0; j--) {
    let sum = y[j];
    for (let c = j + 1; c < k; c++) sum -= work[c][j] * coefficients[c];
    coefficients[j] = sum / work[j][j];
  }
  // Residuals are the reflected response without its first k entries, reflected back.
  const residuals = Float64Array.from(y);
  residuals.fill(0, 0, k);
  let residualSumOfSquares = 0;
  for (let i = k; i < n; i++) residualSumOfSquares += y[i] * y[i];
  for (let j = k - 1; j >= 0; j--) reflect(residuals, reflectors[j].vector, reflectors[j].twoOverNorm, j);
  for (let j = 0; j < k; j++) coefficients[j] /= scales[j];
  return {
    coefficients,
    residuals,
    residualSumOfSquares,
    unscaledCovariance: covarianceFromTriangle(work, scales),
  };
}

function reflect(target: Float64Array, vector: Float64Array, twoOverNorm: number, from: number): void {
  let product = 0;
  for (let i = from; i < target.length; i++) product += vector[i] * target[i];
  product *= twoOverNorm;
  for (let i = from; i < target.length; i++) target[i] -= product * vector[i];
}

/** Euclidean length, in units of the largest entry so that tiny or huge values neither under- nor overflow. */
function lengthOf(column: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < column.length; i++) largest = Math.max(largest, Math.abs(column[i]));
  if (!(largest > 0) || largest === Number.POSITIVE_INFINITY) return largest;
  let squares = 0;
  for (let i = 0; i < column.length; i++) squares += (column[i] / largest) ** 2;
  return largest * Math.sqrt(squares);
}

function covarianceFromTriangle(triangle: Float64Array[], scales: Float64Array): Float64Array {
  const k = triangle.length;
  const inverse = new Float64Array(k * k);
  for (let j = 0; j < k; j++) {
    inverse[j * k + j] = 1 / triangle[j][j];
    for (let i = j - 1; i >= 0; i--) {
      let sum = 0;
      for (let c = i + 1; c <= j; c++) sum -= triangle[c][i] * inverse[c * k + j];
      inverse[i * k + j] = sum / triangle[i][i];
    }
  }
  const covariance = new Float64Array(k * k);
  for (let i = 0; i < k; i++) {
    for (let j = 0; j < k; j++) {
      let sum = 0;
      for (let c = Math.max(i, j); c < k; c++) sum += inverse[i * k + c] * inverse[j * k + c];
      covariance[i * k + j] = sum / (scales[i] * scales[j]);
    }
  }
  return covariance;
}
