// Symmetric positive definite band matrices: row i holds entries (i, i−d) for d = 0..band at [i*(band+1) + d].

/** Cholesky factor in place; returns log det, or `NaN` when the matrix is not positive definite. */
export function factorBanded(matrix: Float64Array, size: number, band: number): number {
  const stride = band + 1;
  let logDeterminant = 0;
  for (let i = 0; i < size; i++) {
    const row = i * stride;
    for (let j = Math.max(0, i - band); j <= i; j++) {
      const other = j * stride;
      let sum = matrix[row + i - j];
      for (let k = Math.max(0, i - band, j - band); k < j; k++) {
        sum -= matrix[row + i - k] * matrix[other + j - k];
      }
      if (j < i) {
        matrix[row + i - j] = sum / matrix[other];
      } else {
        if (!(sum > 0)) return Number.NaN;
        matrix[row] = Math.sqrt(sum);
        logDeterminant += Math.log(sum);
      }
    }
  }
  return logDeterminant;
}

/** Solves L x = b in place on b[from..from+size). */
export function solveBandedLower(
  factor: Float64Array,
  size: number,
  band: number,
  b: Float64Array,
  from = 0,
): void {
  const stride = band + 1;
  for (let i = 0; i < size; i++) {
    let sum = b[from + i];
    for (let k = Math.max(0, i - band); k < i; k++) sum -= factor[i * stride + i - k] * b[from + k];
    b[from + i] = sum / factor[i * stride];
  }
}

/** Solves Lᵀ x = b in place on b[from..from+size). */
export function solveBandedUpper(
  factor: Float64Array,
  size: number,
  band: number,
  b: Float64Array,
  from = 0,
): void {
  const stride = band + 1;
  for (let i = size - 1; i >= 0; i--) {
    let sum = b[from + i];
    const end = Math.min(size - 1, i + band);
    for (let k = i + 1; k <= end; k++) sum -= factor[k * stride + k - i] * b[from + k];
    b[from + i] = sum / factor[i * stride];
  }
}

/**
 * Entries of the inverse inside the band, in the same layout (Takahashi, Fagan & Chen 1973):
 * O(size·band²) where the whole inverse would take O(size²).
 */
export function invertWithinBand(
  factor: Float64Array,
  size: number,
  band: number,
  inverse: Float64Array,
): void {
  const stride = band + 1;
  for (let j = size - 1; j >= 0; j--) {
    const pivot = factor[j * stride];
    const end = Math.min(size - 1, j + band);
    for (let i = end; i >= j; i--) {
      let sum = i === j ? 1 / pivot : 0;
      for (let k = j + 1; k <= end; k++) {
        const high = Math.max(k, i);
        sum -= factor[k * stride + k - j] * inverse[high * stride + Math.abs(k - i)];
      }
      inverse[i * stride + i - j] = sum / pivot;
    }
  }
}
