import { uniformNumbers } from "../../lib/drift/randomNumbers.ts";
import { polarNormal } from "../../lib/numeric/polarNormal.ts";

/** A kind of series to put before the monitor; what changes, changes at the eleventh look. */
export interface DriftCase {
  readonly name: string;
  readonly coefficients: readonly number[];
  readonly coefficientsAfter?: readonly number[];
  /** Added to the level, in marginal standard deviations. */
  readonly level?: number;
  readonly shockSize?: number;
  /** Added to single values from the change on, in innovation standard deviations. */
  readonly outliers?: readonly number[];
  /** GARCH(1,1) shocks: weight of the last square, and of the last variance. */
  readonly clustering?: readonly [number, number];
  /** Degrees of freedom of Student shocks; normal ones when absent. */
  readonly tails?: number;
}

export const changeLook = 11;

/** One series of `start` values and 52 looks, the same for the same seed. Shocks have unit variance. */
export function drawSeries(one: DriftCase, start: number, seed: number): Float64Array {
  const normal = polarNormal(uniformNumbers(seed));
  const changeAt = start + changeLook - 1;
  const order = Math.max(one.coefficients.length, one.coefficientsAfter?.length ?? 0);
  const recent = new Float64Array(order + 1);
  const series = new Float64Array(start + 52);
  const deviation = marginalDeviation(one.coefficients);
  let variance = 1;
  for (let time = -300; time < series.length; time++) {
    const changed = time >= changeAt;
    let shock = one.tails === undefined ? normal() : student(normal, one.tails);
    if (one.clustering !== undefined) {
      const [square, memory] = one.clustering;
      shock *= Math.sqrt(variance);
      variance = 1 - square - memory + square * shock * shock + memory * variance;
    }
    if (changed) shock *= one.shockSize ?? 1;
    const coefficients = changed ? (one.coefficientsAfter ?? one.coefficients) : one.coefficients;
    const value = coefficients.reduce((sum, phi, lag) => sum + phi * recent[lag], shock);
    recent.copyWithin(1, 0, order);
    recent[0] = value;
    if (time < 0) continue;
    const outlier = one.outliers?.[time - changeAt] ?? 0;
    series[time] = value + outlier + (changed ? (one.level ?? 0) * deviation : 0);
  }
  return series;
}

function student(normal: () => number, degreesOfFreedom: number): number {
  let sum = 0;
  for (let i = 0; i < degreesOfFreedom; i++) sum += normal() ** 2;
  return normal() * Math.sqrt((degreesOfFreedom - 2) / sum);
}

/** Standard deviation of the process with unit shocks, from its moving-average weights. */
function marginalDeviation(coefficients: readonly number[]): number {
  const weights = [1];
  let sum = 1;
  for (let lag = 1; lag < 2000; lag++) {
    const weight = coefficients.reduce((total, phi, j) => total + phi * (weights[lag - 1 - j] ?? 0), 0);
    weights.push(weight);
    sum += weight * weight;
  }
  return Math.sqrt(sum);
}
