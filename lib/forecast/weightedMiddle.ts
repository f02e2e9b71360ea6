/**
 * Weighted interquartile mean: the mean of the middle half of the weight, each value counting for the part of its
 * weight that lies between the quartiles. Between a weighted mean (which one explosive candidate can spoil) and a
 * weighted median (which throws most candidates away).
 *
 * `values` and `weights` of one length; weights non-negative, not all zero. `shares`, when given, receives the part
 * each value had in the result (summing to 1). `order` is scratch of the same length.
 */
export function weightedMiddle(
  values: Float64Array,
  weights: Float64Array,
  order: Int32Array,
  shares?: Float64Array,
): number {
  const count = values.length;
  let total = 0;
  for (let i = 0; i < count; i++) {
    total += weights[i];
    // Insertion sort: a few dozen values, nearly sorted from one horizon to the next.
    let at = i;
    order[i] = i;
    while (at > 0 && values[order[at - 1]] > values[i]) {
      order[at] = order[at - 1];
      at--;
    }
    order[at] = i;
  }
  const low = total / 4;
  const high = total - low;
  let passed = 0;
  let sum = 0;
  let kept = 0;
  for (let place = 0; place < count; place++) {
    const i = order[place];
    const from = Math.max(passed, low);
    passed += weights[i];
    const part = Math.min(passed, high) - from;
    if (shares !== undefined) shares[i] = part > 0 ? part / (high - low) : 0;
    if (part > 0) {
      sum += part * values[i];
      kept += part;
    }
  }
  return sum / kept;
}
