import { observedMean } from "../numeric/sums.ts";
import { requireObserved, requireValues, requireWhole } from "./checks.ts";
import { conditionalLeastSquares } from "./conditionalLeastSquares.ts";
import { type Criterion, criterionPenalty, criterionWeights } from "./criteria.ts";
import type { AutoregressiveFit, EstimationMethod } from "./fit.ts";
import { fitAutoregression, requireVariation } from "./fitAutoregression.ts";
import { fitByMoments, momentLogLikelihood, momentOrders } from "./momentFits.ts";

export interface SelectionOptions {
  /** Highest order tried. */
  readonly maxOrder: number;
  readonly criterion: Criterion;
  readonly method: EstimationMethod;
  readonly mean?: "estimate" | "zero";
}

export interface OrderSelection {
  readonly order: number;
  readonly criterion: Criterion;
  /** Criterion of orders 0..maxOrder. */
  readonly values: Float64Array;
  /** exp(−Δ/2) weights of orders 0..maxOrder, summing to one. */
  readonly weights: Float64Array;
  /** The fit of the chosen order, on all the values. */
  readonly fit: AutoregressiveFit;
}

/**
 * Chooses the order 0..maxOrder with the least AIC, AICc or BIC; ties go to the smaller. All orders are compared
 * on one sample: the exact likelihood and the moment methods use every value at every order, least squares uses
 * the rows t > maxOrder for all (R's `ar.ols` lets the sample change with the order, which favours high ones).
 *
 * Throws as `fitAutoregression` does, and when `maxOrder` leaves too few values.
 */
export function selectOrder(values: ArrayLike<number>, options: SelectionOptions): OrderSelection {
  const { maxOrder, criterion, method, mean = "estimate" } = options;
  requireValues(
    "selectOrder",
    "values",
    values,
    method === "maximum-likelihood" ? "gaps-allowed" : "no-gaps",
  );
  requireWhole("selectOrder", "maxOrder", maxOrder, 0);
  requireObserved("selectOrder", values, maxOrder + 2);
  if (criterion !== "aic" && criterion !== "aicc" && criterion !== "bic") {
    throw new TypeError(`selectOrder knows no criterion ${String(criterion)}`);
  }
  const meanKnown = mean === "zero";
  requireVariation(values, meanKnown);
  const { scores, fitOf } = candidates(values, maxOrder, criterion, method, meanKnown);
  let order = 0;
  for (let p = 1; p <= maxOrder; p++) if (scores[p] < scores[order]) order = p;
  return { order, criterion, values: scores, weights: criterionWeights(scores), fit: fitOf(order) };
}

interface Candidates {
  readonly scores: Float64Array;
  readonly fitOf: (order: number) => AutoregressiveFit;
}

function candidates(
  values: ArrayLike<number>,
  maxOrder: number,
  criterion: Criterion,
  method: EstimationMethod,
  meanKnown: boolean,
): Candidates {
  const scores = new Float64Array(maxOrder + 1);
  const extra = meanKnown ? 1 : 2;
  const mean = meanKnown ? "zero" : "estimate";
  if (method === "yule-walker" || method === "burg") {
    const n = values.length;
    const orders = momentOrders(values, maxOrder, method, meanKnown);
    for (let p = 0; p <= maxOrder; p++) {
      const likelihood = momentLogLikelihood(orders.innovationVariances[p], n);
      scores[p] = -2 * likelihood + criterionPenalty(criterion, p + extra, n);
    }
    return { scores, fitOf: (order) => fitByMoments(values, order, method, meanKnown, orders) };
  }
  if (method === "least-squares") {
    const centre = observedMean(values);
    for (let p = 0; p <= maxOrder; p++) {
      const result = conditionalLeastSquares(values, p, centre, !meanKnown, maxOrder);
      const rows = result?.rows.length ?? 0;
      const residual = result?.regression.residualSumOfSquares ?? Number.NaN;
      const likelihood = -0.5 * rows * (Math.log((2 * Math.PI * residual) / rows) + 1);
      const score = -2 * likelihood + criterionPenalty(criterion, p + extra, rows);
      scores[p] = Number.isNaN(score) ? Number.POSITIVE_INFINITY : score;
    }
    return { scores, fitOf: (order) => fitAutoregression(values, { order, method, mean }) };
  }
  const fits: AutoregressiveFit[] = [];
  for (let order = 0; order <= maxOrder; order++) {
    fits.push(fitAutoregression(values, { order, method, mean }));
    scores[order] = fits[order][criterion];
  }
  return { scores, fitOf: (order) => fits[order] };
}
