// Symmetric positive definite matrices, stored by row in one Float64Array of size*size entries.

/**
 * Cholesky factor L (A = L Lᵀ) written over the lower triangle of `matrix`; the upper one is left alone.
 * Returns false, with the matrix spoiled, when a pivot is not positive beyond rounding (singular or indefinite).
 */
export function factorCholesky(matrix: Float64Array, size: number): boolean {
  for (let j = 0; j < size; j++) {
    const original = matrix[j * size + j];
    let pivot = original;
    for (let k = 0; k < j; k++) pivot -= matrix[j * size + k] ** 2;
    if (!(pivot > original * 1e-15)) return false;
    const root = Math.sqrt(pivot);
    matrix[j * size + j] = root;
    for (let i = j + 1; i < size; i++) {
      let sum = matrix[i * size + j];
      for (let k = 0; k < j; k++) sum -= matrix[i * size + k] * matrix[j * size + k];
      matrix[i * size + j] = sum / root;
    }
  }
  return true;
}

/** Solves L Lᵀ x = b in place, `factor` being the result of `factorCholesky`. */
export function solveCholesky(factor: Float64Array, size: number, b: Float64Array): void {
  for (let i = 0; i < size; i++) {
    let sum = b[i];
    for (let k = 0; k < i; k++) sum -= factor[i * size + k] * b[k];
    b[i] = sum / factor[i * size + i];
  }
  for (let i = size - 1; i >= 0; i--) {
    let sum = b[i];
    for (let k = i + 1; k < size; k++) sum -= factor[k * size + i] * b[k];
    b[i] = sum / factor[i * size + i];
  }
}

/** Inverse of a symmetric positive definite matrix, or `undefined` when it is singular. Leaves the input alone. */
export function invertPositive(matrix: Float64Array, size: number): Float64Array | undefined {
  const factor = Float64Array.from(matrix);
  if (!factorCholesky(factor, size)) return undefined;
  const inverse = new Float64Array(size * size);
  const column = new Float64Array(size);
  for (let j = 0; j < size; j++) {
    column.fill(0);
    column[j] = 1;
    solveCholesky(factor, size, column);
    for (let i = 0; i < size; i++) inverse[i * size + j] = column[i];
  }
  return inverse;
}
