import { chiSquareTail } from "../numeric/gammaFunctions.ts";
import { centred, countObserved, observedMean } from "../numeric/sums.ts";
import { requireObserved, requireValues } from "./checks.ts";
import type { ChiSquareTest } from "./ljungBox.ts";

export interface NormalityTest extends ChiSquareTest {
  readonly skewness: number;
  /** 3 for a normal distribution (not the excess). */
  readonly kurtosis: number;
}

/**
 * Jarque & Bera (1980) test of normality: n/6 (skewness² + (kurtosis − 3)²/4), chi-square with 2 degrees of freedom;
 * moments divide by n. Gaps are left out. The test is only as good as its large-sample theory: with fewer than
 * some hundred residuals it rejects too seldom.
 *
 * Throws `RangeError` for fewer than 3 residuals or constant ones.
 */
export function jarqueBera(residuals: ArrayLike<number>): NormalityTest {
  requireValues("jarqueBera", "residuals", residuals, "gaps-allowed");
  requireObserved("jarqueBera", residuals, 3);
  const n = countObserved(residuals);
  const deviations = centred(residuals, observedMean(residuals));
  let second = 0;
  let third = 0;
  let fourth = 0;
  for (let t = 0; t < deviations.length; t++) {
    if (Number.isNaN(deviations[t])) continue;
    const square = deviations[t] * deviations[t];
    second += square / n;
    third += (square * deviations[t]) / n;
    fourth += (square * square) / n;
  }
  if (!(second > 0)) throw new RangeError("jarqueBera needs residuals that vary, got a constant series");
  const skewness = third / second ** 1.5;
  const kurtosis = fourth / second ** 2;
  const statistic = (n / 6) * (skewness ** 2 + (kurtosis - 3) ** 2 / 4);
  return { statistic, degreesOfFreedom: 2, pValue: chiSquareTail(statistic, 2), skewness, kurtosis };
}

/**
 * Durbin & Watson (1950) statistic Σ(e_t − e_{t−1})²/Σe_t²: near 2 without first-order autocorrelation, near 0 with
 * a strong positive one. Pairs with a gap are left out of the upper sum.
 */
export function durbinWatson(residuals: ArrayLike<number>): number {
  requireValues("durbinWatson", "residuals", residuals, "gaps-allowed");
  requireObserved("durbinWatson", residuals, 2);
  let above = 0;
  let below = 0;
  for (let t = 0; t < residuals.length; t++) {
    if (t > 0) above += (residuals[t] - residuals[t - 1]) ** 2 || 0;
    below += residuals[t] ** 2 || 0;
  }
  return above / below;
}
