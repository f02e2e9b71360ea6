import { chiSquareTail } from "../numeric/gammaFunctions.ts";
import { centred, countObserved, observedMean } from "../numeric/sums.ts";
import { requireObserved, requireValues, requireWhole } from "./checks.ts";

export interface ChiSquareTest {
  readonly statistic: number;
  readonly degreesOfFreedom: number;
  readonly pValue: number;
}

/**
 * Ljung & Box (1978) test that residuals have no autocorrelation up to `lags`:
 * n(n + 2) Σ r_k²/(n − k), chi-square with lags − fittedParameters degrees of freedom (R's
 * `Box.test(type = "Ljung-Box", fitdf = …)`). Gaps (`NaN`, such as the first residuals of some fits) are cut off at
 * the ends; inside, a pair with a gap is left out of its sum, and n counts observed values.
 *
 * Throws `RangeError` when lags is not above fittedParameters, or too few residuals are there.
 *
 * @example ljungBox(fit.residuals, { lags: 10, fittedParameters: fit.order }).pValue
 */
export function ljungBox(
  residuals: ArrayLike<number>,
  options: { readonly lags: number; readonly fittedParameters: number },
): ChiSquareTest {
  const { lags, fittedParameters } = options;
  requireValues("ljungBox", "residuals", residuals, "gaps-allowed");
  requireWhole("ljungBox", "lags", lags, 1);
  requireWhole("ljungBox", "fittedParameters", fittedParameters, 0);
  if (lags <= fittedParameters) {
    throw new RangeError(`ljungBox needs lags above fittedParameters (${fittedParameters}), got ${lags}`);
  }
  requireObserved("ljungBox", residuals, lags + 1);
  return portmanteau(residuals, lags, lags - fittedParameters);
}

/**
 * McLeod & Li (1983) test for changing variance: the Ljung–Box statistic of the squared residuals, with `lags`
 * degrees of freedom.
 */
export function mcLeodLi(residuals: ArrayLike<number>, options: { readonly lags: number }): ChiSquareTest {
  const { lags } = options;
  requireValues("mcLeodLi", "residuals", residuals, "gaps-allowed");
  requireWhole("mcLeodLi", "lags", lags, 1);
  requireObserved("mcLeodLi", residuals, lags + 1);
  return portmanteau(
    Float64Array.from(residuals, (value) => value * value),
    lags,
    lags,
  );
}

function portmanteau(values: ArrayLike<number>, lags: number, degreesOfFreedom: number): ChiSquareTest {
  const deviations = centred(values, observedMean(values));
  const n = countObserved(deviations);
  let power = 0;
  for (let t = 0; t < deviations.length; t++) power += deviations[t] ** 2 || 0;
  if (!(power > 0)) throw new RangeError("ljungBox needs residuals that vary, got a constant series");
  let sum = 0;
  for (let lag = 1; lag <= lags; lag++) {
    let cross = 0;
    for (let t = lag; t < deviations.length; t++) cross += deviations[t] * deviations[t - lag] || 0;
    sum += (cross / power) ** 2 / (n - lag);
  }
  const statistic = n * (n + 2) * sum;
  return { statistic, degreesOfFreedom, pValue: chiSquareTail(statistic, degreesOfFreedom) };
}
