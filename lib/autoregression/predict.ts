import { centred } from "../numeric/sums.ts";
import { requirePositive, requireValues, requireWhole } from "./checks.ts";
import type { AutoregressiveProcess } from "./fit.ts";
import { type FilterState, knownState, runFilter, stationaryState } from "./innovationsFilter.ts";
import { coefficientsToPartials } from "./partials.ts";

export interface Prediction {
  /** E[x_{n+h}] for h = 1..horizon. */
  readonly mean: Float64Array;
  readonly standardErrors: Float64Array;
  /** Of the sum over the horizon, with the correlation between the steps. */
  readonly total: { readonly mean: number; readonly standardError: number };
}

/**
 * Forecasts from given parameters, starting after the last entry of `values`, observed or not. Exact with gaps
 * anywhere. Variance σ² Σ_{j<h} ψ_j², plus what is unknown of the last p values when a gap touches them;
 * uncertainty of the parameters is not in it.
 *
 * Works for processes that are not stationary too, as long as p values in a row are observed somewhere; else
 * throws `RangeError`. Also thrown for infinite values, a variance that is not positive, or horizon below 1.
 *
 * @example predict({ coefficients: [0.5], mean: 0, innovationVariance: 1 }, [4], { horizon: 2 }).mean // [2, 1]
 */
export function predict(
  process: AutoregressiveProcess,
  values: ArrayLike<number>,
  options: { readonly horizon: number },
): Prediction {
  const { coefficients, mean: level, innovationVariance } = process;
  const { horizon } = options;
  requireValues("predict", "values", values, "gaps-allowed");
  requireValues("predict", "coefficients", coefficients, "no-gaps");
  requireValues("predict", "mean", [level], "no-gaps");
  requirePositive("predict", "innovationVariance", innovationVariance);
  requireWhole("predict", "horizon", horizon, 1);
  const p = coefficients.length;
  const state = stateAtEnd(process, values);
  const paths = futurePaths(coefficients, state, horizon);
  const mean = new Float64Array(horizon);
  const standardErrors = new Float64Array(horizon);
  const totalLoading = new Float64Array(p);
  let totalMean = 0;
  let squaredWeights = 0;
  let cumulativeWeight = 0;
  let squaredCumulative = 0;
  for (let h = 0; h < horizon; h++) {
    mean[h] = level + paths.means[h];
    totalMean += mean[h];
    const weight = paths.weights[h];
    squaredWeights += weight * weight;
    cumulativeWeight += weight;
    squaredCumulative += cumulativeWeight * cumulativeWeight;
    const loading = paths.loadings.subarray(h * p, (h + 1) * p);
    for (let i = 0; i < p; i++) totalLoading[i] += loading[i];
    standardErrors[h] = Math.sqrt(innovationVariance * squaredWeights + openVariance(state, loading));
  }
  const totalVariance = innovationVariance * squaredCumulative + openVariance(state, totalLoading);
  return { mean, standardErrors, total: { mean: totalMean, standardError: Math.sqrt(totalVariance) } };
}

/** What is known of the last p deviations at the end of `values`. */
function stateAtEnd(process: AutoregressiveProcess, values: ArrayLike<number>): FilterState {
  const { coefficients, innovationVariance } = process;
  const p = coefficients.length;
  const deviations = centred(values, process.mean);
  const n = deviations.length;
  // Values before the last complete run of p cannot matter any more.
  let oldest = n - 1; // of that run
  for (let run = 0; oldest >= 0; oldest--) {
    run = Number.isNaN(deviations[oldest]) ? 0 : run + 1;
    if (run >= p) break;
  }
  const known = p === 0 || oldest >= 0;
  const last = oldest + p - 1;
  const state = known
    ? knownState(deviations, p === 0 ? n - 1 : last, p)
    : stationaryState(coefficients, coefficientsToPartials(coefficients), innovationVariance);
  const from = p === 0 ? n : known ? last + 1 : 0;
  runFilter(
    coefficients,
    innovationVariance,
    deviations,
    from,
    state,
    new Float64Array(n),
    new Float64Array(n),
  );
  return state;
}

/** Mean path, ψ weights, and how each future deviation loads on the last p ones (row h, p entries). */
function futurePaths(coefficients: ArrayLike<number>, state: FilterState, horizon: number) {
  const p = coefficients.length;
  const means = new Float64Array(horizon);
  const weights = new Float64Array(horizon);
  const loadings = new Float64Array(horizon * p);
  const open = state.run < p;
  weights[0] = 1;
  for (let h = 0; h < horizon; h++) {
    for (let j = 1; j <= p; j++) {
      const past = h - j; // index among future values; negative ones are the state's
      const coefficient = coefficients[j - 1];
      means[h] += coefficient * (past >= 0 ? means[past] : state.means[-past - 1]);
      if (past >= 0) weights[h] += coefficient * weights[past];
      if (!open) continue;
      if (past < 0) loadings[h * p - past - 1] += coefficient;
      else for (let i = 0; i < p; i++) loadings[h * p + i] += coefficient * loadings[past * p + i];
    }
  }
  return { means, weights, loadings };
}

function openVariance(state: FilterState, loading: Float64Array): number {
  const p = loading.length;
  if (state.run >= p) return 0;
  let sum = 0;
  for (let i = 0; i < p; i++) {
    for (let j = 0; j < p; j++) sum += loading[i] * state.covariance[i * p + j] * loading[j];
  }
  return Math.max(0, sum);
}
