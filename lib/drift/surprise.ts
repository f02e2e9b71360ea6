import type { LookState } from "./lookState.ts";

/** Student quantiles passed once in two thousand values (R: qt(1 - 2.5e-4, df)), by degrees of freedom. */
const quantiles = new Map<number, number>([
  [3, 16.326],
  [4, 10.306],
  [5, 7.976],
  [7, 6.082],
  [10, 5.049],
  [15, 4.417],
  [30, 3.902],
  [200, 3.539],
]);

/** One-step standard deviations a surprise has at least, whatever the tails; more when recognised late. */
const fewestDeviations = 4;
const lateMargin = 0.5;

/** Values back to which a surprise may still be recognised once its neighbours bear it out. */
const lateBy = 4;

/** A value that stands alone: its time and its size in one-step standard deviations, signed. */
export interface Surprise {
  readonly time: number;
  readonly size: number;
}

/**
 * Finds one-off surprises among the newest values: the newest when its one-step error passes four
 * standard deviations (0.3 % a year of weekly looks for normal shocks) and the tail the reference showed, one of
 * the four before it when its additive-outlier statistic passes half a deviation more.
 */
export function findSurprises(state: LookState, known: (time: number) => boolean): Surprise[] {
  const { reference, start, count, order, residuals, isGap } = state;
  const tail = (quantiles.get(reference.degreesOfFreedom) ?? 0) * reference.studentScale;
  const atOnce = Math.max(fewestDeviations, tail);
  const newest = count - 1;
  if (isGap[newest]) return [];
  const found: Surprise[] = [];
  for (let time = Math.max(start, newest - lateBy); time < newest; time++) {
    if (isGap[time] || known(time)) continue;
    let sum = 0;
    let squares = 0;
    for (let j = 0; j <= order && time + j < count; j++) {
      sum += reference.weights[j] * residuals[time + j];
      squares += reference.weights[j] ** 2;
    }
    if (Math.abs(sum) / Math.sqrt(squares) >= atOnce + lateMargin)
      found.push({ time, size: residuals[time] });
  }
  if (Math.abs(residuals[newest]) >= atOnce) found.push({ time: newest, size: residuals[newest] });
  return found;
}
