import { centred } from "../numeric/sums.ts";
import { requirePositive, requireValues } from "./checks.ts";
import type { AutoregressiveProcess } from "./fit.ts";
import { exactStart, knownState, runFilter, stationaryState } from "./innovationsFilter.ts";
import { coefficientsToPartials } from "./partials.ts";

/** One entry a value; `NaN` at gaps. */
export interface Innovations {
  readonly logLikelihood: number;
  /** x_t − E[x_t | all earlier values]. */
  readonly innovations: Float64Array;
  /** Variances of those errors: γ_0 at the first value, σ² once p values in a row are known. */
  readonly innovationVariances: Float64Array;
}

/**
 * Exact Gaussian log-likelihood of a stationary AR process at given parameters, with any pattern of gaps
 * (prediction-error form: Schweppe 1965; gaps: Jones 1980). −½ Σ [log 2πv_t + e_t²/v_t] over the observed values.
 *
 * Throws `RangeError` when the process is not stationary, the variance not positive or no value is observed.
 *
 * @example logLikelihood([1, Number.NaN, 1], { coefficients: [0.5], mean: 0, innovationVariance: 1 })
 */
export function logLikelihood(values: ArrayLike<number>, process: AutoregressiveProcess): Innovations {
  requireValues("logLikelihood", "values", values, "gaps-allowed");
  requirePositive("logLikelihood", "innovationVariance", process.innovationVariance);
  requireValues("logLikelihood", "mean", [process.mean], "no-gaps");
  const partials = coefficientsToPartials(process.coefficients);
  const deviations = centred(values, process.mean);
  return exactInnovations(deviations, process.coefficients, partials, process.innovationVariance);
}

/** The same for deviations from the mean, with the partial autocorrelations known, unchecked. */
export function exactInnovations(
  deviations: Float64Array,
  coefficients: ArrayLike<number>,
  partials: Float64Array,
  innovationVariance: number,
): Innovations {
  const n = deviations.length;
  const p = partials.length;
  const innovations = new Float64Array(n);
  const innovationVariances = new Float64Array(n);
  let startsComplete = n >= p;
  for (let t = 0; t < p && startsComplete; t++) startsComplete = !Number.isNaN(deviations[t]);
  if (startsComplete) exactStart(partials, innovationVariance, deviations, innovations, innovationVariances);
  const state = startsComplete
    ? knownState(deviations, p - 1, p)
    : stationaryState(coefficients, partials, innovationVariance);
  const from = startsComplete ? p : 0;
  runFilter(coefficients, innovationVariance, deviations, from, state, innovations, innovationVariances);
  let sum = 0;
  let observed = 0;
  for (let t = 0; t < n; t++) {
    if (Number.isNaN(innovations[t])) continue;
    observed++;
    sum += Math.log(innovationVariances[t]) + innovations[t] ** 2 / innovationVariances[t];
  }
  if (observed === 0) throw new RangeError("logLikelihood needs at least 1 observed value, got 0");
  return {
    logLikelihood: -0.5 * (sum + observed * Math.log(2 * Math.PI)),
    innovations,
    innovationVariances,
  };
}
