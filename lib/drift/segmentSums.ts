/**
 * Residual sums of squares of the least-squares regression on every segment of at least `shortest` rows that a
 * partition into such segments can hold; infinite for those that would leave a shorter piece at either end.
 * Row by row: element [first][last − first − shortest + 1]. Rows are appended one at a time to the normal
 * equations of each start, so all segments cost O(n² k³) without a solve by orthogonalisation for each.
 *
 * @param design rows × columns, stored by row
 */
export function segmentSums(
  response: Float64Array,
  design: Float64Array,
  columns: number,
  shortest: number,
): Float64Array[] {
  const rows = response.length;
  const size = columns + 1;
  const cross = new Float64Array(size * size);
  const work = new Float64Array(size * size);
  const row = new Float64Array(size);
  const longestInside = rows - 1 - shortest;
  return Array.from({ length: rows - shortest + 1 }, (_, first) => {
    const sums = new Float64Array(rows - first - shortest + 1).fill(Number.POSITIVE_INFINITY);
    if (first > 0 && first < shortest) return sums;
    cross.fill(0);
    for (let last = first; last < rows; last++) {
      for (let i = 0; i < columns; i++) row[i] = design[last * columns + i];
      row[columns] = response[last];
      for (let i = 0; i < size; i++) for (let j = 0; j <= i; j++) cross[i * size + j] += row[i] * row[j];
      const place = last - first - shortest + 1;
      if (place >= 0 && (last <= longestInside || last === rows - 1))
        sums[place] = restOf(cross, work, columns);
    }
    return sums;
  });
}

/** What the columns leave of the last variable, by elimination; collinear columns add nothing. */
function restOf(cross: Float64Array, work: Float64Array, columns: number): number {
  const size = columns + 1;
  work.set(cross);
  for (let column = 0; column < columns; column++) {
    const pivot = work[column * size + column];
    if (!(pivot > 1e-12 * cross[column * size + column])) continue;
    for (let i = column + 1; i < size; i++) {
      const factor = work[i * size + column] / pivot;
      for (let j = column + 1; j <= i; j++) work[i * size + j] -= factor * work[j * size + column];
    }
  }
  return Math.max(work[columns * size + columns], 0);
}
