/** The largest F statistic over all single breaks, and the row before which it falls. */
export interface SupF {
  readonly statistic: number;
  readonly row: number;
}

/**
 * sup F (Andrews 1993): over every break that leaves both sides at least `shortest` rows, the Chow statistic
 * (RSS_0 − RSS_1) / (RSS_1 / (n − 2k)), that is F times k, on the χ² scale.
 *
 * @param sums from segmentSums
 */
export function supF(sums: readonly Float64Array[], rows: number, columns: number, shortest: number): SupF {
  const whole = sums[0][rows - shortest];
  let best: SupF = { statistic: Number.NEGATIVE_INFINITY, row: -1 };
  for (let row = shortest; row <= rows - shortest; row++) {
    const split = sums[0][row - shortest] + sums[row][rows - row - shortest];
    const statistic = ((whole - split) * (rows - 2 * columns)) / split;
    if (statistic > best.statistic) best = { statistic, row };
  }
  return best;
}
