import { countObserved, observedMean } from "../numeric/sums.ts";
import { conditionalLeastSquares } from "./conditionalLeastSquares.ts";
import type { AutoregressiveFit } from "./fit.ts";
import { summarise } from "./summarise.ts";

/**
 * Fit by conditional least squares with an intercept (or none, with a known zero mean): `lm` of x_t on its lags.
 * σ² divides the residual sum of squares by rows − parameters, and standard errors follow it; the log-likelihood
 * and the criteria are conditional on the first p values. The mean is c/(1 − Σφ), its standard error by the delta
 * method. A fit may be explosive. Where Σφ = 1 to rounding no mean exists: the sample mean stands in, with an
 * infinite standard error.
 */
export function fitByLeastSquares(
  values: ArrayLike<number>,
  order: number,
  meanKnown: boolean,
): AutoregressiveFit {
  const centre = observedMean(values);
  const result = conditionalLeastSquares(values, order, centre, !meanKnown);
  const estimated = order + (meanKnown ? 0 : 1);
  const rows = result?.rows.length ?? 0;
  if (result === undefined || rows <= estimated) {
    throw new RangeError(
      `fitAutoregression needs more than ${estimated} complete rows that tell the coefficients apart ` +
        `for least squares of order ${order}, got ${rows}`,
    );
  }
  const { regression, coefficients } = result;
  const innovationVariance = regression.residualSumOfSquares / (rows - estimated);
  if (!(innovationVariance > 0)) {
    throw new RangeError(
      "fitAutoregression needs values with an unpredictable part, got a residual variance of 0",
    );
  }
  const offset = meanKnown ? 0 : 1;
  const error = (i: number) =>
    Math.sqrt(innovationVariance * regression.unscaledCovariance[i * estimated + i]);
  const residuals = new Float64Array(values.length).fill(Number.NaN);
  result.rows.forEach((t, row) => {
    residuals[t] = regression.residuals[row];
  });
  const variance = regression.residualSumOfSquares / rows;
  return summarise({
    method: "least-squares",
    coefficients,
    standardErrors: Float64Array.from(coefficients, (_, j) => error(j + offset)),
    ...impliedMean(result, centre, innovationVariance, meanKnown),
    innovationVariance,
    logLikelihood: -0.5 * rows * (Math.log(2 * Math.PI * variance) + 1),
    parameters: estimated + 1,
    effectiveObservations: rows,
    observations: countObserved(values),
    residuals,
  });
}

function impliedMean(
  result: NonNullable<ReturnType<typeof conditionalLeastSquares>>,
  centre: number,
  innovationVariance: number,
  meanKnown: boolean,
): { mean: number; meanStandardError: number } {
  if (meanKnown) return { mean: 0, meanStandardError: 0 };
  const { coefficients, regression } = result;
  const k = coefficients.length + 1;
  const slack = 1 - coefficients.reduce((sum, value) => sum + value, 0);
  if (Math.abs(slack) < 1e-12) return { mean: centre, meanStandardError: Number.POSITIVE_INFINITY };
  const deviation = regression.coefficients[0] / slack; // of the mean from the sample mean
  let variance = 0;
  for (let i = 0; i < k; i++) {
    for (let j = 0; j < k; j++) {
      const product = (i === 0 ? 1 : deviation) * (j === 0 ? 1 : deviation);
      variance += product * regression.unscaledCovariance[i * k + j];
    }
  }
  return {
    mean: centre + deviation,
    meanStandardError: Math.sqrt(innovationVariance * Math.max(0, variance)) / Math.abs(slack),
  };
}
