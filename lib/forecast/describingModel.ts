import { burgReflections } from "../autoregression/burg.ts";
import { requireObserved, requireValues } from "../autoregression/checks.ts";
import type { AutoregressiveFit } from "../autoregression/fit.ts";
import { fitAutoregression } from "../autoregression/fitAutoregression.ts";
import { leastSquares } from "../numeric/leastSquares.ts";
import { tabulate } from "../numeric/tabulate.ts";
import { describingColumns } from "./describingTerms.ts";
import { fillGaps } from "./fillGaps.ts";
import type { ForecastOptions } from "./forecast.ts";
import { orderWorkspace } from "./orderAverage.ts";
import { seasonLengths } from "./seasonLengths.ts";

/** The one autoregression whose weights, half-life and shock attribution are reported of a series. */
export interface SeriesDescription {
  readonly scale: "raw" | "log";
  readonly trend: boolean;
  /** Season length of the seasonal terms, 0 when there are none. */
  readonly season: number;
  /** Columns of the regression, empty when the process mean stands alone. */
  readonly regressors: readonly Float64Array[];
  /** Exact maximum likelihood on the chosen scale; coefficients of the columns in `fit.regression`. */
  readonly fit: AutoregressiveFit;
}

/** One way to describe a series. */
export interface DescriptionPlan {
  readonly scale: "raw" | "log";
  readonly trend: boolean;
  /** Season length of the seasonal terms, 0 for none. */
  readonly season: number;
  readonly order: number;
}

/**
 * The describing model: on the raw or logarithmic scale, with or without a straight line, with or without one
 * season, an autoregression of the order that AICc chooses. The choice is made on Burg fits to the residuals of the
 * regression (gaps filled for this step only), the logarithm paying its Jacobian 2 Σ log x; the chosen model is then
 * fitted by exact maximum likelihood, terms and autoregression jointly, gaps left out exactly.
 *
 * Orders up to 10·log10(n), at most a quarter of the values. Throws `RangeError` for fewer than 8 observed values or
 * values that do not vary.
 *
 * @example describeSeries(nile, { period: "year" }).fit.coefficients
 */
export function describeSeries(
  values: ArrayLike<number>,
  options: Pick<ForecastOptions, "period" | "seasons"> = {},
): SeriesDescription {
  return describeAs(values, planDescription(values, options));
}

/** The exact fit of a plan; of a lower order where the likelihood of the planned one cannot be maximised. */
export function describeAs(values: ArrayLike<number>, plan: DescriptionPlan): SeriesDescription {
  const { scale, trend, season } = plan;
  const scaled = tabulate(values.length, scale === "log" ? (t) => Math.log(values[t]) : (t) => values[t]);
  const regressors = describingColumns(trend, season, 0, scaled.length, scaled.length);
  for (let order = plan.order; ; order--) {
    try {
      const fit = fitAutoregression(scaled, { order, method: "maximum-likelihood", regressors });
      return { scale, trend, season, regressors, fit };
    } catch (error) {
      // A likelihood that cannot be maximised at this order (a deterministic stretch) may be at a smaller one.
      if (order === 0) throw error;
    }
  }
}

/** The choice alone: which terms and order `describeSeries` would fit. Throws as it does. */
export function planDescription(
  values: ArrayLike<number>,
  options: Pick<ForecastOptions, "period" | "seasons"> = {},
): DescriptionPlan {
  requireValues("describeSeries", "values", values, "gaps-allowed");
  requireObserved("describeSeries", values, 8);
  const series = Float64Array.from(values);
  const count = series.length;
  const seasons = seasonLengths(count, options);
  const maxOrder = Math.max(1, Math.min(Math.floor(10 * Math.log10(count)), Math.floor(count / 4)));
  const workspace = orderWorkspace(count, maxOrder);
  let observed = 0;
  let positive = true;
  let logarithms = 0;
  for (const value of series) {
    if (Number.isNaN(value)) continue;
    observed++;
    if (value > 0) logarithms += Math.log(value);
    else positive = false;
  }
  const scales = (positive ? (["raw", "log"] as const) : (["raw"] as const)).map((scale) => ({
    scale,
    filled: fillGaps(scale === "log" ? series.map(Math.log) : series, seasons[0] ?? 0, workspace),
    jacobian: scale === "log" ? 2 * logarithms : 0,
  }));
  let best: DescriptionPlan = { scale: "raw", trend: false, season: 0, order: 0 };
  let lowest = Number.POSITIVE_INFINITY;
  for (const season of [0, ...seasons]) {
    for (const trend of [false, true]) {
      const columns = describingColumns(trend, season, 0, count, count);
      const terms = Math.max(1, columns.length);
      for (const { scale, filled, jacobian } of scales) {
        const residuals = columns.length === 0 ? centred(filled) : leastSquares(columns, filled)?.residuals;
        if (residuals === undefined) continue;
        burgReflections(residuals, 0, maxOrder, workspace);
        for (let order = 0; order <= maxOrder; order++) {
          const variance = workspace.innovationVariances[order];
          const parameters = order + terms + 1;
          const freedom = observed - parameters - 1;
          if (freedom <= 0 || !(variance > 0)) break;
          const criterion = observed * Math.log(variance) + (2 * parameters * observed) / freedom + jacobian;
          if (criterion < lowest) {
            lowest = criterion;
            best = { scale, trend, season, order };
          }
        }
      }
    }
  }
  return best;
}

function centred(values: Float64Array): Float64Array {
  let mean = 0;
  for (const value of values) mean += value / values.length;
  return values.map((value) => value - mean);
}

/**
 * Forecast of a description on its own scale after the first `count` values: the terms, plus the autoregression of
 * what is left. `scaled` holds the series on that scale without gaps; coefficients are those of the whole series.
 */
export function describedPath(
  description: SeriesDescription,
  scaled: Float64Array,
  count: number,
  horizon: number,
): Float64Array {
  const { fit, trend, season } = description;
  const order = Math.min(fit.order, count);
  const from = count - order;
  const columns = describingColumns(
    trend,
    season,
    from,
    order + horizon,
    description.regressors[0]?.length ?? 1,
  );
  const terms = fit.regression?.coefficients;
  const path = new Float64Array(order + horizon);
  const level = (t: number): number => {
    let sum = fit.mean;
    if (terms !== undefined) {
      sum = 0;
      for (let c = 0; c < columns.length; c++) sum += terms[c] * columns[c][t];
    }
    return sum;
  };
  for (let t = 0; t < order; t++) path[t] = scaled[from + t] - level(t);
  for (let h = 0; h < horizon; h++) {
    let sum = 0;
    for (let j = 0; j < order; j++) sum += fit.coefficients[j] * path[order + h - 1 - j];
    path[order + h] = sum;
  }
  return tabulate(horizon, (h) => path[order + h] + level(order + h));
}
