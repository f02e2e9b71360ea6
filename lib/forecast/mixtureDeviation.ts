import { weightedMiddle } from "./weightedMiddle.ts";

/** A candidate stands no more deviations of the model from the average than this: one explosive one must not rule. */
const FARTHEST = 3;

/**
 * Standard deviation of a weighted mixture of candidates about their average: from the weighted middle of their
 * precisions, plus their weighted mean square distance from the average, which is what is not known of the model
 * (Draper 1995). All candidates with weight count, those outside the middle that makes the average too.
 *
 * Precisions, not variances, are averaged: that is the logarithmic pool of normal opinions (Genest and Zidek 1986), in
 * which a candidate that says next to nothing of a far step (a slope that wanders) takes next to nothing away from
 * what the others say.
 *
 * `precisions` are inverse variances; `distances` absolute, one that is no number (a path below zero on the logarithm)
 * is as far as can be. `order` is scratch of the same length.
 */
export function mixtureDeviation(
  precisions: Float64Array,
  distances: Float64Array,
  weights: Float64Array,
  order: Int32Array,
): number {
  const own = 1 / weightedMiddle(precisions, weights, order);
  const farthest = FARTHEST * Math.sqrt(own);
  let apart = 0;
  let total = 0;
  for (let m = 0; m < weights.length; m++) {
    const distance = Number.isNaN(distances[m]) ? farthest : Math.min(farthest, distances[m]);
    apart += weights[m] * distance * distance;
    total += weights[m];
  }
  return Math.sqrt(own + apart / total);
}
