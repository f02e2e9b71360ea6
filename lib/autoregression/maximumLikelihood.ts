import { invertPositive } from "../numeric/cholesky.ts";
import { requireValues } from "./checks.ts";
import type { AutoregressiveFit } from "./fit.ts";
import { isConstant, type LikelihoodDesign, likelihoodDesign } from "./likelihoodDesign.ts";
import { exactInnovations } from "./logLikelihood.ts";
import { maximise } from "./maximise.ts";
import { observedInformation, regressionCovariance, sandwich } from "./observedInformation.ts";
import { processAutocovariances } from "./processAutocovariances.ts";
import { ProfileLikelihood } from "./profileLikelihood.ts";
import { summarise } from "./summarise.ts";

/**
 * Exact Gaussian maximum likelihood (see `ProfileLikelihood`), started at Burg's estimate and, with gaps or few
 * values, at others too. Arguments are taken as checked by
 * `fitAutoregression`, apart from the regressors.
 */
export function fitByMaximumLikelihood(
  values: ArrayLike<number>,
  order: number,
  meanKnown: boolean,
  regressors: readonly ArrayLike<number>[],
): AutoregressiveFit {
  checkRegressors(regressors, values.length);
  const addsMean = !meanKnown && !regressors.some((column) => isConstant(column));
  const columns = addsMean ? [...regressors, new Float64Array(values.length).fill(1)] : regressors;
  const design = likelihoodDesign(values, columns);
  const { observations, scale } = design;
  const k = columns.length;
  if (observations < order + k + 1) {
    throw new RangeError(
      `fitAutoregression needs at least ${order + k + 1} observed values for order ${order} and ${k} regression terms, got ${observations}`,
    );
  }
  const likelihood = new ProfileLikelihood(design, order);
  const maximum = maximise(likelihood, design);
  likelihood.valueAt(maximum);
  const coefficients = likelihood.u.slice(1).map((value) => -value);
  const partials = maximum.map(Math.tanh);
  const innovationVariance = (likelihood.sumOfSquares / observations) * scale * scale;
  const beta = originalCoefficients(design, likelihood.beta);
  const errors = standardErrors(likelihood, maximum, design, partials);
  const deviations = new Float64Array(values.length);
  for (let t = 0; t < values.length; t++) {
    deviations[t] = values[t];
    for (let j = 0; j < k; j++) deviations[t] -= beta[j] * columns[j][t];
  }
  const exact = exactInnovations(deviations, coefficients, partials, innovationVariance);
  const given = regressors.length;
  return summarise({
    method: "maximum-likelihood",
    coefficients,
    standardErrors: errors.coefficients,
    mean: addsMean ? beta[k - 1] : 0,
    meanStandardError: addsMean ? errors.regression[k - 1] : 0,
    innovationVariance,
    logLikelihood: exact.logLikelihood,
    parameters: order + k + 1,
    effectiveObservations: observations,
    observations,
    residuals: exact.innovations,
    ...(given > 0 && {
      regression: {
        coefficients: beta.slice(0, given),
        standardErrors: errors.regression.slice(0, given),
      },
    }),
  });
}

function checkRegressors(regressors: readonly ArrayLike<number>[], length: number): void {
  regressors.forEach((column, j) => {
    requireValues("fitAutoregression", `regressors[${j}]`, column, "no-gaps");
    if (column.length !== length) {
      throw new RangeError(
        `fitAutoregression needs ${length} entries in regressors[${j}], one a value, got ${column.length}`,
      );
    }
  });
}

/** Coefficients of the columns as given, on the scale of the values. */
export function originalCoefficients(design: LikelihoodDesign, beta: Float64Array): Float64Array {
  const k = beta.length;
  const out = Float64Array.from(design.base);
  for (let row = 0; row < k; row++) {
    for (let j = row; j < k; j++) out[row] += design.scale * design.triangle[row * k + j] * beta[j];
  }
  return out;
}

/** Standard errors of the columns as given, from the covariance of the orthogonal ones. */
export function originalErrors(design: LikelihoodDesign, covariance: Float64Array): Float64Array {
  const k = design.base.length;
  const full = sandwich(design.triangle, covariance, k, k);
  return Float64Array.from({ length: k }, (_, j) => design.scale * Math.sqrt(full[j * k + j]));
}

/**
 * From the observed information; where a maximum on the edge of stationarity has none, from the large-sample
 * covariance σ²/n Γ_p⁻¹, and with φ held at its estimate for the regression.
 */
function standardErrors(
  likelihood: ProfileLikelihood,
  maximum: Float64Array,
  design: LikelihoodDesign,
  partials: Float64Array,
): { coefficients: Float64Array; regression: Float64Array } {
  const p = partials.length;
  const covariance = observedInformation(likelihood, maximum, design.observations);
  const regression = covariance?.regression ?? regressionCovariance(likelihood, design.observations);
  const ofCoefficients =
    covariance?.coefficients ?? largeSampleCovariance(likelihood.u, partials, design.observations);
  return {
    coefficients: Float64Array.from({ length: p }, (_, j) => Math.sqrt(ofCoefficients[j * p + j])),
    regression: originalErrors(design, regression),
  };
}

function largeSampleCovariance(u: Float64Array, partials: Float64Array, observations: number): Float64Array {
  const p = partials.length;
  const coefficients = u.slice(1).map((value) => -value);
  const gamma = processAutocovariances(coefficients, partials, 1, Math.max(0, p - 1));
  const matrix = new Float64Array(p * p);
  for (let i = 0; i < p; i++) for (let j = 0; j < p; j++) matrix[i * p + j] = gamma[Math.abs(i - j)];
  const inverse = invertPositive(matrix, p) ?? new Float64Array(p * p);
  return inverse.map((value) => value / observations);
}
