import type { Reference } from "./reference.ts";
import { isStable } from "./simulatePath.ts";
import { seasonColumns } from "./terms.ts";

/** Names of the features, for readers of the table. */
export const featureNames = [
  "one",
  "persistence",
  "persistence above 0.5",
  "its square",
  "largest root squared",
  "largest root above 0.85",
  "lags beyond one, at most 4",
  "ln(values / 156)",
  "1 / tail degrees of freedom",
  "the same times ln(values / 156)",
  "tails normal",
  "trend",
  "trend times persistence above 0.5",
  "trend times ln(values / 156)",
  "seasonal columns / 6",
  "the same times ln(values / 156)",
] as const;

/** What of a reference its boundaries depend on, smooth enough for a linear regression of their quantiles. */
export function boundaryFeatures(reference: Reference): number[] {
  const { order, values, degreesOfFreedom, trend, season } = reference;
  const coefficients = reference.coefficients.subarray(reference.coefficients.length - order);
  const sum = coefficients.reduce((total, value) => total + value, 0);
  const persistence = Math.min(1, Math.max(-1, sum));
  const high = Math.max(0, persistence - 0.5);
  const root = largestRoot(coefficients);
  const length = Math.log(values.length / 156);
  const tail = 1 / degreesOfFreedom;
  const turning = trend ? 1 : 0;
  const seasonal = seasonColumns(season) / 6;
  return [
    1,
    persistence,
    high,
    high * high,
    root * root,
    Math.max(0, root - 0.85),
    Math.min(order - 1, 4),
    length,
    tail,
    tail * length,
    degreesOfFreedom >= 100 ? 1 : 0,
    turning,
    turning * high,
    turning * length,
    seasonal,
    seasonal * length,
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
