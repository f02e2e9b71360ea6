import { requireObserved, requireValues } from "./checks.ts";
import { likelihoodDesign } from "./likelihoodDesign.ts";
import { originalCoefficients, originalErrors } from "./maximumLikelihood.ts";
import { regressionCovariance } from "./observedInformation.ts";
import { coefficientsToPartials } from "./partials.ts";
import { ProfileLikelihood } from "./profileLikelihood.ts";

export interface GeneralisedLeastSquares {
  /** One a column. */
  readonly coefficients: Float64Array;
  /** sqrt(diag(σ² (XᵀV⁻¹X)⁻¹)): with the error process taken as known. */
  readonly standardErrors: Float64Array;
  /** (y − Xβ)ᵀ V⁻¹ (y − Xβ), V in units of the innovation variance. */
  readonly sumOfSquares: number;
  /** Sum of squares over the observed count. */
  readonly innovationVariance: number;
  /** Exact Gaussian log-likelihood at these numbers. */
  readonly logLikelihood: number;
}

/**
 * Regression with errors from a known stationary AR process, by generalised least squares (Aitken 1936), exact with
 * gaps in `values`. `regressors` holds one array of n finite values a column; a constant is a column like any other.
 *
 * Throws `RangeError` when the process is not stationary, the columns are not independent or explain everything.
 *
 * @example generalisedLeastSquares([1, 2, 4], [[1, 1, 1]], [0]).coefficients // [2.3333]
 */
export function generalisedLeastSquares(
  values: ArrayLike<number>,
  regressors: readonly ArrayLike<number>[],
  coefficients: ArrayLike<number>,
): GeneralisedLeastSquares {
  requireValues("generalisedLeastSquares", "values", values, "gaps-allowed");
  requireObserved("generalisedLeastSquares", values, regressors.length + 1);
  regressors.forEach((column, j) => {
    requireValues("generalisedLeastSquares", `regressors[${j}]`, column, "no-gaps");
  });
  const partials = coefficientsToPartials(coefficients);
  const design = likelihoodDesign(values, regressors);
  const likelihood = new ProfileLikelihood(design, coefficients.length);
  const n = design.observations;
  const deviance = likelihood.valueAtPartials(partials);
  const sumOfSquares = likelihood.sumOfSquares * design.scale ** 2;
  return {
    coefficients: originalCoefficients(design, likelihood.beta),
    standardErrors: originalErrors(design, regressionCovariance(likelihood, n)),
    sumOfSquares,
    innovationVariance: sumOfSquares / n,
    logLikelihood: -0.5 * (n * (Math.log((2 * Math.PI) / n) + 1) + deviance) - n * Math.log(design.scale),
  };
}
