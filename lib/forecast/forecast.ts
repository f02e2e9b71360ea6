import type { AutoregressiveFit } from "../autoregression/fit.ts";
import type { ForecastChoice } from "./forecastChoice.ts";

/** A central range a period: `low[h]`..`high[h]` holds the value with probability `level` percent. */
export interface ForecastInterval {
  readonly level: number;
  readonly low: Float64Array;
  readonly high: Float64Array;
}

/** Chance that a period passes a limit, and that any period up to the horizon does. */
export interface LimitChance {
  readonly direction: "above" | "below";
  readonly limit: number;
  readonly each: Float64Array;
  readonly any: number;
}

/** Rolling-origin errors of the forecasting method on this very series. */
export interface BackTest {
  readonly origins: number;
  /** Mean absolute error by horizon step, of the model and of the repeat-the-last-value (or last-season) forecast. */
  readonly meanAbsoluteError: Float64Array;
  readonly naiveMeanAbsoluteError: Float64Array;
  /** Overall model error divided by the naive error; below one is better than naive; `NaN` when not measurable. */
  readonly relativeError: number;
  /** Share of held-back values inside the 80 % range, `NaN` when not measurable. */
  readonly coverage80: number;
}

/** What the forecasting model decided, as coded data. */
export type ForecastNote =
  | { readonly code: "too-short"; readonly observed: number }
  /** The last `observed` values, which are all that were looked at, are the same; older documents do not tell how many. */
  | { readonly code: "constant"; readonly value: number; readonly observed?: number }
  /** Zeros from before the series began were left out; `index` is its first value. */
  | { readonly code: "zeros-first"; readonly index: number }
  | { readonly code: "mostly-gaps"; readonly observed: number; readonly periods: number }
  | { readonly code: "intermittent"; readonly shareOfZeros: number }
  | { readonly code: "naive-used"; readonly relativeError: number }
  | { readonly code: "level-step"; readonly index: number }
  | { readonly code: "outliers-damped"; readonly indexes: readonly number[] };

/**
 * The describing model: the one autoregression whose weights, half-life and shock attribution are reported.
 * `values` of the model are `transform(x) − regression`, where regression holds trend and season columns.
 */
export interface DescribingModel {
  readonly scale: "raw" | "log";
  readonly trend: boolean;
  /** Season length of the seasonal terms, 0 when there are none. */
  readonly season: number;
  readonly fit: AutoregressiveFit;
  /** Share of the average this model carries. */
  readonly weight: number;
}

/** The part of a forecast that says where values will lie. */
export type Ranges = Pick<Forecast, "point" | "median" | "intervals" | "total">;

export interface Forecast {
  /** Mean of the predictive distribution. */
  readonly point: Float64Array;
  readonly median: Float64Array;
  readonly intervals: readonly ForecastInterval[];
  readonly total: {
    readonly point: number;
    readonly intervals: readonly { readonly level: number; readonly low: number; readonly high: number }[];
  };
  readonly model: DescribingModel;
  /** One line for analysts: which candidates carried the forecast, with weights. */
  readonly candidates: readonly { readonly name: string; readonly weight: number }[];
  readonly notes: readonly ForecastNote[];
  readonly chances: readonly LimitChance[];
  readonly backTest: BackTest;
  /** What was decided from the past, for `choice` of a later forecast; `null` where nothing was. */
  readonly choice: ForecastChoice | null;
}

export interface Bounds {
  readonly low?: number;
  readonly high?: number;
}

/** Options as a forecast goes by them: with the bounds that the values show, and what events add to each step. */
export interface ForecastPlan extends Omit<ForecastOptions, "effects"> {
  readonly bounds: Bounds;
  readonly coming: Float64Array;
}

export interface ForecastOptions {
  /** Periods ahead, 1 or more. */
  readonly horizon: number;
  /** Percent, for example [80, 95]. */
  readonly levels: readonly number[];
  readonly period?: "hour" | "day" | "week" | "month" | "quarter" | "year";
  /** Season lengths to consider, in periods; found from `period` when absent. */
  readonly seasons?: readonly number[];
  readonly seed?: number;
  /** Values cannot pass these. */
  readonly bounds?: Bounds;
  readonly limits?: { readonly above?: number; readonly below?: number };
  /**
   * What known events did to each value and will do to each coming one, in units of the series: `values.length +
   * horizon` entries. Taken off before anything is fitted, and added to all that is said of the coming periods.
   */
  readonly effects?: Float64Array;
  /** Index of the first value after the last lasting change, found by drift; earlier values count for less. */
  readonly changedAt?: number;
  /**
   * What an earlier forecast of the same series decided, to go by instead of deciding anew; sensible while fewer
   * values came since than the horizon is long. Ignored when the series has become of another kind.
   */
  readonly choice?: ForecastChoice;
}
