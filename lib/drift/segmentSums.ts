import { factorInPlace, forwardSolve } from "./smallMatrix.ts";

/**
 * Residual sums of squares of the least-squares regression on every segment of at least `shortest` rows.
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
  const factor = new Float64Array(size * size);
  const row = new Float64Array(size);
  return Array.from({ length: rows - shortest + 1 }, (_, first) => {
    const sums = new Float64Array(rows - first - shortest + 1);
    cross.fill(0);
    for (let last = first; last < rows; last++) {
      for (let i = 0; i < columns; i++) row[i] = design[last * columns + i];
      row[columns] = response[last];
      for (let i = 0; i < size; i++) for (let j = 0; j <= i; j++) cross[i * size + j] += row[i] * row[j];
      const place = last - first - shortest + 1;
      if (place >= 0) sums[place] = restOf(cross, factor, columns);
    }
    return sums;
  });
}

/** What the columns leave of the last variable; collinear columns add nothing. */
function restOf(cross: Float64Array, factor: Float64Array, columns: number): number {
  const size = columns + 1;
  factor.set(cross);
  factorInPlace(factor, columns, size);
  const last = columns * size;
  forwardSolve(factor, columns, factor, last, size);
  let rest = factor[last + columns];
  for (let i = 0; i < columns; i++) rest -= factor[last + i] ** 2;
  return Math.max(rest, 0);
}
