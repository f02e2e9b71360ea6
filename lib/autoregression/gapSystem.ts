import {
  factorBanded,
  invertWithinBand,
  solveBandedLower,
  solveBandedUpper,
} from "../numeric/bandedCholesky.ts";

/**
 * The gaps of a series as a small band system. With Q = V⁻¹ (V the covariance of all n values in units of σ², gaps
 * included) and Q_mm its part at the missing places, for a series x filled in any way at the gaps and g = Q_m· x:
 *
 *   best fill x − Q_mm⁻¹ g;  Sum of squares of the observed part xᵀQx − gᵀQ_mm⁻¹g;  log det V_oo = log det V + log det Q_mm
 *
 * (Ljung 1989; Rue & Held 2005, section 2.3.1). Q has bandwidth p and
 * Q_{s,s+d} = Σ_{i≤s} u_i u_{i+d} − Σ_{i≥n−s−d} u_i u_{i+d} (0-based s, 0 ≤ i ≤ p − d), from the formula of
 * Gohberg & Semencul (1972); so a likelihood with m gaps costs O(m p²). Buffers are made once.
 */
export class GapSystem {
  readonly missing: Int32Array;
  readonly length: number;
  readonly order: number;
  readonly factor: Float64Array;
  readonly inverse: Float64Array;
  /** Row d, p + 1 entries: Σ_{i≤k} u_i u_{i+d} at k. */
  readonly #prefix: Float64Array;
  readonly #weights: Float64Array;

  /** `missing` holds the ascending 0-based places of the gaps in a series of `length` values. */
  constructor(length: number, missing: Int32Array, order: number) {
    this.length = length;
    this.missing = missing;
    this.order = order;
    this.factor = new Float64Array(missing.length * (order + 1));
    this.inverse = new Float64Array(missing.length * (order + 1));
    this.#prefix = new Float64Array((order + 1) * (order + 1));
    this.#weights = new Float64Array((order + 1) * (order + 2));
  }

  /** Takes u = (1, −φ) and factors Q_mm; returns log det Q_mm, `NaN` where rounding spoiled it. */
  factorAt(u: Float64Array): number {
    const { missing, order, factor } = this;
    const stride = order + 1;
    for (let d = 0; d <= order; d++) {
      let sum = 0;
      for (let i = 0; i + d <= order; i++) {
        sum += u[i] * u[i + d];
        this.#prefix[d * stride + i] = sum;
      }
    }
    factor.fill(0);
    for (let a = 0; a < missing.length; a++) {
      for (let b = a; b >= 0 && a - b <= order; b--) {
        const distance = missing[a] - missing[b];
        if (distance > order) break;
        factor[a * stride + a - b] = this.#precision(missing[b], distance);
      }
    }
    return factorBanded(factor, missing.length, order);
  }

  /** Q_{s,s+d}. */
  #precision(s: number, d: number): number {
    const { order, length } = this;
    const row = d * (order + 1);
    const top = order - d;
    let sum = this.#prefix[row + Math.min(s, top)];
    const cut = length - s - d - 1; // products beyond this index reach past the end
    if (cut < top) sum -= this.#prefix[row + top] - this.#prefix[row + cut];
    return sum;
  }

  /** g = Q_m· x, written from `offset`. */
  project(x: Float64Array, out: Float64Array, offset: number): void {
    const { missing, order, length } = this;
    for (let a = 0; a < missing.length; a++) {
      const s = missing[a];
      let sum = this.#precision(s, 0) * x[s];
      for (let d = 1; d <= order; d++) {
        if (s + d < length) sum += this.#precision(s, d) * x[s + d];
        if (s - d >= 0) sum += this.#precision(s - d, d) * x[s - d];
      }
      out[offset + a] = sum;
    }
  }

  /** L⁻¹ b in place. */
  solveLower(b: Float64Array, offset: number): void {
    solveBandedLower(this.factor, this.missing.length, this.order, b, offset);
  }

  /** L⁻ᵀ b in place. */
  solveUpper(b: Float64Array, offset: number): void {
    solveBandedUpper(this.factor, this.missing.length, this.order, b, offset);
  }

  /** Entries of Q_mm⁻¹ inside the band, row a holding (a, a−d) at d; `factorAt` comes first. */
  inverseWithinBand(): Float64Array {
    invertWithinBand(this.factor, this.missing.length, this.order, this.inverse);
    return this.inverse;
  }

  /** Adds the derivative of log det Q_mm with respect to u to `gradient`; `factorAt` comes first. */
  addLogDeterminantGradient(u: Float64Array, gradient: Float64Array): void {
    const { missing, order, length } = this;
    const stride = order + 1;
    const inverse = this.inverseWithinBand();
    // #weights row d: weight of each product u_i u_{i+d} in Σ (Q_mm⁻¹)_{ab} Q_ab, first as differences along i.
    const width = order + 2;
    const weights = this.#weights;
    weights.fill(0);
    for (let a = 0; a < missing.length; a++) {
      for (let b = a; b >= 0 && a - b <= order; b--) {
        const d = missing[a] - missing[b];
        if (d > order) break;
        const weight = (a === b ? 1 : 2) * inverse[a * stride + a - b];
        const s = missing[b];
        weights[d * width] += weight;
        if (s < order - d) weights[d * width + s + 1] -= weight;
        const cut = length - s - d - 1;
        if (cut < order - d) weights[d * width + cut + 1] -= weight;
      }
    }
    for (let d = 0; d <= order; d++) {
      let weight = 0;
      for (let i = 0; i + d <= order; i++) {
        weight += weights[d * width + i];
        gradient[i] += weight * u[i + d];
        gradient[i + d] += weight * u[i];
      }
    }
  }
}
