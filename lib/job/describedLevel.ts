import { describingColumns } from "../forecast/describingTerms.ts";
import type { DescribingModel } from "../forecast/forecast.ts";

/** Where a series returns to, on the scale of the data. */
export interface DescribedLevel {
  readonly value: number;
  readonly standardError: number;
}

/** The model's terms (level, trend, season) over `count` periods from the first value on, on the model's scale. */
export function describedTerms(model: DescribingModel, length: number, count: number): Float64Array {
  const terms = model.fit.regression?.coefficients;
  const sums = new Float64Array(count);
  if (!terms || terms.length === 0) return sums.fill(model.fit.mean);
  const columns = describingColumns(model.trend, model.season, 0, count, length);
  for (const [index, column] of columns.entries())
    for (let time = 0; time < count; time++) sums[time] += terms[index] * column[time];
  return sums;
}

/** Departures of the values from the model's terms, on its scale: what the autoregression describes. Gaps stay `NaN`. */
export function departures(model: DescribingModel, values: Float64Array): Float64Array {
  const terms = describedTerms(model, values.length, values.length);
  return values.map((value, time) => (model.scale === "log" ? Math.log(value) : value) - terms[time]);
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
