import type { DescribingModel } from "./forecast.ts";

/** The describing model of a series that has none: a mean and a variance, order 0, with no part in an average. */
export function trivialDescription(values: ArrayLike<number>): DescribingModel {
  const observed = Array.from(values).filter((value) => !Number.isNaN(value));
  const count = observed.length;
  const mean = observed.reduce((sum, value) => sum + value, 0) / count;
  const variance = observed.reduce((sum, value) => sum + (value - mean) ** 2, 0) / count;
  const logLikelihood = variance > 0 ? (-count / 2) * (Math.log(2 * Math.PI * variance) + 1) : 0;
  return {
    scale: "raw",
    trend: false,
    season: 0,
    fit: {
      method: "maximum-likelihood",
      order: 0,
      coefficients: new Float64Array(0),
      standardErrors: new Float64Array(0),
      mean,
      meanStandardError: Math.sqrt(variance / count),
      innovationVariance: variance,
      logLikelihood,
      aic: -2 * logLikelihood + 4,
      aicc: -2 * logLikelihood + (count > 3 ? (4 * count) / (count - 3) : 4),
      bic: -2 * logLikelihood + 2 * Math.log(count),
      observations: count,
      residuals: Float64Array.from(values, (value) => value - mean),
    },
    weight: 0,
  };
}
