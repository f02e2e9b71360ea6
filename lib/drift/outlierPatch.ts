import type { LookState } from "./lookState.ts";

/** Most neighbours judged together. */
export const longestPatch = 3;

/** Values from `time` on taken as wild together: their χ² statistic and the size of each. */
export interface Patch {
  time: number;
  length: number;
  statistic: number;
  readonly sizes: Float64Array;
}

export const emptyPatch = (): Patch => ({
  time: 0,
  length: 0,
  statistic: 0,
  sizes: new Float64Array(longestPatch),
});

/**
 * Σ_{k ≤ r} π_k π_{k+d} for distances d = 0..2 and r = 0..p (row d): how the effects of two wild values d apart
 * overlap when only r + 1 rows follow the later one.
 */
export function overlapTable(weights: Float64Array): Float64Array {
  const order = weights.length - 1;
  const table = new Float64Array(longestPatch * (order + 1));
  for (let distance = 0; distance < longestPatch; distance++) {
    let sum = 0;
    for (let k = 0; k <= order; k++) {
      if (k + distance <= order) sum += weights[k] * weights[k + distance];
      table[distance * (order + 1) + k] = sum;
    }
  }
  return table;
}

/** Σ π_j e_{s+j} of every monitored time: what one wild value there would explain. */
export function scoreValues(state: LookState): void {
  const { start, count, order, reference, cleanedResiduals } = state;
  const { scores } = state.work;
  for (let time = start; time < count; time++) {
    const reach = Math.min(order, count - 1 - time);
    let sum = 0;
    for (let j = 0; j <= reach; j++) sum += reference.weights[j] * cleanedResiduals[time + j];
    scores[time - start] = sum;
  }
}

/**
 * Least squares of the residuals on the effects of up to three wild neighbours: the Cholesky factor of their
 * overlaps, by hand because it is done for every place at every look.
 */
export function judgePatch(state: LookState, time: number, length: number, patch: Patch): void {
  const { count, order, start } = state;
  const { scores, overlaps } = state.work;
  const overlap = (later: number, distance: number) =>
    overlaps[distance * (order + 1) + Math.min(order, count - 1 - time - later)];
  const at = time - start;
  const l00 = Math.sqrt(overlap(0, 0));
  const u0 = scores[at] / l00;
  patch.time = time;
  patch.length = length;
  patch.statistic = u0 * u0;
  if (length === 1) {
    patch.sizes[0] = u0 / l00;
    return;
  }
  const l10 = overlap(1, 1) / l00;
  const l11 = Math.sqrt(overlap(1, 0) - l10 * l10);
  const u1 = (scores[at + 1] - l10 * u0) / l11;
  patch.statistic += u1 * u1;
  if (length === 2) {
    patch.sizes[1] = u1 / l11;
    patch.sizes[0] = (u0 - l10 * patch.sizes[1]) / l00;
    return;
  }
  const l20 = overlap(2, 2) / l00;
  const l21 = (overlap(2, 1) - l20 * l10) / l11;
  const l22 = Math.sqrt(overlap(2, 0) - l20 * l20 - l21 * l21);
  const u2 = (scores[at + 2] - l20 * u0 - l21 * u1) / l22;
  patch.statistic += u2 * u2;
  patch.sizes[2] = u2 / l22;
  patch.sizes[1] = (u1 - l21 * patch.sizes[2]) / l11;
  patch.sizes[0] = (u0 - l10 * patch.sizes[1] - l20 * patch.sizes[2]) / l00;
}
