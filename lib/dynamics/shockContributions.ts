import { requireValues, requireWhole } from "../autoregression/checks.ts";
import type { AutoregressiveProcess } from "../autoregression/fit.ts";
import { isStationary } from "../autoregression/partials.ts";
import { smoothGaps } from "../autoregression/smoothGaps.ts";
import { movingAverageWeights } from "./movingAverageWeights.ts";

/** What one past shock still does to the coming periods. */
export interface ShockContribution {
  /** 0 for the last value of the series, 1 for the one before it, and so on. */
  readonly lag: number;
  /** Index of the value it hit. */
  readonly index: number;
  readonly shock: number;
  /** ψ_{h+lag} · shock for h = 1..horizon. */
  readonly effects: Float64Array;
}

export interface ShockContributions {
  readonly longRunLevel: number;
  /** Forecasts, equal to longRunLevel + Σ effects + earlier at every step. */
  readonly forecast: Float64Array;
  /** The `last` shocks, newest first. */
  readonly shocks: readonly ShockContribution[];
  /** What all shocks before them still do, the start of the series included. */
  readonly earlier: Float64Array;
}

/**
 * Which past shocks carry the forecast: forecast_{n+h} − long-run level = Σ_s ψ_{h+s} ε_{n−s}, an identity that holds
 * to rounding. ε_t = z_t − Σ φ_j z_{t−j} of the deviations z, with nothing before the first value, so the first p
 * shocks hold the deviation that the series started with. Gaps are filled by their expectation given all the data,
 * which makes the shocks around a gap the expected ones and leaves the forecast as `predict` gives it.
 *
 * `values` are those of the fit: with regressors, the values minus the regression. Throws `RangeError` for gaps
 * under a process that is not stationary, and for `last` or `horizon` that are not whole numbers.
 *
 * @example shockContributions({ coefficients: [0.5], mean: 0, innovationVariance: 1 }, [2, 4], { horizon: 1, last: 1 })
 * // shocks[0] = { lag: 0, index: 1, shock: 3, effects: [1.5] }, earlier [0.5], forecast [2]
 */
export function shockContributions(
  process: AutoregressiveProcess,
  values: ArrayLike<number>,
  options: { readonly horizon: number; readonly last: number },
): ShockContributions {
  const { coefficients, mean } = process;
  const { horizon, last } = options;
  requireValues("shockContributions", "values", values, "gaps-allowed");
  requireWhole("shockContributions", "horizon", horizon, 1);
  requireWhole("shockContributions", "last", last, 0);
  const shocks = allShocks(process, values);
  const n = shocks.length;
  const weights = movingAverageWeights(coefficients, n + horizon);
  const forecast = new Float64Array(horizon).fill(mean);
  const earlier = new Float64Array(horizon);
  const listed: ShockContribution[] = [];
  for (let lag = 0; lag < n; lag++) {
    const shock = shocks[n - 1 - lag];
    const effects = new Float64Array(horizon);
    for (let h = 0; h < horizon; h++) {
      effects[h] = weights[h + 1 + lag] * shock;
      forecast[h] += effects[h];
      if (lag >= last) earlier[h] += effects[h];
    }
    if (lag < last) listed.push({ lag, index: n - 1 - lag, shock, effects });
  }
  return { longRunLevel: mean, forecast, shocks: listed, earlier };
}

function allShocks(process: AutoregressiveProcess, values: ArrayLike<number>): Float64Array {
  const { coefficients, mean } = process;
  let complete: ArrayLike<number> = values;
  if (Array.from(values).some(Number.isNaN)) {
    if (!isStationary(coefficients)) {
      throw new RangeError("shockContributions needs a stationary process to fill the gaps in values");
    }
    complete = smoothGaps(process, values).values;
  }
  const shocks = new Float64Array(values.length);
  for (let t = 0; t < shocks.length; t++) {
    shocks[t] = complete[t] - mean;
    for (let j = 1; j <= Math.min(t, coefficients.length); j++) {
      shocks[t] -= coefficients[j - 1] * (complete[t - j] - mean);
    }
  }
  return shocks;
}
