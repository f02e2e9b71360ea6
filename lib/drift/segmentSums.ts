/**
 * Residual sums of squares of the least-squares regression on every segment of at least `shortest` rows that a
 * partition into such segments can hold; infinite for those that would leave a shorter piece at either end.
 * Row by row: element [first][last − first − shortest + 1]. The normal equations of a segment are the difference of
 * two running sums, so each costs one elimination whatever its length: O(n² k³) in all.
 *
 * @param design rows × columns, stored by row; values near zero, for running sums lose the digits of an offset
 */
export function segmentSums(
  response: Float64Array,
  design: Float64Array,
  columns: number,
  shortest: number,
): Float64Array[] {
  const rows = response.length;
  const size = columns + 1;
  const products = (size * (size + 1)) / 2;
  const running = runningProducts(response, design, columns, products);
  const work = new Float64Array(products);
  const whole = new Float64Array(columns);
  const lastInside = rows - 1 - shortest;
  const sums: Float64Array[] = [];
  for (let first = 0; first <= rows - shortest; first++) {
    const own = new Float64Array(rows - first - shortest + 1).fill(Number.POSITIVE_INFINITY);
    sums.push(own);
    if (first > 0 && first < shortest) continue;
    const from = first * products;
    for (let last = first + shortest - 1; last < rows; last++) {
      if (last > lastInside) last = rows - 1;
      const to = (last + 1) * products;
      for (let i = 0; i < products; i++) work[i] = running[to + i] - running[from + i];
      own[last - first - shortest + 1] = restOf(work, whole, columns);
    }
  }
  return sums;
}

/** Sums over the first rows of all products of columns and response, the lower triangle by row: (rows + 1) × products. */
function runningProducts(
  response: Float64Array,
  design: Float64Array,
  columns: number,
  products: number,
): Float64Array {
  const running = new Float64Array((response.length + 1) * products);
  const row = new Float64Array(columns + 1);
  for (let at = 0; at < response.length; at++) {
    for (let i = 0; i < columns; i++) row[i] = design[at * columns + i];
    row[columns] = response[at];
    let place = at * products;
    for (let i = 0; i <= columns; i++)
      for (let j = 0; j <= i; j++, place++) running[place + products] = running[place] + row[i] * row[j];
  }
  return running;
}

/** What the columns leave of the last variable, by elimination in place; collinear columns add nothing. */
function restOf(cross: Float64Array, whole: Float64Array, columns: number): number {
  // Element (i, j) of the lower triangle stands at i (i + 1) / 2 + j.
  for (let column = 0, diagonal = 0; column < columns; column++, diagonal += column + 1)
    whole[column] = cross[diagonal];
  for (let column = 0, diagonal = 0; column < columns; column++, diagonal += column + 1) {
    const pivot = cross[diagonal];
    if (!(pivot > 1e-12 * whole[column])) continue;
    let below = diagonal;
    for (let i = column + 1; i <= columns; i++) {
      below += i;
      const factor = cross[below] / pivot;
      let other = diagonal;
      for (let j = column + 1; j <= i; j++) {
        other += j;
        cross[below + j - column] -= factor * cross[other];
      }
    }
  }
  return Math.max(cross[cross.length - 1], 0);
}
