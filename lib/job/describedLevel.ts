import { describingColumns } from "../forecast/describingTerms.ts";
import type { DescribingModel } from "../forecast/forecast.ts";

/** Where a series returns to, on the scale of the data. */
export interface DescribedLevel {
  readonly value: number;
  readonly standardError: number;
}

/**
 * Departures of the values from the model's terms (level, trend, season), on its scale: what the autoregression
 * describes. Gaps stay `NaN`. The model was fitted to the stretch that ends with the last observed value.
 */
export function departures(model: DescribingModel, values: Float64Array): Float64Array {
  const { fit, trend, season } = model;
  const span = fit.residuals.length;
  const offset = values.findLastIndex((value) => !Number.isNaN(value)) + 1 - span;
  const terms = fit.regression?.coefficients ?? new Float64Array(0);
  const columns = terms.length > 0 ? describingColumns(trend, season, -offset, values.length, span) : [];
  const levelAt = (time: number) =>
    terms.length > 0
      ? columns.reduce((sum, column, index) => sum + terms[index] * column[time], 0)
      : fit.mean;
  // Before the stretch there may be values that have no logarithm: gaps on that scale.
  const onScale = (value: number) =>
    model.scale === "raw" ? value : value > 0 ? Math.log(value) : Number.NaN;
  return values.map((value, time) => onScale(value) - levelAt(time));
}

/**
 * The long-run level: the process mean, or with a trend the line's height one period past the last value; seasonal
 * terms average out over their cycle and are left aside.
 */
export function describedLevel(model: DescribingModel): DescribedLevel {
  const { fit } = model;
  const terms = fit.regression;
  let value = fit.mean;
  let standardError = fit.meanStandardError;
  if (terms && terms.coefficients.length > 0) {
    // The first column is a constant, the second the line in units of the whole length.
    value = terms.coefficients[0] + (model.trend ? terms.coefficients[1] : 0);
    standardError = model.trend ? Number.NaN : terms.standardErrors[0];
  }
  if (model.scale === "log")
    return { value: Math.exp(value), standardError: Math.exp(value) * standardError };
  return { value, standardError };
}
