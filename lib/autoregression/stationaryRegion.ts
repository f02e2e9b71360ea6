/**
 * The stationary AR(p) processes as all of ℝ^p, by x = artanh π of the partial autocorrelations (Barndorff-Nielsen &
 * Schou 1973), with the derivative of the way from x to φ run backwards. Buffers are made once.
 */
export class StationaryRegion {
  readonly order: number;
  /** (1, −φ_1, …, −φ_p) at the present point. */
  readonly u: Float64Array;
  readonly #partials: Float64Array;
  /** Row k−1 holds the coefficients of order k. */
  readonly #orders: Float64Array;

  constructor(order: number) {
    this.order = order;
    this.u = new Float64Array(order + 1);
    this.u[0] = 1;
    this.#partials = new Float64Array(order);
    this.#orders = new Float64Array(order * order);
  }

  /** Goes to x and returns −Σ k log(1 − π_k²), the log determinant of the covariance of p values over σ². */
  moveTo(x: Float64Array): number {
    const p = this.order;
    const orders = this.#orders;
    let logDeterminant = 0;
    for (let k = 1; k <= p; k++) {
      const size = Math.abs(x[k - 1]);
      // −log(1 − tanh²x) = 2 log cosh x, without cancellation.
      logDeterminant += 2 * k * (size + Math.log1p(Math.exp(-2 * size)) - Math.LN2);
      const partial = Math.tanh(x[k - 1]);
      this.#partials[k - 1] = partial;
      const row = (k - 1) * p;
      for (let j = 0; j < k - 1; j++) {
        orders[row + j] = orders[row - p + j] - partial * orders[row - p + k - 2 - j];
      }
      orders[row + k - 1] = partial;
    }
    for (let j = 0; j < p; j++) this.u[j + 1] = -orders[(p - 1) * p + j];
    return logDeterminant;
  }

  /** Adds the slope of that log determinant to a derivative with respect to x. */
  addPenaltySlope(derivative: Float64Array): void {
    for (let k = 1; k <= this.order; k++) derivative[k - 1] += 2 * k * this.#partials[k - 1];
  }

  /** Turns a derivative with respect to φ into one with respect to x, in place: Durbin's recursion in reverse, O(p²). */
  pullBack(derivative: Float64Array): void {
    const p = this.order;
    const orders = this.#orders;
    for (let k = p; k >= 1; k--) {
      const partial = this.#partials[k - 1];
      const before = (k - 2) * p;
      let sum = derivative[k - 1];
      for (let j = 0; j < k - 1; j++) sum -= derivative[j] * orders[before + k - 2 - j];
      for (let i = 0, j = k - 2; i <= j; i++, j--) {
        const low = derivative[i];
        const high = derivative[j];
        derivative[i] = low - partial * high;
        if (i !== j) derivative[j] = high - partial * low;
      }
      derivative[k - 1] = sum * (1 - partial) * (1 + partial);
    }
  }
}
