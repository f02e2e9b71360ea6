import { levinson } from "../numeric/levinson.ts";
import { observedMean } from "../numeric/sums.ts";
import { requireObserved, requireValues, requireWhole } from "./checks.ts";

/**
 * Sample autocovariances γ̂_0..γ̂_maxLag about the sample mean, divided by n, which keeps the sequence positive
 * definite (Brockwell & Davis 1991, section 7.2). With gaps (`NaN`), lag k averages the complete pairs and
 * divides by (number of pairs + k), as R's `acf(na.action = na.pass)` does.
 *
 * Throws `RangeError` when no value is observed, or `maxLag` is not a whole number below the number of values.
 *
 * @example sampleAutocovariances([1, 2, 3], 1) // [0.6667, 0]
 */
export function sampleAutocovariances(values: ArrayLike<number>, maxLag: number): Float64Array {
  requireValues("sampleAutocovariances", "values", values, "gaps-allowed");
  requireObserved("sampleAutocovariances", values, 1);
  requireWhole("sampleAutocovariances", "maxLag", maxLag, 0);
  if (maxLag >= values.length) {
    throw new RangeError(
      `sampleAutocovariances needs maxLag below the number of values (${values.length}), got ${maxLag}`,
    );
  }
  return autocovariancesAbout(values, observedMean(values), maxLag);
}

/** The same about a given centre, unchecked. */
export function autocovariancesAbout(
  values: ArrayLike<number>,
  centre: number,
  maxLag: number,
): Float64Array {
  const n = values.length;
  const out = new Float64Array(maxLag + 1);
  for (let lag = 0; lag <= maxLag; lag++) {
    let sum = 0;
    let pairs = n - lag;
    for (let t = lag; t < n; t++) {
      const product = (values[t] - centre) * (values[t - lag] - centre);
      if (Number.isNaN(product)) pairs--;
      else sum += product;
    }
    out[lag] = pairs + lag > 0 ? sum / (pairs + lag) : 0;
  }
  return out;
}

/**
 * Sample partial autocorrelations of lags 1..maxLag by the Levinson–Durbin recursion on the sample
 * autocovariances (Brockwell & Davis 1991, section 3.4; R's `pacf`). Gaps as in `sampleAutocovariances`.
 *
 * Throws `RangeError` for constant values, whose correlations are undefined.
 */
export function partialAutocorrelations(values: ArrayLike<number>, maxLag: number): Float64Array {
  const autocovariances = sampleAutocovariances(values, maxLag);
  if (!(autocovariances[0] > 0)) {
    throw new RangeError("partialAutocorrelations needs values that vary, got a constant series");
  }
  return levinson(autocovariances, maxLag).partials;
}
