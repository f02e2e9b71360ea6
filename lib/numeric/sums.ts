/**
 * Sum with Neumaier's (1974) compensation: the rounding error does not grow with the number of terms,
 * so values with an offset of 1e9 and unit noise keep their noise. `NaN` entries (gaps) are left out.
 *
 * @example compensatedSum([1e16, 1, -1e16]) // 1
 */
export function compensatedSum(values: ArrayLike<number>): number {
  let sum = 0;
  let lost = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i];
    if (Number.isNaN(value)) continue;
    const next = sum + value;
    lost += Math.abs(sum) >= Math.abs(value) ? sum - next + value : value - next + sum;
    sum = next;
  }
  return sum + lost;
}

/** How many entries are numbers, not gaps (`NaN`). */
export function countObserved(values: ArrayLike<number>): number {
  let count = 0;
  for (let i = 0; i < values.length; i++) if (!Number.isNaN(values[i])) count++;
  return count;
}

/** Mean of the entries that are not gaps (`NaN`); `NaN` when there are none. */
export function observedMean(values: ArrayLike<number>): number {
  return compensatedSum(values) / countObserved(values);
}

/**
 * Values minus `centre`, as a new array; gaps stay gaps. With the mean as centre the second pass removes
 * the rounding of the first, so that the result sums to zero as closely as doubles allow.
 */
export function centred(values: ArrayLike<number>, centre: number): Float64Array {
  const out = new Float64Array(values.length);
  for (let i = 0; i < values.length; i++) out[i] = values[i] - centre;
  return out;
}
