import { requireObserved, requireValues, requireWhole } from "./checks.ts";
import type { AutoregressiveFit, EstimationMethod } from "./fit.ts";
import { fitByLeastSquares } from "./leastSquaresFit.ts";
import { fitByMaximumLikelihood } from "./maximumLikelihood.ts";
import { fitByMoments } from "./momentFits.ts";

export interface FitOptions {
  /** Order p, 0 or more. */
  readonly order: number;
  readonly method: EstimationMethod;
  /** Whether the process mean is estimated (default) or known to be zero. */
  readonly mean?: "estimate" | "zero";
  /** One array of n finite values a column, for maximum likelihood only; a constant column replaces the mean. */
  readonly regressors?: readonly ArrayLike<number>[];
  /**
   * What the methods other than maximum likelihood do with `NaN`: refuse (default), or use the complete pairs
   * (Yule–Walker) or complete rows (least squares). Burg's method always refuses.
   */
  readonly gaps?: "refuse" | "complete-only";
}

/**
 * Fits x_t − mean = Σ φ_j (x_{t−j} − mean) + e_t of a given order.
 *
 * - `yule-walker`: sample autocovariances with divisor n, σ² of the Levinson recursion; always stationary.
 * - `burg`: least forward and backward prediction error, σ² of the recursion; always stationary.
 * - `least-squares`: regression with intercept, σ² over the degrees of freedom; may be explosive.
 * - `maximum-likelihood`: the exact Gaussian likelihood from a stationary start, gaps left out exactly, jointly
 *   with the mean or regression; σ² divides by the observed count; standard errors from the observed information.
 *
 * The log-likelihood is exact for maximum likelihood, conditional on the first p values for least squares, and
 * −n/2 (log 2πσ² + 1) for the other two. The parameter count of the criteria includes σ² and the mean; AICc and BIC
 * count observed values (rows, for least squares).
 *
 * Throws `TypeError`/`RangeError` naming the argument: infinite values, gaps where the method takes none, fewer
 * than order + 2 observed values (least squares: too few complete rows), constant values, regressors that are not
 * independent.
 *
 * @example fitAutoregression(lh, { order: 1, method: "maximum-likelihood" }).coefficients // [0.5739]
 */
export function fitAutoregression(values: ArrayLike<number>, options: FitOptions): AutoregressiveFit {
  const { order, method, mean = "estimate", regressors, gaps = "refuse" } = options;
  const likelihood = method === "maximum-likelihood";
  const takesGaps = likelihood || (gaps === "complete-only" && method !== "burg");
  requireValues("fitAutoregression", "values", values, takesGaps ? "gaps-allowed" : "no-gaps");
  requireWhole("fitAutoregression", "order", order, 0);
  requireObserved("fitAutoregression", values, order + 2);
  if (mean !== "estimate" && mean !== "zero") {
    throw new TypeError(`fitAutoregression needs mean to be "estimate" or "zero", got ${String(mean)}`);
  }
  requireVariation(values, mean === "zero");
  if (regressors !== undefined && regressors.length > 0 && !likelihood) {
    throw new RangeError(`fitAutoregression takes regressors with maximum-likelihood only, got ${method}`);
  }
  switch (method) {
    case "yule-walker":
    case "burg":
      return fitByMoments(values, order, method, mean === "zero");
    case "least-squares":
      return fitByLeastSquares(values, order, mean === "zero");
    case "maximum-likelihood":
      return fitByMaximumLikelihood(values, order, mean === "zero", regressors ?? []);
    default:
      throw new TypeError(`fitAutoregression knows no method ${String(method)}`);
  }
}

/** Differences outside this range have squares that are not numbers any more. */
const LEAST_SPREAD = 1e-150;
const GREATEST_SPREAD = 1e150;

/** Refuses values that are all the same (all zero, when the mean is known), or differ by too little or too much. */
export function requireVariation(values: ArrayLike<number>, meanKnown: boolean): void {
  let first = meanKnown ? 0 : Number.NaN;
  let spread = 0;
  for (let t = 0; t < values.length; t++) {
    const value = values[t];
    if (Number.isNaN(value)) continue;
    if (Number.isNaN(first)) first = value;
    spread = Math.max(spread, Math.abs(value - first));
  }
  if (spread > LEAST_SPREAD && spread < GREATEST_SPREAD) return;
  throw new RangeError(
    spread === 0
      ? `fitAutoregression needs values that vary, got ${first} throughout`
      : `fitAutoregression needs values that vary by 1e-150 to 1e150, got a spread of ${spread}`,
  );
}
