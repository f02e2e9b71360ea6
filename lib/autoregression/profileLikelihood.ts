import { factorCholesky, solveCholesky } from "../numeric/cholesky.ts";
import {
  addQuadraticGradient,
  endCorrectedProducts,
  productCount,
  quadraticForm,
} from "./endCorrectedProducts.ts";
import { GapSystem } from "./gapSystem.ts";
import type { LikelihoodDesign } from "./likelihoodDesign.ts";
import { StationaryRegion } from "./stationaryRegion.ts";

/**
 * −2 log-likelihood of an AR(p), up to constants, with regression and variance profiled out:
 *
 *   f = n log S − Σ k log(1 − π_k²) + log det Q_mm
 *
 * as a function of x = artanh π (Barndorff-Nielsen & Schou 1973), so every point is stationary; n counts observed
 * values. S is the generalised least-squares sum of squares. The derivative is analytic: envelope theorem for the
 * regression and the fill of the gaps, then the Durbin recursion in reverse. Without gaps an evaluation costs
 * O(k²p²) whatever the length of the series. Every buffer is made once, in the constructor.
 */
export class ProfileLikelihood {
  readonly order: number;
  /** (1, −φ_1, …, −φ_p) of the last evaluation. */
  readonly u: Float64Array;
  /** Regression coefficients of the orthogonal columns at the last evaluation. */
  readonly beta: Float64Array;
  /** Cholesky factor of XᵀV⁻¹X (k²) at the last evaluation. */
  readonly information: Float64Array;
  /** S at the last evaluation, in units of the design's scale. */
  sumOfSquares = 0;
  readonly #design: LikelihoodDesign;
  readonly #products: Float64Array;
  readonly #gapSystem: GapSystem | undefined;
  readonly #projections: Float64Array;
  readonly #gram: Float64Array;
  readonly #filled: Float64Array;
  readonly #filledProducts: Float64Array;
  readonly #region: StationaryRegion;
  readonly #slope: Float64Array;

