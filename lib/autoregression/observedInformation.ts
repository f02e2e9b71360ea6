import { invertPositive } from "../numeric/cholesky.ts";
import type { ProfileLikelihood } from "./profileLikelihood.ts";

/** Covariances at a maximum of the likelihood. */
export interface EstimateCovariance {
  /** Of φ_1..φ_p, p² by row. */
  readonly coefficients: Float64Array;
  /** Of the orthogonal regression coefficients, k² by row, in units of the design's scale. */
  readonly regression: Float64Array;
}

const STEP = 1e-4;

/**
 * Inverse of the observed information of (φ, β), the innovation variance profiled out. The Hessian in x = artanh π
 * is the central difference of the analytic gradient; the profile over β gives the φ block of the joint inverse,
 * and Var β = σ²(XᵀV⁻¹X)⁻¹ + (∂β̂/∂x) H⁻¹ (∂β̂/∂x)ᵀ gives the other. Returns `undefined` where the Hessian is not
 * positive definite, as at a maximum on the edge of stationarity.
 */
export function observedInformation(
  likelihood: ProfileLikelihood,
  maximum: Float64Array,
  observations: number,
): EstimateCovariance | undefined {
  const p = maximum.length;
  const k = likelihood.beta.length;
  const hessian = new Float64Array(p * p);
  const shift = new Float64Array(k * p);
  const point = Float64Array.from(maximum);
  const above = new Float64Array(p);
  const below = new Float64Array(p);
  for (let i = 0; i < p; i++) {
    point[i] = maximum[i] + STEP;
    likelihood.evaluate(point, above);
    for (let j = 0; j < k; j++) shift[j * p + i] = likelihood.beta[j];
    point[i] = maximum[i] - STEP;
    likelihood.evaluate(point, below);
    for (let j = 0; j < k; j++) {
      shift[j * p + i] = (shift[j * p + i] - likelihood.beta[j]) / (2 * STEP);
    }
    point[i] = maximum[i];
    // f is twice the negative log-likelihood.
    for (let j = 0; j < p; j++) hessian[i * p + j] = (above[j] - below[j]) / (4 * STEP);
  }
  for (let i = 0; i < p; i++) {
    for (let j = 0; j < i; j++) {
      const mean = (hessian[i * p + j] + hessian[j * p + i]) / 2;
      hessian[i * p + j] = mean;
      hessian[j * p + i] = mean;
    }
  }
  const inverse = invertPositive(hessian, p);
  likelihood.valueAt(maximum);
  if (inverse === undefined) return undefined;
  const regression = regressionCovariance(likelihood, observations);
  const spread = sandwich(shift, inverse, k, p);
  for (let i = 0; i < k * k; i++) regression[i] += spread[i];
  return { coefficients: sandwich(likelihood.jacobian(), inverse, p, p), regression };
}

/** S/n (XᵀV⁻¹X)⁻¹ at the last evaluation: the covariance of β with φ held at its value. */
export function regressionCovariance(likelihood: ProfileLikelihood, observations: number): Float64Array {
  const k = likelihood.beta.length;
  const factor = likelihood.information;
  const variance = likelihood.sumOfSquares / observations;
  // Inverse of the factor, then its transpose times itself.
  const inverse = new Float64Array(k * k);
  for (let j = 0; j < k; j++) {
    inverse[j * k + j] = 1 / factor[j * k + j];
    for (let i = j + 1; i < k; i++) {
      let sum = 0;
      for (let c = j; c < i; c++) sum -= factor[i * k + c] * inverse[c * k + j];
      inverse[i * k + j] = sum / factor[i * k + i];
    }
  }
  const out = new Float64Array(k * k);
  for (let i = 0; i < k; i++) {
    for (let j = 0; j < k; j++) {
      for (let c = Math.max(i, j); c < k; c++) out[i * k + j] += inverse[c * k + i] * inverse[c * k + j];
      out[i * k + j] *= variance;
    }
  }
  return out;
}

/** A M Aᵀ for A of `rows` by `inner`. */
export function sandwich(a: Float64Array, middle: Float64Array, rows: number, inner: number): Float64Array {
  const half = new Float64Array(rows * inner);
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < inner; j++) {
      for (let c = 0; c < inner; c++) half[i * inner + j] += a[i * inner + c] * middle[c * inner + j];
    }
  }
  const out = new Float64Array(rows * rows);
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < rows; j++) {
      for (let c = 0; c < inner; c++) out[i * rows + j] += half[i * inner + c] * a[j * inner + c];
    }
  }
  return out;
}
