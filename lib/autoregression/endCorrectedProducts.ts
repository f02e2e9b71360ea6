/** Number of entries that `endCorrectedProducts` writes: the pairs 0 ≤ i ≤ j ≤ order. */
export function productCount(order: number): number {
  return ((order + 1) * (order + 2)) / 2;
}

/**
 * The sums that make the exact AR likelihood a small quadratic form. With u = (1, −φ_1, …, −φ_p) and V the
 * covariance matrix of n ≥ p + 1 values in units of σ²,
 *
 *   aᵀ V⁻¹ b = Σ_{i,j} u_i u_j D_ij,  D_ij = Σ_{t=1}^{n−i−j} a_{t+i} b_{t+j}
 *
 * (Box & Jenkins 1976, appendix A7.5), so one pass over the data serves every φ. Written out for i ≤ j at
 * consecutive places from `offset`, row by row, entries off the diagonal holding D_ij + D_ji. Where n < i + j the
 * sum runs backwards with a minus sign, which the subtraction of end terms below gives by itself.
 */
export function endCorrectedProducts(
  a: Float64Array,
  b: Float64Array,
  order: number,
  out: Float64Array,
  offset: number,
): void {
  const n = a.length;
  const same = a === b;
  for (let lag = 0; lag <= order; lag++) {
    let sum = 0;
    for (let s = 0; s + lag < n; s++) sum += a[s] * b[s + lag];
    if (lag > 0) {
      if (same) sum *= 2;
      else for (let s = 0; s + lag < n; s++) sum += b[s] * a[s + lag];
    }
    for (let i = 0; i + lag <= order; i++) {
      out[offset + place(i, i + lag, order)] = sum;
      // Going from D_{i,j} to D_{i+1,j+1} drops one product at each end.
      const last = n - lag - 1 - i;
      sum -= a[i] * b[i + lag] + a[last] * b[last + lag];
      if (lag > 0) sum -= b[i] * a[i + lag] + b[last] * a[last + lag];
    }
  }
}

function place(i: number, j: number, order: number): number {
  return i * (order + 1) - (i * (i - 1)) / 2 + j - i;
}

/** Σ u_i u_j D_ij. */
export function quadraticForm(
  products: Float64Array,
  offset: number,
  u: Float64Array,
  order: number,
): number {
  let sum = 0;
  let at = offset;
  for (let i = 0; i <= order; i++) {
    let row = 0;
    for (let j = i; j <= order; j++) row += products[at++] * u[j];
    sum += u[i] * row;
  }
  return sum;
}

/** Adds the derivative of the quadratic form with respect to u, times `factor`, to `gradient` (order + 1). */
export function addQuadraticGradient(
  products: Float64Array,
  offset: number,
  u: Float64Array,
  order: number,
  factor: number,
  gradient: Float64Array,
): void {
  let at = offset;
  for (let i = 0; i <= order; i++) {
    gradient[i] += 2 * factor * products[at++] * u[i];
    for (let j = i + 1; j <= order; j++) {
      const product = factor * products[at++];
      gradient[i] += product * u[j];
      gradient[j] += product * u[i];
    }
  }
}