  constructor(design: LikelihoodDesign, order: number) {
    const width = design.series.length;
    const columns = width - 1;
    const count = productCount(order);
    const gaps = design.missing.length;
    this.#design = design;
    this.order = order;
    this.#region = new StationaryRegion(order);
    this.u = this.#region.u;
    this.beta = new Float64Array(columns);
    this.information = new Float64Array(columns * columns);
    this.#products = new Float64Array(((width * (width + 1)) / 2) * count);
    this.#gapSystem = gaps > 0 ? new GapSystem(design.length, design.missing, order) : undefined;
    this.#projections = new Float64Array(width * gaps);
    this.#gram = new Float64Array(width * width);
    this.#filled = new Float64Array(gaps > 0 ? design.length : 0);
    this.#filledProducts = new Float64Array(count);
    this.#slope = new Float64Array(order + 1);
    let offset = 0;
    for (let a = 0; a < width; a++) {
      for (let b = a; b < width; b++) {
        endCorrectedProducts(design.series[a], design.series[b], order, this.#products, offset);
        offset += count;
      }
    }
  }

  /** f at x, with its gradient written out; infinite where rounding leaves no likelihood. */
  evaluate(x: Float64Array, gradient: Float64Array): number {
    const value = this.valueAt(x);
    if (Number.isFinite(value)) this.#differentiate(gradient);
    return value;
  }

  /** f at x; `u`, `beta`, `information` and `sumOfSquares` are left behind. */
  valueAt(x: Float64Array): number {
    const penalty = this.#region.moveTo(x);
    return this.#profile() + penalty;
  }

  /** f at the stationary process with the given partial autocorrelations. */
  valueAtPartials(partials: Float64Array): number {
    return this.valueAt(partials.map(Math.atanh));
  }

  /** Row j of ∂φ/∂x at the last evaluation, for all j, by row. */
  jacobian(): Float64Array {
    const p = this.order;
    const out = new Float64Array(p * p);
    for (let j = 0; j < p; j++) {
      const row = out.subarray(j * p, (j + 1) * p);
      row[j] = 1;
      this.#region.pullBack(row);
    }
    return out;
  }

  /** n log S + log det Q_mm at u. */
  #profile(): number {
    const { series, observations, missing } = this.#design;
    const width = series.length;
    const gaps = missing.length;
    const count = productCount(this.order);
    const gram = this.#gram;
    const system = this.#gapSystem;
    let logDeterminant = 0;
    if (system !== undefined) {
      logDeterminant = system.factorAt(this.u);
      if (Number.isNaN(logDeterminant)) return Number.POSITIVE_INFINITY;
      for (let a = 0; a < width; a++) {
        system.project(series[a], this.#projections, a * gaps);
        system.solveLower(this.#projections, a * gaps);
      }
    }
    let offset = 0;
    for (let a = 0; a < width; a++) {
      for (let b = a; b < width; b++) {
        let sum = quadraticForm(this.#products, offset, this.u, this.order);
        for (let g = 0; g < gaps; g++) {
          sum -= this.#projections[a * gaps + g] * this.#projections[b * gaps + g];
        }
        gram[a * width + b] = sum;
        offset += count;
      }
    }
    if (!this.#solveRegression()) return Number.POSITIVE_INFINITY;
    return observations * Math.log(this.sumOfSquares) + logDeterminant;
  }

  /** Generalised least squares from the Gram matrix; false when rounding leaves nothing. */
  #solveRegression(): boolean {
    const width = this.beta.length + 1;
    const columns = width - 1;
    const gram = this.#gram;
    for (let i = 0; i < columns; i++) {
      this.beta[i] = gram[i + 1];
      for (let j = 0; j <= i; j++) this.information[i * columns + j] = gram[(j + 1) * width + i + 1];
    }
    if (columns > 0) {
      if (!factorCholesky(this.information, columns)) return false;
      solveCholesky(this.information, columns, this.beta);
    }
    let sum = gram[0];
    for (let i = 0; i < columns; i++) sum -= this.beta[i] * gram[i + 1];
    this.sumOfSquares = sum;
    return sum > gram[0] * 1e-15;
  }

  #differentiate(gradient: Float64Array): void {
    const p = this.order;
    const slope = this.#slope;
    slope.fill(0);
    const perSquare = this.#design.observations / this.sumOfSquares;
    if (this.#gapSystem === undefined) this.#addRegressionSlope(perSquare);
    else this.#addGapSlope(this.#gapSystem, perSquare);
    for (let j = 0; j < p; j++) gradient[j] = -slope[j + 1];
    this.#region.pullBack(gradient);
    this.#region.addPenaltySlope(gradient);
  }

  /** n/S ∂S/∂u without gaps: the quadratic forms combined with (1, −β). */
  #addRegressionSlope(perSquare: number): void {
    const width = this.beta.length + 1;
    const count = productCount(this.order);
    let offset = 0;
    for (let a = 0; a < width; a++) {
      const shareA = a === 0 ? 1 : -this.beta[a - 1];
      for (let b = a; b < width; b++) {
        const shareB = b === 0 ? 1 : -this.beta[b - 1];
        const factor = perSquare * shareA * shareB * (a === b ? 1 : 2);
        addQuadraticGradient(this.#products, offset, this.u, this.order, factor, this.#slope);
        offset += count;
      }
    }
  }

  /** n/S ∂S/∂u + ∂ log det Q_mm/∂u with gaps: at the best fill, S is a form in the filled series alone. */
  #addGapSlope(system: GapSystem, perSquare: number): void {
    const { series, missing } = this.#design;
    const gaps = missing.length;
    const filled = this.#filled;
    filled.set(series[0]);
    const correction = this.#projections; // column 0 becomes L⁻¹(g_0 − Σ β g_j)
    for (let a = 1; a < series.length; a++) {
      const share = this.beta[a - 1];
      for (let t = 0; t < filled.length; t++) filled[t] -= share * series[a][t];
      for (let g = 0; g < gaps; g++) correction[g] -= share * correction[a * gaps + g];
    }
    system.solveUpper(correction, 0);
    for (let g = 0; g < gaps; g++) filled[missing[g]] -= correction[g];
    endCorrectedProducts(filled, filled, this.order, this.#filledProducts, 0);
    addQuadraticGradient(this.#filledProducts, 0, this.u, this.order, perSquare, this.#slope);
    system.addLogDeterminantGradient(this.u, this.#slope);
  }
}
