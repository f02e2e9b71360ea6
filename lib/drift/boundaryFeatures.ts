import type { Reference } from "./reference.ts";
import { isStable } from "./simulatePath.ts";
import { seasonColumns } from "./terms.ts";

/** How many features a reference without trend and season has; the rest follow them. */
export const plainFeatures = 18;

/**
 * What of a reference its boundaries depend on, smooth enough for a linear regression of their quantiles: one;
 * the persistence and its excesses over 0.3, 0.6, 0.8 and 0.92; the largest root squared, its excess over 0.85
 * and the lags beyond two (all 0 for a single lag); the length as l = ln(values / 156); the tail as 1/ν and
 * times l, and whether it is normal; 1/ν times the excesses of persistence over 0.5, 0.8 and 0.92; l times persistence
 * and times its excess over 0.7. Then trend, by itself and times persistence over 0.5 and l, and the number of
 * seasonal columns, by itself and times l, and whether the pattern is longer than twelve periods.
 */
export function boundaryFeatures(reference: Reference): number[] {
  const { order, values, degreesOfFreedom, trend, season } = reference;
  const coefficients = reference.coefficients.subarray(reference.coefficients.length - order);
  const sum = coefficients.reduce((total, value) => total + value, 0);
  const persistence = Math.min(1, Math.max(-1, sum));
  const over = (knot: number) => Math.max(0, persistence - knot);
  const root = order > 1 ? largestRoot(coefficients) : 0;
  const length = Math.log(values.length / 156);
  const tail = 1 / degreesOfFreedom;
  const turning = trend ? 1 : 0;
  const seasonal = seasonColumns(season) / 6;
  return [
    1,
    persistence,
    over(0.3),
    over(0.6),
    over(0.8),
    over(0.92),
    root * root,
    Math.max(0, root - 0.85),
    Math.min(Math.max(order - 2, 0), 3),
    length,
    tail,
    tail * length,
    degreesOfFreedom >= 100 ? 1 : 0,
    tail * over(0.5),
    tail * over(0.8),
    tail * over(0.92),
    persistence * length,
    over(0.7) * length,
    turning,
    turning * over(0.5),
    turning * length,
    seasonal,
    seasonal * length,
    season > 12 ? 1 : 0,
  ];
}

/** Modulus of the largest root, at most 1, by bisection on the stability test. */
function largestRoot(coefficients: Float64Array): number {
  let low = 0;
  let high = 1;
  for (let step = 0; step < 20; step++) {
    const middle = (low + high) / 2;
    if (isStable(coefficients, middle)) high = middle;
    else low = middle;
  }
  return high;
}
