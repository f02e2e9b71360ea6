import { informationCriteria } from "./criteria.ts";
import type { AutoregressiveFit, EstimationMethod } from "./fit.ts";

/** What an estimator hands over; criteria follow from it. */
export interface Estimates {
  readonly method: EstimationMethod;
  readonly coefficients: Float64Array;
  readonly standardErrors: Float64Array;
  readonly mean: number;
  readonly meanStandardError: number;
  readonly innovationVariance: number;
  readonly logLikelihood: number;
  /** Everything estimated, the innovation variance included. */
  readonly parameters: number;
  /** Values the likelihood rests on. */
  readonly effectiveObservations: number;
  readonly observations: number;
  readonly residuals: Float64Array;
  readonly regression?: AutoregressiveFit["regression"];
}

/** The fit that callers see. */
export function summarise(estimates: Estimates): AutoregressiveFit {
  const { logLikelihood, parameters, effectiveObservations, regression } = estimates;
  const { aic, aicc, bic } = informationCriteria(logLikelihood, parameters, effectiveObservations);
  return {
    method: estimates.method,
    order: estimates.coefficients.length,
    coefficients: estimates.coefficients,
    standardErrors: estimates.standardErrors,
    mean: estimates.mean,
    meanStandardError: estimates.meanStandardError,
    innovationVariance: estimates.innovationVariance,
    logLikelihood,
    aic,
    aicc,
    bic,
    observations: estimates.observations,
    residuals: estimates.residuals,
    ...(regression && { regression }),
  };
}
