/**
 * Dense kernels for matrices of at most some twenty rows, stored by row in typed arrays and worked in place:
 * one look makes hundreds of them, so nothing is allocated here.
 */

/**
 * Replaces the lower triangle of the symmetric `matrix` (size × size, row stride `stride`) by its Cholesky
 * factor. A pivot that is not positive is replaced by a tiny one, which removes that direction. Returns ln det.
 */
export function factorInPlace(matrix: Float64Array, size: number, stride = size): number {
  let logDeterminant = 0;
  for (let row = 0; row < size; row++) {
    const start = row * stride;
    for (let column = 0; column < row; column++) {
      const other = column * stride;
      let sum = matrix[start + column];
      for (let k = 0; k < column; k++) sum -= matrix[start + k] * matrix[other + k];
      matrix[start + column] = sum / matrix[other + column];
    }
    const diagonal = matrix[start + row];
    let pivot = diagonal;
    for (let k = 0; k < row; k++) pivot -= matrix[start + k] * matrix[start + k];
    if (!(pivot > 1e-12 * diagonal)) pivot = Math.max(diagonal, 1) * 1e12;
    logDeterminant += Math.log(pivot);
    matrix[start + row] = Math.sqrt(pivot);
  }
  return logDeterminant;
}

/** Solves L x = b in place, L the lower factor. */
export function forwardSolve(
  factor: Float64Array,
  size: number,
  vector: Float64Array,
  offset = 0,
  stride = size,
): void {
  for (let row = 0; row < size; row++) {
    let sum = vector[offset + row];
    for (let k = 0; k < row; k++) sum -= factor[row * stride + k] * vector[offset + k];
    vector[offset + row] = sum / factor[row * stride + row];
  }
}

/** Solves Lᵀ x = b in place, L the lower factor. */
export function backwardSolve(
  factor: Float64Array,
  size: number,
  vector: Float64Array,
  offset = 0,
  stride = size,
): void {
  for (let row = size - 1; row >= 0; row--) {
    let sum = vector[offset + row];
    for (let k = row + 1; k < size; k++) sum -= factor[k * stride + row] * vector[offset + k];
    vector[offset + row] = sum / factor[row * stride + row];
  }
}
