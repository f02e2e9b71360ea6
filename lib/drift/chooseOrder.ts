import { leastSquares, nestedSumsOfSquares } from "./regression.ts";
import { type TermPlan, termColumns } from "./terms.ts";

/**
 * Order of the reference: the smallest criterion of Hannan and Quinn (1979) among 1..maxOrder on shared rows, its
 * penalty corrected for small samples as AICc's is, then raised while the residuals fail Ljung and Box's test at
 * 1 %. Too low an order makes a stable series look changed (up to four times the false notices), hence the test;
 * AICc's frequent extra lag costs three points of power, hence the heavier penalty (by simulation).
 */
export function chooseOrder(
  values: Float64Array,
  isGap: Uint8Array,
  plan: TermPlan,
  maxOrder: number,
): number {
  const { sumsOfSquares, rows } = nestedSumsOfSquares(values, isGap, maxOrder, plan);
  const penalty = 2 * Math.log(Math.log(rows));
  let best = 1;
  let lowest = Number.POSITIVE_INFINITY;
  for (let order = 1; order <= maxOrder; order++) {
    const parameters = termColumns(plan) + order + 1;
    const value =
      rows * Math.log(sumsOfSquares[order] / rows) + (penalty * parameters * rows) / (rows - parameters - 1);
    if (value < lowest) {
      lowest = value;
      best = order;
    }
  }
  for (let order = best; order <= maxOrder; order++) {
    const { residuals } = leastSquares(values, isGap, order, plan);
    if (isWhite(residuals.subarray(order), order)) return order;
  }
  return best;
}

/** Ljung and Box (1978) at 1 %, the χ² quantile by Wilson and Hilferty (1931). */
function isWhite(residuals: Float64Array, order: number): boolean {
  const count = residuals.length;
  const lags = Math.min(order + 10, Math.floor(count / 4));
  let variance = 0;
  for (const residual of residuals) variance += residual * residual;
  let statistic = 0;
  for (let lag = 1; lag <= lags; lag++) {
    let product = 0;
    for (let at = lag; at < count; at++) product += residuals[at] * residuals[at - lag];
    statistic += (product / variance) ** 2 / (count - lag);
  }
  const freedom = Math.max(1, lags - order);
  const part = 2 / (9 * freedom);
  return count * (count + 2) * statistic < freedom * (1 - part + 2.3263 * Math.sqrt(part)) ** 3;
}
