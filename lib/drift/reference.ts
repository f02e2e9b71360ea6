import { chooseOrder } from "./chooseOrder.ts";
import { bridgeGaps, interpolateGaps } from "./fillGaps.ts";
import { leastSquares } from "./regression.ts";
import { studentShape } from "./studentScale.ts";
import { type TermPlan, termColumns } from "./terms.ts";

/**
 * What the monitor guards, in units of its own shocks: the values it was fitted on (gaps interpolated, gross
 * outliers removed), less `centre`, divided by `scale`.
 */
export interface Reference extends TermPlan {
  readonly order: number;
  readonly centre: number;
  /** Standard deviation of the innovations in the units of the series. */
  readonly scale: number;
  readonly values: Float64Array;
  readonly isGap: Uint8Array;
  /** Of the terms, then φ_1..φ_p, in scaled units. */
  readonly coefficients: Float64Array;
  readonly residuals: Float64Array;
  /** π = 1, −φ_1, …, −φ_p. */
  readonly weights: Float64Array;
  /** The terms alone, without lags: the level, line and pattern the series moves around. */
  readonly centreline: Float64Array;
  /** Standard deviation of the series around its centreline, in shocks. */
  readonly deviation: number;
  /** Student shape of the innovations, scale in shocks. */
  readonly degreesOfFreedom: number;
  readonly studentScale: number;
}

/** Outliers inside the reference are removed only when gross: in shocks, after allowing for heavy tails. */
const grossOutlier = 6;

/**
 * Fits the reference on `values` (gaps `NaN`) by least squares. With `order` undefined it is chosen, up to
 * `maxOrder`.
 */
export function fitReference(
  values: Float64Array,
  plan: TermPlan,
  order: number | undefined,
  maxOrder: number,
): Reference {
  const count = values.length;
  const isGap = new Uint8Array(count);
  const gaps: number[] = [];
  for (let at = 0; at < count; at++)
    if (Number.isNaN(values[at])) {
      isGap[at] = 1;
      gaps.push(at);
    }
  const work = Float64Array.from(values);
  bridgeGaps(work);
  let centre = 0;
  for (const value of work) centre += value / count;
  let unit = 0;
  for (const value of work) unit += (value - centre) ** 2 / count;
  unit = Math.sqrt(unit);
  if (!(unit > 1e-10 * Math.abs(centre)))
    throw new RangeError("startMonitor needs values that are not all the same");
  for (let at = 0; at < count; at++) work[at] = (work[at] - centre) / unit;

  let chosen = order ?? chooseOrder(work, isGap, plan, maxOrder);
  let fit = leastSquares(work, isGap, chosen, plan);
  const outliers = removeGrossOutliers(
    work,
    fit.residuals,
    weightsOf(fit.coefficients, chosen),
    fit.deviation,
  );
  if (outliers > 0 || gaps.length > 0) {
    for (let round = 0; round < 3; round++) {
      if (round < 2 && order === undefined) chosen = chooseOrder(work, isGap, plan, maxOrder);
      fit = leastSquares(work, isGap, chosen, plan);
      interpolateGaps(work, fit.residuals, gaps, weightsOf(fit.coefficients, chosen), count);
    }
    fit = leastSquares(work, isGap, chosen, plan);
  }
  return scaled(work, isGap, plan, chosen, fit.coefficients, fit.residuals, fit.deviation, centre, unit);
}

function weightsOf(coefficients: Float64Array, order: number): Float64Array {
  const weights = new Float64Array(order + 1);
  weights[0] = 1;
  for (let lag = 1; lag <= order; lag++) weights[lag] = -coefficients[coefficients.length - order + lag - 1];
  return weights;
}

function scaled(
  work: Float64Array,
  isGap: Uint8Array,
  plan: TermPlan,
  order: number,
  coefficients: Float64Array,
  residuals: Float64Array,
  shock: number,
  centre: number,
  unit: number,
): Reference {
  const terms = termColumns(plan);
  for (let at = 0; at < work.length; at++) {
    work[at] /= shock;
    residuals[at] /= shock;
  }
  for (let column = 0; column < terms; column++) coefficients[column] /= shock;
  const observed = residuals.filter((_, at) => at >= order && !isGap[at]);
  const shape = studentShape(observed, 1);
  const around = leastSquares(work, isGap, 0, plan);
  let squares = 0;
  for (let at = 0; at < work.length; at++) if (!isGap[at]) squares += around.residuals[at] ** 2;
  return {
    ...plan,
    order,
    centre,
    scale: unit * shock,
    values: work,
    isGap,
    coefficients,
    residuals,
    weights: weightsOf(coefficients, order),
    centreline: around.coefficients,
    deviation: Math.sqrt(squares / around.rows),
    degreesOfFreedom: shape.degreesOfFreedom,
    studentScale: shape.scale,
  };
}

/** Takes out single wild values (at most one in fifty), largest first, judged by the additive-outlier statistic. */
function removeGrossOutliers(
  values: Float64Array,
  residuals: Float64Array,
  weights: Float64Array,
  deviation: number,
): number {
  const order = weights.length - 1;
  const most = Math.max(1, Math.floor(values.length / 50));
  const magnitudes = residuals.subarray(order).map(Math.abs).sort();
  // Half of the absolute shocks lie below 0.674 standard deviations when they are normal: one wild value
  // inflates the ordinary deviation and hides itself.
  const robust = Math.min(deviation, magnitudes[magnitudes.length >> 1] / 0.6745);
  let removed = 0;
  for (; removed < most; removed++) {
    let largest = grossOutlier;
    let place = -1;
    let size = 0;
    for (let at = order; at < values.length; at++) {
      let sum = 0;
      let squares = 0;
      for (let j = 0; j <= order && at + j < values.length; j++) {
        sum += weights[j] * residuals[at + j];
        squares += weights[j] * weights[j];
      }
      const ratio = Math.abs(sum) / Math.sqrt(squares) / robust;
      if (ratio > largest) {
        largest = ratio;
        place = at;
        size = sum / squares;
      }
    }
    if (place < 0) break;
    values[place] -= size;
    for (let j = 0; j <= order && place + j < values.length; j++) residuals[place + j] -= size * weights[j];
  }
  return removed;
}
