import { chiSquareTail } from "../numeric/gammaFunctions.ts";
import { leastSquares } from "../numeric/leastSquares.ts";
import { compensatedSum, observedMean } from "../numeric/sums.ts";
import { tabulate } from "../numeric/tabulate.ts";
import { requireObserved, requireValues, requireWhole } from "./checks.ts";
import { conditionalLeastSquares } from "./conditionalLeastSquares.ts";
import type { ChiSquareTest } from "./ljungBox.ts";

/**
 * Engle's (1982) Lagrange-multiplier test for changing variance (ARCH): rows · R² of the regression of e_t² on a
 * constant and `lags` of itself, chi-square with `lags` degrees of freedom. Rows that touch a gap are left out.
 *
 * Throws `RangeError` when fewer than 2·lags + 2 residuals are there, or their squares do not vary.
 */
export function archTest(residuals: ArrayLike<number>, options: { readonly lags: number }): ChiSquareTest {
  const { lags } = options;
  requireValues("archTest", "residuals", residuals, "gaps-allowed");
  requireWhole("archTest", "lags", lags, 1);
  requireObserved("archTest", residuals, 2 * lags + 2);
  const squares = Float64Array.from(residuals, (value) => value * value);
  const fit = conditionalLeastSquares(squares, lags, observedMean(squares), true);
  if (fit === undefined) throw new RangeError("archTest needs squared residuals that vary");
  const responses = Float64Array.from(fit.rows, (t) => squares[t]);
  return lagrange(fit.regression.residualSumOfSquares, responses, lags);
}

/**
 * Breusch (1978) and Godfrey (1978) test that an AR of `order` fitted by least squares with an intercept leaves no
 * autocorrelation up to `lags`: rows · R² of the residuals regressed on the same columns and on their own lags, with
 * zeros before the first residual; chi-square with `lags` degrees of freedom. Takes no gaps.
 *
 * Throws `RangeError` when the regressions have too few rows.
 */
export function breuschGodfrey(
  values: ArrayLike<number>,
  options: { readonly order: number; readonly lags: number },
): ChiSquareTest {
  const { order, lags } = options;
  requireValues("breuschGodfrey", "values", values, "no-gaps");
  requireWhole("breuschGodfrey", "order", order, 0);
  requireWhole("breuschGodfrey", "lags", lags, 1);
  const centre = observedMean(values);
  const residuals = conditionalLeastSquares(values, order, centre, true)?.regression.residuals;
  const rows = residuals?.length ?? 0;
  const columns: Float64Array[] = [new Float64Array(rows).fill(1)];
  for (let j = 1; j <= order; j++) {
    columns.push(tabulate(rows, (i) => values[i + order - j] - centre));
  }
  for (let lag = 1; lag <= lags; lag++) {
    columns.push(tabulate(rows, (i) => residuals?.[i - lag] ?? 0));
  }
  const auxiliary = residuals && leastSquares(columns, residuals);
  if (residuals === undefined || auxiliary === undefined) {
    throw new RangeError(
      `breuschGodfrey needs more values for order ${order} and ${lags} lags, got ${values.length}`,
    );
  }
  return lagrange(auxiliary.residualSumOfSquares, residuals, lags);
}

/** Rows · R². */
function lagrange(
  residualSumOfSquares: number,
  response: Float64Array,
  degreesOfFreedom: number,
): ChiSquareTest {
  const mean = observedMean(response);
  const total = compensatedSum(response.map((value) => (value - mean) ** 2));
  const statistic = response.length * (1 - residualSumOfSquares / total);
  return { statistic, degreesOfFreedom, pValue: chiSquareTail(statistic, degreesOfFreedom) };
}
