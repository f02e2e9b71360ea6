/** The best partition with a given number of breaks; a break is the last row of the left segment. */
export interface Partition {
  readonly breaks: readonly number[];
  readonly sumOfSquares: number;
}

/**
 * Partitions of the rows into segments with the least total sum of squares, for 0..maxBreaks breaks, by the
 * dynamic programme of Bai and Perron (2003): the best partition of the first rows into m + 1 segments is the
 * best one of fewer rows into m, plus one segment.
 *
 * @param sums from segmentSums
 */
export function bestPartitions(
  sums: readonly Float64Array[],
  rows: number,
  shortest: number,
  maxBreaks: number,
): Partition[] {
  const cost = (first: number, last: number) => sums[first][last - first - shortest + 1];
  // best[last]: least sum for rows 0..last with m breaks; from[m][last]: last row before the final segment.
  let best = new Float64Array(rows).fill(Number.POSITIVE_INFINITY);
  for (let last = shortest - 1; last < rows; last++) best[last] = cost(0, last);
  const from: Int32Array[] = [];
  const partitions: Partition[] = [{ breaks: [], sumOfSquares: best[rows - 1] }];
  for (let breaks = 1; breaks <= maxBreaks; breaks++) {
    const next = new Float64Array(rows).fill(Number.POSITIVE_INFINITY);
    const origin = new Int32Array(rows).fill(-1);
    for (let last = (breaks + 1) * shortest - 1; last < rows; last++)
      for (let cut = breaks * shortest - 1; cut <= last - shortest; cut++) {
        const total = best[cut] + cost(cut + 1, last);
        if (total < next[last]) {
          next[last] = total;
          origin[last] = cut;
        }
      }
    from.push(origin);
    best = next;
    if (!Number.isFinite(best[rows - 1])) break;
    const cuts: number[] = [];
    for (let m = breaks, last = rows - 1; m > 0; m--) {
      last = from[m - 1][last];
      cuts.unshift(last);
    }
    partitions.push({ breaks: cuts, sumOfSquares: best[rows - 1] });
  }
  return partitions;
}
